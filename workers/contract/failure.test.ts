import { describe, expect, it } from "vitest";
import { InputError, Stopped } from "../../src/quantities/index.ts";
import { errorOf, failureOf } from "./failure.ts";

describe("failures between threads", () => {
  it("keeps all that an input error says", () => {
    const error = new InputError("recording-empty", "The file is empty.", "swim.mp4", "Copy it again.");
    const back = errorOf(structuredClone(failureOf(error)));
    expect(back).toBeInstanceOf(InputError);
    expect(back).toMatchObject({ ...error, message: error.message });
  });

  it("keeps a stop a stop", () => {
    expect(errorOf(structuredClone(failureOf(new Stopped())))).toBeInstanceOf(Stopped);
  });

  it("keeps message and stack of a fault", () => {
    const error = new RangeError("too long");
    const back = errorOf(structuredClone(failureOf(error)));
    expect(back.message).toBe("too long");
    expect(back.cause).toBe(error.stack);
  });

  it("takes whatever was thrown", () => {
    expect(failureOf(7)).toEqual({ kind: "fault", what: "7", detail: "" });
  });
});

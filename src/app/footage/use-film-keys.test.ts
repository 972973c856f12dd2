import { describe, expect, it } from "vitest";
import { filmKey } from "./use-film-keys.ts";

describe("filmKey", () => {
  it("steps by one, by ten with shift, and to the ends", () => {
    expect(filmKey("ArrowRight", false, 9)).toEqual({ type: "stepped", by: 1 });
    expect(filmKey("ArrowLeft", true, 9)).toEqual({ type: "stepped", by: -10 });
    expect(filmKey("Home", false, 9)).toEqual({ type: "went", frame: 0 });
    expect(filmKey("End", false, 9)).toEqual({ type: "went", frame: 8 });
  });

  it("leaves other keys alone", () => {
    expect(filmKey("a", false, 9)).toBeNull();
    expect(filmKey("ArrowUp", false, 9)).toBeNull();
  });
});

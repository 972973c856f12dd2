import { createHash } from "node:crypto";
import { describe, expect, it } from "vitest";
import { sha256Of } from "./sha256.ts";

describe("sha256Of", () => {
  it("is the digest of the whole file, across pieces", async () => {
    const bytes = Uint8Array.from({ length: (4 << 20) + 12345 }, (_, i) => (i * 31 + (i >> 8)) & 255);
    expect(await sha256Of(new Blob([bytes]))).toBe(createHash("sha256").update(bytes).digest("hex"));
  });

  it("knows the empty file", async () => {
    expect(await sha256Of(new Blob([]))).toBe("e3b0c44298fc1c149afbf4c8996fb92427ae41e4649b934ca495991b7852b855");
  });
});

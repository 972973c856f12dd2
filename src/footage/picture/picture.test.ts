import { describe, expect, it } from "vitest";
import { fingerprint } from "./fingerprint.ts";
import { LumaTightener } from "./tight-luma.ts";
import { type Plane, standUpright } from "./upright.ts";

describe("standing a picture upright", () => {
  // 3 wide, 2 high: a b c / d e f.
  const coded = { width: 3, height: 2, luma: Uint8Array.of(1, 2, 3, 4, 5, 6) };

  it.each([
    [0, 3, 2, [1, 2, 3, 4, 5, 6]],
    [90, 2, 3, [4, 1, 5, 2, 6, 3]],
    [180, 3, 2, [6, 5, 4, 3, 2, 1]],
    [270, 2, 3, [3, 6, 2, 5, 1, 4]],
  ] as const)("turns it clockwise by %i degrees", (turn, width, height, luma) => {
    const upright = standUpright(coded, turn, new Uint8Array(6));
    expect(upright).toEqual({ width, height, luma: Uint8Array.from(luma) });
  });

  it("comes back to itself after four quarter turns of a picture larger than a block", () => {
    const luma = Uint8Array.from({ length: 67 * 45 }, (_, i) => (i * 31) % 251);
    let plane: Plane = { width: 67, height: 45, luma };
    for (let i = 0; i < 4; i++) plane = standUpright(plane, 90, new Uint8Array(luma.length));
    expect(plane).toEqual({ width: 67, height: 45, luma });
  });
});

describe("tight luma", () => {
  it("is the given memory where nothing has to be done, unless that isn't ours", () => {
    const plane = { bytes: Uint8Array.of(9, 1, 2, 3, 4), offset: 1, stride: 2, width: 2, height: 2, bitDepth: 8 };
    const tight = new LumaTightener().tighten(plane);
    expect([...tight]).toEqual([1, 2, 3, 4]);
    expect(tight.buffer).toBe(plane.bytes.buffer);
    const copied = new LumaTightener(true).tighten(plane);
    expect([...copied]).toEqual([1, 2, 3, 4]);
    expect(copied.buffer).not.toBe(plane.bytes.buffer);
  });

  it("loses its padding", () => {
    const bytes = Uint8Array.of(1, 2, 99, 3, 4, 99);
    expect([...new LumaTightener().tighten({ bytes, offset: 0, stride: 3, width: 2, height: 2, bitDepth: 8 })]).toEqual(
      [1, 2, 3, 4],
    );
  });

  it("is rounded from deeper samples, half up, and held at 255", () => {
    const deep = (values: number[], bitDepth: number) => {
      const bytes = Uint8Array.from(values.flatMap((v) => [v & 255, v >> 8]));
      const plane = { bytes, offset: 0, stride: 2 * values.length, width: values.length, height: 1, bitDepth };
      return [...new LumaTightener().tighten(plane)];
    };
    expect(deep([0, 1, 2, 5, 6, 64, 940, 1021, 1022, 1023], 10)).toEqual([0, 0, 1, 1, 2, 16, 235, 255, 255, 255]);
    expect(deep([0, 7, 8, 4095], 12)).toEqual([0, 0, 1, 255]);
  });
});

describe("a fingerprint", () => {
  const luma = Uint8Array.from({ length: 103 }, (_, i) => (i * 37) % 256);

  it("doesn't depend on where the picture lies in memory", () => {
    for (const offset of [0, 1, 2, 3, 4]) {
      const elsewhere = new Uint8Array(120);
      elsewhere.set(luma, offset);
      expect(fingerprint(elsewhere.subarray(offset, offset + luma.length))).toBe(fingerprint(luma));
    }
  });

  it("changes with any one byte and with the order of words", () => {
    const prints = new Set([fingerprint(luma)]);
    for (let i = 0; i < luma.length; i++) {
      const other = luma.slice();
      other[i]! ^= 1;
      prints.add(fingerprint(other));
    }
    expect(prints.size).toBe(luma.length + 1);
    expect(fingerprint(Uint8Array.of(1, 0, 0, 0, 2, 0, 0, 0))).not.toBe(
      fingerprint(Uint8Array.of(2, 0, 0, 0, 1, 0, 0, 0)),
    );
  });
});

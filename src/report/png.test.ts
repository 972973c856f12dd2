import { unzlibSync } from "fflate";
import { describe, expect, it } from "vitest";
import { base64 } from "./base64.ts";
import { crc32, greyPng } from "./png.ts";
import { shrink } from "./shrink.ts";

/** Undoes the Paeth filter as the PNG standard describes it, written here anew. */
function unfiltered(width: number, height: number, filtered: Uint8Array): Uint8Array {
  const at = (x: number, y: number) => (x < 0 || y < 0 ? 0 : out[y * width + x]!);
  const out = new Uint8Array(width * height);
  for (let y = 0; y < height; y++) {
    expect(filtered[y * (width + 1)]).toBe(4);
    for (let x = 0; x < width; x++) {
      const [a, b, c] = [at(x - 1, y), at(x, y - 1), at(x - 1, y - 1)];
      const distances = [a, b, c].map((it) => Math.abs(a + b - c - it));
      const predictor = [a, b, c][distances.indexOf(Math.min(...distances))]!;
      out[y * width + x] = filtered[y * (width + 1) + 1 + x]! + predictor;
    }
  }
  return out;
}

describe("greyPng", () => {
  it("gives a PNG that holds the picture", () => {
    const [width, height] = [37, 11];
    const grey = Uint8Array.from({ length: width * height }, (_, i) => (i * i * 7 + (i % 13) * 19) & 255);
    const png = greyPng(width, height, grey);
    const view = new DataView(png.buffer);
    expect([...png.subarray(0, 8)]).toEqual([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a]);
    expect([view.getUint32(16), view.getUint32(20), png[24], png[25]]).toEqual([width, height, 8, 0]);
    const chunks: Record<string, Uint8Array> = {};
    for (let at = 8; at < png.length; ) {
      const length = view.getUint32(at);
      const body = png.subarray(at + 4, at + 8 + length);
      expect(view.getUint32(at + 8 + length)).toBe(crc32(body));
      chunks[String.fromCharCode(...body.subarray(0, 4))] = body.subarray(4);
      at += length + 12;
    }
    expect(Object.keys(chunks)).toEqual(["IHDR", "IDAT", "IEND"]);
    expect(unfiltered(width, height, unzlibSync(chunks.IDAT!))).toEqual(grey);
  });

  it("knows the published check value of its check sum (CRC-32 of the digits 1 to 9; from memory)", () => {
    expect(crc32(Uint8Array.from("123456789", (c) => c.charCodeAt(0)))).toBe(0xcbf43926);
  });
});

describe("base64", () => {
  it.each([
    ["", ""],
    ["f", "Zg=="],
    ["fo", "Zm8="],
    ["foo", "Zm9v"],
    ["foobar", "Zm9vYmFy"],
  ])("writes the test vectors of RFC 4648: %j", (text, encoded) => {
    expect(base64(Uint8Array.from(text, (c) => c.charCodeAt(0)))).toBe(encoded);
  });
});

describe("shrink", () => {
  it("takes the mean of the pixels that a new one covers", () => {
    const grey = Uint8Array.of(0, 100, 40, 60, 20, 80, 40, 60);
    expect(shrink({ width: 4, height: 2, grey }, 2)).toEqual({ width: 2, height: 1, grey: Uint8Array.of(50, 50) });
  });

  it("keeps the mean brightness at odd ratios, and leaves small pictures alone", () => {
    const picture = { width: 101, height: 53, grey: Uint8Array.from({ length: 101 * 53 }, (_, i) => i % 251) };
    const mean = (grey: Uint8Array) => grey.reduce((a, b) => a + b, 0) / grey.length;
    const small = shrink(picture, 37);
    expect([small.width, small.height]).toEqual([37, 19]);
    expect(Math.abs(mean(small.grey) - mean(picture.grey))).toBeLessThan(0.5);
    expect(shrink(picture, 101)).toEqual(picture);
  });
});

import { describe, expect, it } from "vitest";
import type { Bytes } from "../bytes.ts";
import { isoExtent } from "./iso-movie.ts";
import { matroskaCutShort } from "./matroska-end.ts";
import { riffExtent } from "./riff-extent.ts";

const text = (s: string) => [...s].map((c) => c.charCodeAt(0));
const u32 = (n: number) => [n >>> 24, (n >>> 16) & 255, (n >>> 8) & 255, n & 255];
const box = (type: string, size: number, present = size) => [
  ...u32(size),
  ...text(type),
  ...Array(present - 8).fill(0),
];

function file(...parts: number[][]): Bytes {
  const bytes = Uint8Array.from(parts.flat());
  return { size: bytes.length, read: async (at, length) => bytes.subarray(at, at + length) };
}

describe("an ISO base media file", () => {
  it("is whole when its last box is", async () => {
    expect(await isoExtent(file(box("ftyp", 16), box("moov", 32), box("mdat", 64)))).toEqual({
      cutShort: false,
      fragments: false,
    });
  });

  it("is cut short when its media or index ends early, not when a maker's own box does", async () => {
    expect(await isoExtent(file(box("ftyp", 16), box("mdat", 64, 40)))).toMatchObject({ cutShort: true });
    expect(await isoExtent(file(box("mdat", 64), box("moov", 64, 20)))).toMatchObject({ cutShort: true });
    expect(await isoExtent(file(box("mdat", 64), box("xtra", 64, 20)))).toMatchObject({ cutShort: false });
  });

  it("in fragments is known as such", async () => {
    expect(await isoExtent(file(box("moov", 16), box("moof", 16), box("mdat", 64, 20)))).toEqual({
      cutShort: true,
      fragments: true,
    });
  });
});

describe("a Matroska file", () => {
  const head = [0x1a, 0x45, 0xdf, 0xa3, 0x84, 0, 0, 0, 0, 0x18, 0x53, 0x80, 0x67];
  const media = Array(30).fill(0);

  it("is cut short when its segment is", async () => {
    expect(await matroskaCutShort(file(head, [0x80 | 30], media))).toBe(false);
    expect(await matroskaCutShort(file(head, [0x80 | 31], media))).toBe(true);
    expect(await matroskaCutShort(file(head, [0x40, 30], media))).toBe(false);
    expect(await matroskaCutShort(file(head, [0x40, 31], media))).toBe(true);
  });

  it("of unknown length can't tell", async () => {
    expect(await matroskaCutShort(file(head, [0xff], media))).toBe(false);
    expect(await matroskaCutShort(file(head, [0x01, 255, 255, 255, 255, 255, 255, 255], media))).toBe(false);
  });
});

describe("an AVI file", () => {
  const little = (n: number) => u32(n).reverse();
  const head = (size: number, frames: number) => [
    ...text("RIFF"),
    ...little(size),
    ...text("AVI LIST"),
    ...little(200),
    ...text("hdrlavih"),
    ...little(56),
    ...little(40_000),
    ...Array(12).fill(0),
    ...little(frames),
  ];

  it("says how many frames it means to have, and whether bytes are missing", async () => {
    expect(await riffExtent(file(head(44, 30)))).toEqual({ cutShort: false, frames: 30 });
    expect(await riffExtent(file(head(45, 30)))).toEqual({ cutShort: true, frames: 30 });
  });

  it("that was never closed says nothing", async () => {
    expect(await riffExtent(file(head(0, 0)))).toEqual({ cutShort: false, frames: null });
    expect(await riffExtent(file(text("RIFF")))).toEqual({ cutShort: false, frames: null });
  });
});

import { describe, expect, it } from "vitest";
import { containerName, sniffContainer } from "./sniff.ts";

const bytes = (...parts: (string | number[])[]) =>
  Uint8Array.from(parts.flatMap((part) => (typeof part === "string" ? [...part].map((c) => c.charCodeAt(0)) : part)));

describe("the first bytes", () => {
  it.each([
    ["mp4", "iso-bmff", bytes([0, 0, 0, 24], "ftypmp42")],
    ["mov", "iso-bmff", bytes([0, 0, 0, 20], "ftypqt  ")],
    ["mov", "iso-bmff", bytes([0, 0, 0, 8], "wide", [0, 0, 1, 0], "mdat")],
    ["3gp", "iso-bmff", bytes([0, 0, 0, 24], "ftyp3gp4")],
    ["webm", "matroska", bytes([0x1a, 0x45, 0xdf, 0xa3, 0x9f], "....B", [0x82], "webm")],
    ["mkv", "matroska", bytes([0x1a, 0x45, 0xdf, 0xa3, 0xa3], "....B", [0x82], "matroska")],
    ["avi", "avi", bytes("RIFF", [0, 1, 0, 0], "AVI LIST")],
    ["other", "other video", bytes([0x30, 0x26, 0xb2, 0x75, 0x8e, 0x66, 0xcf, 0x11])],
  ])("of %s tell its family, %s", (name, kind, head) => {
    expect(sniffContainer(head)).toBe(kind);
    expect(containerName(sniffContainer(head)!, head)).toBe(name);
  });

  it("of a transport stream repeat every packet", () => {
    const head = new Uint8Array(512);
    for (const at of [0, 188, 376]) head[at] = 0x47;
    expect(sniffContainer(head)).toBe("other video");
    head[188] = 0;
    expect(sniffContainer(head)).toBeNull();
  });

  it.each([
    ["text", bytes("Just some words, saved as swim.mp4")],
    ["a picture", bytes([0x89], "PNG\r\n")],
    ["sound in RIFF", bytes("RIFF", [0, 1, 0, 0], "WAVEfmt ")],
    ["nothing", new Uint8Array(0)],
  ])("of %s are those of no video", (_what, head) => {
    expect(sniffContainer(head)).toBeNull();
  });
});

import { closeSync, fstatSync, openSync, readSync, writeSync } from "node:fs";

/** Boxes that hold boxes on the way to a date, and boxes that hold one (ISO/IEC 14496-12). */
const holders = new Set(["moov", "trak", "mdia"]);
const dated = new Set(["mvhd", "tkhd", "mdhd"]);

/**
 * Sets every creation and modification date of an MP4 or QuickTime file to "not known" (zero), so that the same
 * pictures make the same bytes whenever they are written.
 */
export function forgetCreationTime(path: string): void {
  const file = openSync(path, "r+");
  try {
    walk(file, 0, fstatSync(file).size);
  } finally {
    closeSync(file);
  }
}

function walk(file: number, start: number, end: number): void {
  const head = Buffer.alloc(16);
  for (let at = start; at + 8 <= end; ) {
    readSync(file, head, 0, 16, at);
    const short = head.readUInt32BE(0);
    const type = head.toString("latin1", 4, 8);
    const header = short === 1 ? 16 : 8;
    const size = short === 1 ? Number(head.readBigUInt64BE(8)) : short === 0 ? end - at : short;
    if (size < header) throw new Error(`box ${type} at ${at} claims ${size} bytes`);
    if (holders.has(type)) walk(file, at + header, at + size);
    if (dated.has(type)) {
      readSync(file, head, 0, 1, at + header);
      const wide = head[0] === 1;
      writeSync(file, Buffer.alloc(wide ? 16 : 8), 0, wide ? 16 : 8, at + header + 4);
    }
    at += size;
  }
}

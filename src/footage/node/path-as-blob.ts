import { closeSync, openSync, readSync } from "node:fs";
import type { MountableFile } from "../wasm/core.ts";

/** A piece of a file on disk, read only when the core asks for its content. */
interface Piece {
  readonly path: string;
  readonly from: number;
  readonly size: number;
}

/** A file on disk that the core can mount as if it were a browser's Blob; nothing of it is held in memory. */
export function pathAsBlob(path: string, size: number): MountableFile {
  return { size, slice: (from, to): Piece => ({ path, from, size: Math.max(0, Math.min(to, size) - from) }) };
}

/** Stands in for the browser's FileReaderSync, for pieces of files on disk. Keeps the last file open between reads. */
export class FileReaderInNode {
  #open: { path: string; descriptor: number } | null = null;

  readAsArrayBuffer({ path, from, size }: Piece): ArrayBuffer {
    const bytes = new Uint8Array(size);
    const read = readSync(this.#descriptor(path), bytes, 0, size, from);
    return read === size ? bytes.buffer : bytes.buffer.slice(0, read);
  }

  #descriptor(path: string): number {
    if (this.#open?.path !== path) {
      if (this.#open) closeSync(this.#open.descriptor);
      this.#open = { path, descriptor: openSync(path, "r") };
    }
    return this.#open.descriptor;
  }
}

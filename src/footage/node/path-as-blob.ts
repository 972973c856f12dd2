import { closeSync, openSync, readSync } from "node:fs";
import type { MountableFile } from "../wasm/core.ts";

/** A piece of a file on disk, read only when the core asks for its content. */
interface Piece {
  readonly path: string;
  readonly from: number;
  readonly to: number;
}

/** A file on disk that the core can mount as if it were a browser's File; nothing of it is held in memory. */
export function pathAsBlob(path: string, name: string, size: number): MountableFile & { lastModifiedDate: Date } {
  return {
    name,
    size,
    // The core stores it as the time of its directory entry; nothing reads it.
    lastModifiedDate: new Date(0),
    slice: (from, to): Piece => ({ path, from, to: Math.min(to, size) }),
  };
}

/** Stands in for the browser's FileReaderSync, for pieces of files on disk. Keeps the last file open between reads. */
export class FileReaderInNode {
  #open: { path: string; descriptor: number } | null = null;

  readAsArrayBuffer({ path, from, to }: Piece): ArrayBuffer {
    const buffer = new ArrayBuffer(Math.max(0, to - from));
    const read = readSync(this.#descriptor(path), buffer as unknown as NodeJS.ArrayBufferView, 0, buffer.byteLength, from);
    return read === buffer.byteLength ? buffer : buffer.slice(0, read);
  }

  #descriptor(path: string): number {
    if (this.#open?.path !== path) {
      if (this.#open) closeSync(this.#open.descriptor);
      this.#open = { path, descriptor: openSync(path, "r") };
    }
    return this.#open.descriptor;
  }
}

import { closeSync, openSync, readSync } from "node:fs";
import type { MountableFile } from "../wasm/core.ts";

/** A file on disk that the core can mount as if it were a browser's Blob; nothing of it is held in memory. */
class PathAsBlob implements MountableFile {
  constructor(
    readonly path: string,
    readonly size: number,
  ) {}

  slice(from: number, to: number): Piece {
    return { file: this, from, size: Math.max(0, Math.min(to, this.size) - from) };
  }
}

/** A piece of a file on disk, read only when the core asks for its content. */
interface Piece {
  readonly file: PathAsBlob;
  readonly from: number;
  readonly size: number;
}

/** The file at a path for the core to mount. */
export const pathAsBlob = (path: string, size: number): MountableFile => new PathAsBlob(path, size);

/** Stands in for the browser's FileReaderSync, for pieces of files on disk. Keeps the last file open between reads. */
export class FileReaderInNode {
  #open: { file: PathAsBlob; descriptor: number } | null = null;

  readAsArrayBuffer({ file, from, size }: Piece): ArrayBuffer {
    const bytes = new Uint8Array(size);
    const read = readSync(this.#descriptor(file), bytes, 0, size, from);
    return read === size ? bytes.buffer : bytes.buffer.slice(0, read);
  }

  #descriptor(file: PathAsBlob): number {
    if (this.#open?.file !== file) {
      if (this.#open) closeSync(this.#open.descriptor);
      this.#open = { file, descriptor: openSync(file.path, "r") };
    }
    return this.#open.descriptor;
  }
}

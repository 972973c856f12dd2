import type { FileHandle } from "node:fs/promises";
import type { Bytes } from "../bytes.ts";

/** Bytes of an open file. */
export function bytesOfFile(handle: FileHandle, size: number): Bytes {
  return {
    size,
    async read(at, length) {
      const buffer = new Uint8Array(Math.max(0, Math.min(length, size - at)));
      const { bytesRead } = await handle.read(buffer, 0, buffer.length, at);
      return buffer.subarray(0, bytesRead);
    },
  };
}

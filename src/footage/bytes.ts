/** A recording as bytes that are fetched piece by piece, so that its length never matters. */
export interface Bytes {
  /** Length in bytes. */
  readonly size: number;
  /** Reads `length` bytes from `at` on; fewer when the recording ends earlier. */
  read(at: number, length: number): Promise<Uint8Array>;
}

/** Bytes of a picked file. */
export function bytesOfBlob(blob: Blob): Bytes {
  return {
    size: blob.size,
    read: async (at, length) => new Uint8Array(await blob.slice(at, at + length).arrayBuffer()),
  };
}

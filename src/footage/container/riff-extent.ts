import type { Bytes } from "../bytes.ts";

/** What the main header of an AVI file says, as far as it was ever filled in. */
export interface RiffExtent {
  /** Whether the file ends before its first chunk does. */
  readonly cutShort: boolean;
  /** Frames in all; null where the header doesn't say. */
  readonly frames: number | null;
}

/** Where the main header (`avih`) and its count of frames lie in every AVI file. */
const header_at = 24;
const frames_at = 48;

/** Reads how long an AVI file means to be. */
export async function riffExtent(bytes: Bytes): Promise<RiffExtent> {
  const head = await bytes.read(0, frames_at + 4);
  const view = new DataView(head.buffer, head.byteOffset, head.length);
  const cutShort = view.byteLength >= 8 && 8 + view.getUint32(4, true) > bytes.size;
  const known =
    view.byteLength >= frames_at + 4 && String.fromCharCode(...head.subarray(header_at, header_at + 4)) === "avih";
  return { cutShort, frames: (known && view.getUint32(frames_at, true)) || null };
}

import type { Bytes } from "../bytes.ts";

/** Whether an AVI file (RIFF) ends before its first chunk does. One of size 0 was never closed and can't tell. */
export async function riffCutShort(bytes: Bytes): Promise<boolean> {
  const head = await bytes.read(0, 8);
  return 8 + new DataView(head.buffer, head.byteOffset, head.length).getUint32(4, true) > bytes.size;
}

import type { Bytes } from "../bytes.ts";

const segmentId = 0x18538067;

/** An EBML number of variable length (RFC 8794): its value without the marker bit, or null when its size is "unknown". */
function variableInt(bytes: Uint8Array, at: number): { value: number | null; length: number } | null {
  const first = bytes[at];
  if (first === undefined || first === 0) return null;
  const length = Math.clz32(first) - 23;
  if (at + length > bytes.length) return null;
  let value = first & (0xff >> length);
  let unknown = value === 0xff >> length;
  for (let i = 1; i < length; i++) {
    unknown &&= bytes[at + i] === 0xff;
    value = value * 256 + bytes[at + i]!;
  }
  return { value: unknown ? null : value, length };
}

/**
 * Whether a Matroska or WebM file ends before its segment does (RFC 9559). A segment of unknown size, as live recorders
 * write, can't tell.
 */
export async function matroskaCutShort(bytes: Bytes): Promise<boolean> {
  const head = await bytes.read(0, 4096);
  const header = variableInt(head, 4);
  if (header === null || header.value === null) return false;
  const at = 4 + header.length + header.value;
  if (at + 12 > head.length || new DataView(head.buffer, head.byteOffset).getUint32(at) !== segmentId) return false;
  const size = variableInt(head, at + 4);
  return size !== null && size.value !== null && at + 4 + size.length + size.value > bytes.size;
}

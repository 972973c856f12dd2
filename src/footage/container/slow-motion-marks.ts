import type { Bytes } from "../bytes.ts";

const tail_bytes = 4096;
const directoryMark = "SEFT";
const marksEntry = "SlowMotion_Data";

/**
 * Whether a phone appended marks that tell its own player which parts to play slowly (a directory after the last box
 * that ends in `SEFT` and has an entry of that name). The stored times of such a recording are capture times.
 *
 * From open test recordings; no public description by the maker.
 */
export async function carriesSlowMotionMarks(bytes: Bytes): Promise<boolean> {
  const from = Math.max(0, bytes.size - tail_bytes);
  const tail = String.fromCharCode(...(await bytes.read(from, tail_bytes)));
  return tail.endsWith(directoryMark) && tail.includes(marksEntry);
}

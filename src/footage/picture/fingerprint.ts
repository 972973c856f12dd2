/**
 * A 32-bit fingerprint of a picture (FNV-1a over 4-byte words, then over the bytes left). Tells whether two decoders
 * gave the same picture; cheap beside decoding it.
 *
 * Fowler, Noll and Vo's hash with its 32-bit prime and offset basis.
 */
export function fingerprint(luma: Uint8Array): number {
  let hash = 0x811c9dc5;
  const aligned = luma.byteOffset % 4 === 0;
  const words = aligned ? new Int32Array(luma.buffer, luma.byteOffset, luma.length >> 2) : [];
  for (let i = 0; i < words.length; i++) hash = Math.imul(hash ^ words[i]!, 0x01000193);
  // Memory that is not aligned to words is read byte by byte into the same words.
  let at = words.length * 4;
  if (!aligned)
    for (; at + 4 <= luma.length; at += 4)
      hash = Math.imul(
        hash ^ (luma[at]! | (luma[at + 1]! << 8) | (luma[at + 2]! << 16) | (luma[at + 3]! << 24)),
        0x01000193,
      );
  for (; at < luma.length; at++) hash = Math.imul(hash ^ luma[at]!, 0x01000193);
  return hash >>> 0;
}

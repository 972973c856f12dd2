const prime = 0x01000193;
const offsetBasis = 0x811c9dc5;

/**
 * A 32-bit fingerprint of a picture, which tells whether two pictures are the same; cheap beside decoding one.
 *
 * Fowler, Noll and Vo's hash 1a (32-bit prime and offset basis) over 4-byte words instead of bytes, in four lanes that
 * the processor works on at a time, then over the lanes and the bytes left.
 */
export function fingerprint(luma: Uint8Array): number {
  const words = wordsOf(luma);
  const inLanes = words.length & ~3;
  let a = offsetBasis;
  let b = offsetBasis;
  let c = offsetBasis;
  let d = offsetBasis;
  for (let i = 0; i < inLanes; i += 4) {
    a = Math.imul(a ^ words[i]!, prime);
    b = Math.imul(b ^ words[i + 1]!, prime);
    c = Math.imul(c ^ words[i + 2]!, prime);
    d = Math.imul(d ^ words[i + 3]!, prime);
  }
  let hash = offsetBasis;
  for (const lane of [a, b, c, d]) hash = Math.imul(hash ^ lane, prime);
  for (let at = inLanes * 4; at < luma.length; at++) hash = Math.imul(hash ^ luma[at]!, prime);
  return hash >>> 0;
}

/** The bytes as whole words; copied first where they aren't aligned to words. */
function wordsOf(luma: Uint8Array): Int32Array {
  const { buffer, byteOffset } = luma.byteOffset % 4 === 0 ? luma : luma.slice();
  return new Int32Array(buffer, byteOffset, luma.length >> 2);
}

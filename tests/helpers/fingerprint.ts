/**
 * A fingerprint of luma, computed independently of the one the readers use: Adler's two sums (RFC 1950), 32 bits.
 */
export function fingerprint(luma: Uint8Array): number {
  let a = 1;
  let b = 0;
  for (const value of luma) {
    a = (a + value) % 65521;
    b = (b + a) % 65521;
  }
  return b * 65536 + a;
}

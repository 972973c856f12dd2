/**
 * The per-pixel work, behind one interface with two makers: WebAssembly SIMD and plain TypeScript. Both round every
 * step to single precision in the same order, so they agree bit for bit.
 *
 * Arrays passed in must come from the same object's `bytes` and `floats`; they live in one fixed memory.
 */
export interface Kernels {
  readonly kind: "simd" | "plain";
  /** Zero-filled memory for 8-bit planes. Throws when the memory that was asked for at creation is used up. */
  bytes(n: number): Uint8Array;
  /** Zero-filled memory for single-precision planes. */
  floats(n: number): Float32Array;
  /** out = (luma - (offset + gain * background)) * inverse. */
  whiten(
    luma: Uint8Array,
    background: Float32Array,
    inverse: Float32Array,
    out: Float32Array,
    gain: number,
    offset: number,
  ): void;
  /** The same from single-precision levels. `out` may be `level`. */
  whitenLevels(
    level: Float32Array,
    background: Float32Array,
    inverse: Float32Array,
    out: Float32Array,
    gain: number,
    offset: number,
  ): void;
  /** Mean of each 2 x 2 block, to a picture of half the size (an odd last row or column is dropped). */
  halve(luma: Uint8Array, out: Float32Array, width: number, height: number): void;
  /**
   * Separable symmetric filter; `taps[0]` is the middle. `between` and `out` are planes of the same size; a border of
   * taps.length - 1 pixels comes out as 0.
   */
  blur(
    src: Float32Array,
    between: Float32Array,
    out: Float32Array,
    width: number,
    height: number,
    taps: Float32Array,
  ): void;
  /**
   * Row-major indices of pixels whose value times `sign` exceeds `threshold` and is the greatest of its 3 x 3
   * neighbourhood (of equals the first). At most 65 536 are listed. The view is overwritten by the next call.
   */
  peaks(src: Float32Array, width: number, height: number, sign: 1 | -1, threshold: number): Int32Array;
  /**
   * Sorts a stack of 32 planes pixel by pixel: `middle` gets the mean of ranks `ranks.low` to `ranks.high` - 1,
   * `spread` the level at rank `ranks.upper` minus that at `ranks.lower`.
   */
  sortStack(planes: readonly Uint8Array[], ranks: Ranks, middle: Float32Array, spread: Float32Array): void;
  /** Picture moved by (dx, dy), bilinear: out(x, y) = src(x - dx, y - dy), edge pixels repeated. */
  shifted(src: Float32Array, out: Float32Array, width: number, height: number, dx: number, dy: number): void;
}

/** Ranks in a sorted stack of 32. */
export interface Ranks {
  readonly low: number;
  readonly high: number;
  readonly lower: number;
  readonly upper: number;
}

/** Planes in a stack that {@link Kernels.sortStack} sorts. */
export const stackSize = 32;

/** Most peaks one call lists. */
export const mostPeaks = 65_536;

/**
 * Comparators of Batcher's odd-even merge sort for 32 inputs (K. E. Batcher 1968, "Sorting networks and their
 * applications"), as pairs (a, b) with a < b: after all of them in order the inputs are sorted.
 */
export function sortingNetwork(): Uint8Array {
  const pairs: number[] = [];
  for (let p = 1; p < stackSize; p *= 2) {
    for (let k = p; k >= 1; k /= 2) {
      for (let j = k % p; j + k < stackSize; j += 2 * k) {
        for (let i = 0; i < k && i + j + k < stackSize; i++) {
          if (Math.floor((i + j) / (2 * p)) === Math.floor((i + j + k) / (2 * p))) pairs.push(i + j, i + j + k);
        }
      }
    }
  }
  return Uint8Array.from(pairs);
}

import { type Random, seededRandom } from "../quantities/index.ts";

/**
 * A uniform source of its own for one concern, named by `path` (for example "motion", 7), so that drawing more for
 * one concern never reshuffles another. Names are folded into the seed by FNV-1a (Fowler, Noll and Vo).
 */
export function stream(seed: number, ...path: readonly (string | number)[]): Random {
  let h = 0x811c9dc5 ^ (seed >>> 0);
  for (const part of path) {
    for (const c of `${part}/`) h = Math.imul(h ^ c.charCodeAt(0), 0x01000193);
  }
  return seededRandom(h >>> 0);
}

/** A source of standard normal numbers (mean 0, standard deviation 1). */
export type Normal = () => number;

/** Standard normal numbers from uniform ones by the polar method (Marsaglia and Bray 1964, SIAM Review 6, 260). */
export function normals(random: Random): Normal {
  let spare = Number.NaN;
  return () => {
    if (!Number.isNaN(spare)) {
      const kept = spare;
      spare = Number.NaN;
      return kept;
    }
    let u: number;
    let v: number;
    let s: number;
    do {
      u = 2 * random() - 1;
      v = 2 * random() - 1;
      s = u * u + v * v;
    } while (s >= 1 || s === 0);
    const f = Math.sqrt((-2 * Math.log(s)) / s);
    spare = v * f;
    return u * f;
  };
}

/** A lognormal number with the given mean and coefficient of variation (of the number itself, not of its logarithm). */
export function logNormal(mean: number, cv: number, normal: Normal): number {
  if (cv === 0) return mean;
  const variance = Math.log(1 + cv * cv);
  return mean * Math.exp(Math.sqrt(variance) * normal() - variance / 2);
}

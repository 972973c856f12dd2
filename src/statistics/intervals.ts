import tQuantile from "@stdlib/stats-base-dists-t-quantile";
import type { Interval } from "../quantities/index.ts";

/** 97.5 % point of the normal distribution. */
export const z975 = 1.959963984540054;

/** 97.5 % point of Student's t with `freedom` degrees of freedom. Source: Student 1908, Biometrika 6, 1. */
export function t975(freedom: number): number {
  return tQuantile(0.975, freedom);
}

/**
 * 95 % score interval of a proportion, which holds its level at 0 and at n where the simple interval has no width.
 * Source: E. B. Wilson 1927, J. Am. Stat. Assoc. 22, 209.
 */
export function wilsonInterval(successes: number, n: number): Interval {
  const z2 = z975 * z975;
  const p = successes / n;
  const middle = (p + z2 / (2 * n)) / (1 + z2 / n);
  const half = (z975 * Math.sqrt((p * (1 - p)) / n + z2 / (4 * n * n))) / (1 + z2 / n);
  // Exactly 0 and 1 at the ends, where middle and half are equal but for rounding.
  return [successes === 0 ? 0 : Math.max(0, middle - half), successes === n ? 1 : Math.min(1, middle + half)];
}

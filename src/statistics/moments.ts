/** Arithmetic mean. NaN for no values: callers must not ask. */
export function mean(values: readonly number[]): number {
  return values.reduce((sum, v) => sum + v, 0) / values.length;
}

/** Standard deviation with n − 1. NaN for fewer than two values: callers must not ask. */
export function standardDeviation(values: readonly number[]): number {
  const m = mean(values);
  return Math.sqrt(values.reduce((sum, v) => sum + (v - m) ** 2, 0) / (values.length - 1));
}

/** Quantile by linear interpolation of order statistics (type 7 of Hyndman and Fan 1996, Am. Stat. 50, 361). */
export function quantile(values: readonly number[], p: number): number {
  const sorted = [...values].sort((a, b) => a - b);
  const at = p * (sorted.length - 1);
  const low = Math.floor(at);
  const high = Math.min(low + 1, sorted.length - 1);
  return (sorted[low] as number) + (at - low) * ((sorted[high] as number) - (sorted[low] as number));
}

/** Median, the mean of the middle two for an even number. */
export function median(values: readonly number[]): number {
  return quantile(values, 0.5);
}

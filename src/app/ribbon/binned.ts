/** Mean count over some frames in a row, at their mean time. */
export interface Bin {
  readonly t_s: number;
  readonly mean: number;
}

/** Counts a frame, brought down to at most `most` bins of equally many frames (the last may have fewer). */
export function binned(counts: ArrayLike<number>, times_s: ArrayLike<number>, most: number): Bin[] {
  const each = Math.max(1, Math.ceil(counts.length / most));
  const bins: Bin[] = [];
  for (let start = 0; start < counts.length; start += each) {
    const end = Math.min(counts.length, start + each);
    let count = 0;
    let t_s = 0;
    for (let frame = start; frame < end; frame++) {
      count += counts[frame]!;
      t_s += times_s[frame]!;
    }
    bins.push({ t_s: t_s / (end - start), mean: count / (end - start) });
  }
  return bins;
}

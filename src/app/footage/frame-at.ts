/** Index of the last frame whose time is not after `t_s`; 0 before the first. Times rise. */
export function frameAt(times_s: ArrayLike<number>, t_s: number): number {
  let low = 0;
  let high = times_s.length - 1;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if (times_s[middle]! <= t_s) low = middle;
    else high = middle - 1;
  }
  return Math.max(0, low);
}

/** Index of the frame whose time is nearest to `t_s`. Times rise. */
export function nearestFrame(times_s: ArrayLike<number>, t_s: number): number {
  const before = frameAt(times_s, t_s);
  const after = times_s[before + 1];
  return after !== undefined && after - t_s < t_s - times_s[before]! ? before + 1 : before;
}

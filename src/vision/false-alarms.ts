/**
 * Expected number of maxima above a threshold in smooth normal noise: the Euler characteristic density of a
 * two-dimensional normal field (R. J. Adler 1981, "The Geometry of Random Fields"),
 *
 *     N(t) = area · λ · (2π)^(-3/2) · t · exp(-t²/2),   λ = 1/(2σ²) for white noise smoothed with a Gaussian of σ.
 */
export function expectedFalseAlarms(threshold: number, area_px2: number, smoothing_px: number): number {
  const lambda = 1 / (2 * smoothing_px * smoothing_px);
  return area_px2 * lambda * 0.06349363593424097 * threshold * Math.exp((-threshold * threshold) / 2);
}

/** The threshold, in standard deviations, at which `rate` false alarms are expected in the area. At least 3. */
export function thresholdFor(rate: number, area_px2: number, smoothing_px: number): number {
  let low = 3;
  let high = 12;
  for (let i = 0; i < 50; i++) {
    const middle = (low + high) / 2;
    if (expectedFalseAlarms(middle, area_px2, smoothing_px) > rate) low = middle;
    else high = middle;
  }
  return high;
}

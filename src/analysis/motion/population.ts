import type { Figure, Scale, SpeedFinding } from "../../quantities/index.ts";
import { mean, median, standardDeviation, t975, wilsonInterval, z975 } from "../../statistics/index.ts";

/**
 * Speed over cells: mean with a 95 % interval from Student's t over cells (each cell once), widened in micrometres by the
 * uncertainty of the scale; share of motile cells with Wilson's interval.
 *
 * @param speeds_px_s speed of every motile cell that counts
 * @param judged cells followed long enough that motile or not could be told
 */
export function speedFinding(
  speeds_px_s: readonly number[],
  judged: { readonly n: number; readonly motile: number },
  scale: Scale | null,
): SpeedFinding {
  const n = speeds_px_s.length;
  const inPixels = n >= 2 ? meanFigure(speeds_px_s) : null;
  return {
    mean_px_s: inPixels,
    mean_um_s: inPixels && scale ? inMicrometres(inPixels, scale) : null,
    median_px_s: n > 0 ? median(speeds_px_s) : null,
    sd_px_s: n >= 2 ? standardDeviation(speeds_px_s) : null,
    n_cells: n,
    n_judged: judged.n,
    motile_fraction: judged.n > 0 ? judged.motile / judged.n : null,
    ci95_motile_fraction: judged.n > 0 ? wilsonInterval(judged.motile, judged.n) : null,
  };
}

function meanFigure(values: readonly number[]): Figure {
  const value = mean(values);
  const standardError = standardDeviation(values) / Math.sqrt(values.length);
  const half = t975(values.length - 1) * standardError;
  return { value, standardError, ci95: [value - half, value + half], n: values.length };
}

function inMicrometres(px: Figure, scale: Scale): Figure {
  const value = px.value * scale.um_per_px;
  const ofScale = px.value * scale.uncertainty_um_per_px;
  const ofCells = px.standardError * scale.um_per_px;
  const half = Math.sqrt((t975(px.n - 1) * ofCells) ** 2 + (z975 * ofScale) ** 2);
  return {
    value,
    standardError: Math.sqrt(ofCells ** 2 + ofScale ** 2),
    ci95: [value - half, value + half],
    n: px.n,
  };
}

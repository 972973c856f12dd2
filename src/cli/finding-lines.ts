import type { Figure, MeasuredTrial } from "../quantities/index.ts";

/** The findings in a few lines of plain words. */
export function findingLines({ speed, drift, scale, paths, source }: MeasuredTrial): string[] {
  const unit = scale ? "µm/s" : "px/s";
  const lines = [`${source.frames} frames over ${source.duration_s.toFixed(2)} s, ${paths.count} paths.`];
  if (!speed) return lines;
  const mean = scale ? speed.mean_um_s : speed.mean_px_s;
  if (mean) lines.push(`Speed ${withInterval(mean)} ${unit}, ${speed.n_cells} motile cells.`);
  else if (speed.n_judged === 0) lines.push("No motile cell: none was followed long enough to tell.");
  else if (speed.n_cells === 0) lines.push("No motile cell.");
  else lines.push(`${speed.n_cells} motile cell: no mean.`);
  if (speed.motile_fraction !== null && speed.ci95_motile_fraction) {
    const [low, high] = speed.ci95_motile_fraction.map((v) => (100 * v).toFixed(0));
    lines.push(
      `Motile ${(100 * speed.motile_fraction).toFixed(0)} % (95 % interval ${low} to ${high} %) of ${speed.n_judged} cells followed long enough.`,
    );
  }
  if (drift) {
    const k = scale?.um_per_px ?? 1;
    const [vx, vy] = drift.velocity_px_s.map((v) => (v * k).toFixed(2));
    lines.push(`Flow ${vx} ${unit} to the right, ${vy} ${unit} up, from ${drift.n_cells} ${drift.from}.`);
  }
  return lines;
}

function withInterval({ value, ci95 }: Figure): string {
  return `${value.toFixed(2)} (95 % interval ${ci95[0].toFixed(2)} to ${ci95[1].toFixed(2)})`;
}

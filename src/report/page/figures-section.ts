import type { Figure, Interval, MeasuredTrial } from "../../quantities/index.ts";
import { type Markup, markup } from "../markup.ts";
import { readable, readableAlone } from "../numbers.ts";
import { many, range, share, shareRange } from "./words.ts";

interface Row {
  readonly name: string;
  readonly figure: string;
  readonly interval: string;
  readonly behind: string;
}

/** The table of figures: each with its interval and what stands behind it. */
export function figuresSection(measured: MeasuredTrial): Markup {
  const rows = [...speedRows(measured), ...driftRows(measured)];
  if (rows.length === 0) return markup``;
  return markup`<section><h2>Figures</h2><div class="scroll" tabindex="0" role="region" aria-label="Figures"><table><thead><tr><th scope="col">Figure</th><th scope="col" class="number">Value</th><th scope="col" class="number">95\u00a0% interval</th><th scope="col">From</th></tr></thead><tbody>${rows.map(
    (row) =>
      markup`<tr><th scope="row">${row.name}</th><td class="number figure">${row.figure}</td><td class="number">${row.interval}</td><td>${row.behind}</td></tr>`,
  )}</tbody></table></div><p class="note">Speeds are in the image plane. The intervals hold for the cells of this one trial; to compare strains, compare independent cultures.</p></section>`;
}

function speedRows({ speed, scale }: MeasuredTrial): Row[] {
  if (!speed) return [];
  const unit = scale ? "µm/s" : "px/s";
  const mean = scale ? speed.mean_um_s : speed.mean_px_s;
  const factor = scale?.um_per_px ?? 1;
  const half = mean ? halfWidth(mean) : null;
  const rows: Row[] = [];
  const swimmers = many(speed.n_cells, "motile cell", "motile cells");
  if (mean) {
    const interval = mean.n > 1 ? `${range(mean.ci95)} ${unit}` : "needs more cells";
    rows.push({
      name: "Mean speed",
      figure: `${readable(mean.value, half)} ${unit}`,
      interval,
      behind: `${swimmers} followed for 0.5 s or more`,
    });
  }
  for (const [name, value] of [
    ["Median speed", speed.median_px_s],
    ["Spread between cells (SD)", speed.sd_px_s],
  ] as const) {
    if (value !== null)
      rows.push({ name, figure: `${readable(value * factor, half)} ${unit}`, interval: "", behind: swimmers });
  }
  if (speed.motile_fraction !== null) {
    rows.push({
      name: "Motile share",
      figure: share(speed.motile_fraction),
      interval: speed.ci95_motile_fraction ? shareRange(speed.ci95_motile_fraction) : "",
      behind: many(speed.n_judged, "cell that could be judged", "cells that could be judged"),
    });
  }
  return rows;
}

function driftRows({ drift, scale }: MeasuredTrial): Row[] {
  if (!drift) return [];
  const unit = scale ? "µm/s" : "px/s";
  const factor = scale?.um_per_px ?? 1;
  const cells =
    drift.from === "diffusing cells" ? ["diffusing cell", "diffusing cells"] : ["turning swimmer", "turning swimmers"];
  const behind = many(drift.n_cells, cells[0]!, cells[1]!);
  return (["to the right", "upwards"] as const).map((direction, axis) => {
    const [low, high] = drift.ci95_px_s[axis]!;
    const ci95: Interval = [low * factor, high * factor];
    const figure = `${readable(drift.velocity_px_s[axis]! * factor, (ci95[1] - ci95[0]) / 2)} ${unit}`;
    return { name: `Flow ${direction}`, figure, interval: `${range(ci95)} ${unit}`, behind };
  });
}

function halfWidth(figure: Figure): number | null {
  const half = (figure.ci95[1] - figure.ci95[0]) / 2;
  return half > 0 ? half : null;
}

/** A number with its unit, or `not known`. */
export function withUnit(value: number | null, unit: string): string {
  return value === null ? "not known" : `${readableAlone(value)}${unit ? ` ${unit}` : ""}`;
}

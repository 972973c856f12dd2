import type { MeasuredTrial } from "../../quantities/index.ts";
import { countCells } from "../cell-counts.ts";
import { type Markup, markup } from "../markup.ts";
import { readable, readableAlone } from "../numbers.ts";
import { many, range, shareRange } from "./words.ts";

/** The finding of the trial in one or two plain sentences: the main figure, its interval and n; or that nothing swam. */
export function verdict(measured: MeasuredTrial): Markup {
  const { speed, scale, cells } = measured;
  const counts = countCells(cells);
  if (counts.paths === 0) return markup`No cells were found.`;
  const judged = speed?.n_judged ?? counts.motile + counts.notMotile;
  if (judged === 0) {
    return markup`No cell could be judged: ${many(counts.paths, "path is", "paths are")} too short to tell swimming from diffusion.`;
  }
  if (counts.motile === 0) {
    const interval = speed?.ci95_motile_fraction;
    const bound = interval ? ` The motile share is ${shareRange(interval)} (95\u00a0% interval).` : "";
    const which =
      judged === 1
        ? "the one cell that could be judged did not move"
        : `none of the ${judged} cells that could be judged moved`;
    return markup`<b>No motile cells:</b> ${which} more than diffusion and flow explain.${bound}`;
  }
  const mean = scale ? speed?.mean_um_s : speed?.mean_px_s;
  const unit = scale ? "µm/s" : "px/s";
  const swimmers = many(speed?.n_cells ?? 0, "motile cell", "motile cells");
  if (!mean) {
    return markup`${many(counts.motile, "cell is", "cells are")} motile, too few or followed too briefly for a mean speed.`;
  }
  const half = (mean.ci95[1] - mean.ci95[0]) / 2;
  if (mean.n < 2 || half <= 0) {
    return markup`${swimmers} swam at <b>${readableAlone(mean.value)} ${unit}</b>; an interval needs more cells.`;
  }
  return markup`${swimmers} swam at <b>${readable(mean.value, half)} ${unit}</b> on average (95\u00a0% interval ${range(mean.ci95)} ${unit}).`;
}

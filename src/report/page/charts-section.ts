import type { MeasuredTrial } from "../../quantities/index.ts";
import { durationChart, pathsChart, speedChart } from "../charts/index.ts";
import { type Markup, markup } from "../markup.ts";

/** The charts: speeds, paths over the background, speed against the time a cell was followed. */
export function chartsSection(measured: MeasuredTrial): Markup {
  const { scale, speed, cells } = measured;
  const factor = scale?.um_per_px ?? 1;
  const unit = scale ? "µm/s" : "px/s";
  const mean = (scale ? speed?.mean_um_s : speed?.mean_px_s) ?? null;
  const centre = { mean: mean?.value ?? null, ci95: mean && mean.n > 1 ? mean.ci95 : null, unit };
  const counted = cells.filter((cell) => cell.kept && cell.motile && cell.speed_px_s !== null);
  const points = counted.map((cell) => ({
    duration_s: cell.last_t_s - cell.first_t_s,
    speed: cell.speed_px_s! * factor,
    speedSe: cell.speedSe_px_s === null ? null : cell.speedSe_px_s * factor,
  }));
  return markup`<section><h2>Evidence</h2>${
    points.length > 0 &&
    markup`<figure>${speedChart({ speeds: points.map((point) => point.speed), ...centre })}<figcaption>Speed of every cell that counts, one dot a cell. Above them the mean; the band is its 95\u00a0% interval.</figcaption></figure>`
  }${pathsFigure(measured)}${
    points.length > 1 &&
    markup`<figure>${durationChart({ points, ...centre })}<figcaption>Speed against the time a cell was followed, with ± one standard error. Dotted line and band: the mean and its 95\u00a0% interval. A trend would mean that cells which stay in view are not like those that leave it.</figcaption></figure>`
  }</section>`;
}

function pathsFigure(measured: MeasuredTrial): Markup {
  const { chart, shown, of } = pathsChart(measured);
  const which =
    shown < of
      ? `${shown} of ${of} paths, evenly through the recording`
      : shown === 1
        ? "The one path"
        : `All ${of} paths`;
  const caption =
    shown === 0
      ? "The still background. No path was found."
      : `${which}, over the still background; camera shake removed.`;
  return markup`<figure class="paths-figure">${shown > 0 && key}<div class="frame">${chart}</div><figcaption>${caption}${
    measured.view.circle && " The dashed circle is the edge of the lit field; nothing outside it is taken for a cell."
  }</figcaption></figure>`;
}

const key = markup`<ul class="key"><li>${stroke("lw-motile", true)}motile, dot where last seen</li><li>${stroke("lw-still", false)}not motile</li><li>${stroke("lw-unsure", false)}can’t be told</li></ul>`;

function stroke(kind: string, head: boolean): Markup {
  return markup`<svg viewBox="0 0 36 14" aria-hidden="true"><path class="lw-path lw-casing" d="M4 7H32"/><path class="lw-path ${kind}" d="M4 7H32"/>${head && markup`<circle class="lw-head" cx="31" cy="7" r="2.8"/>`}</svg>`;
}

import { type MeasuredTrial, rowsOf } from "../../quantities/index.ts";
import { base64 } from "../base64.ts";
import { type Markup, markup } from "../markup.ts";
import { greyPng } from "../png.ts";
import { shrink } from "../shrink.ts";
import { place } from "./axis.ts";

const maxWidth = 720;
const maxPaths = 300;
/** Points nearer than this to the last one drawn are left out, picture units of the chart. */
const minStep = 1.5;

/** A paths chart, and how many of the paths it shows. */
export interface PathsChart {
  readonly chart: Markup;
  readonly shown: number;
  readonly of: number;
}

/**
 * Paths over the still background, shake removed, as an SVG element with the picture inside it: motile cells solid
 * with a dot where each was last seen, others dotted, undecided ones dashed; a scale bar when there is a scale.
 */
export function pathsChart(measured: MeasuredTrial): PathsChart {
  const { view, paths, cells, scale } = measured;
  const small = shrink({ width: view.width, height: view.height, grey: view.background }, maxWidth);
  const zoom = Math.min(1, maxWidth / view.width);
  const width = view.width * zoom;
  const height = view.height * zoom;
  const picture = base64(greyPng(small.width, small.height, small.grey));
  const chosen = choose(paths.count);
  // Motile paths last, so that they lie on top.
  const rank = (p: number) => Number(cells[p]?.motile ?? false);
  const drawn = [...chosen].sort((a, b) => rank(a) - rank(b) || a - b).map((p) => onePath(measured, p, zoom));
  const circle =
    view.circle &&
    markup`<circle class="lw-circle" cx="${place((view.circle.x + 0.5) * zoom)}" cy="${place((view.circle.y + 0.5) * zoom)}" r="${place(view.circle.radius * zoom)}"/>`;
  const chart = markup`<svg class="lw-chart" viewBox="0 0 ${place(width)} ${place(height)}" role="img" aria-label="Paths of ${chosen.length} cells over the still background."><image href="data:image/png;base64,${picture}" width="${place(width)}" height="${place(height)}" preserveAspectRatio="none"/>${circle}${drawn}${
    scale && scaleBar(scale.um_per_px / zoom, width, height)
  }</svg>`;
  return { chart, shown: chosen.length, of: paths.count };
}

/** Indices of at most {@link maxPaths} paths, evenly through the table, which is in order of appearance. */
function choose(count: number): number[] {
  const shown = Math.min(count, maxPaths);
  return Array.from({ length: shown }, (_, i) => Math.floor((i * count) / shown));
}

function onePath({ paths, cells }: MeasuredTrial, p: number, zoom: number): Markup | null {
  const [first, end] = rowsOf(paths, p);
  if (end <= first) return null;
  let x = (paths.x_px[first]! + 0.5) * zoom;
  let y = (paths.y_px[first]! + 0.5) * zoom;
  let line = `M${tenth(x)} ${tenth(y)}`;
  for (let row = first + 1; row < end; row++) {
    const nextX = (paths.x_px[row]! + 0.5) * zoom;
    const nextY = (paths.y_px[row]! + 0.5) * zoom;
    if (row < end - 1 && (nextX - x) ** 2 + (nextY - y) ** 2 < minStep ** 2) continue;
    x = nextX;
    y = nextY;
    line += `L${tenth(x)} ${tenth(y)}`;
  }
  const motile = cells[p]?.motile ?? null;
  const kind = motile === null ? "lw-unsure" : motile ? "lw-motile" : "lw-still";
  const head = motile && markup`<circle class="lw-head" cx="${tenth(x)}" cy="${tenth(y)}" r="2.6"/>`;
  return markup`<path class="lw-path lw-casing" d="${line}"/><path class="lw-path ${kind}" d="${line}"/>${head}`;
}

function tenth(value: number): string {
  return String(Math.round(value * 10) / 10 + 0);
}

/** A bar of a round length, about a sixth of the picture wide, on a dark plate in the lower right corner. */
function scaleBar(um_per_unit: number, width: number, height: number): Markup {
  const length_um = roundLength((width / 6) * um_per_unit);
  const length = length_um / um_per_unit;
  const plate = Math.max(length, 58) + 24;
  const x = width - plate - 10;
  const middle = x + plate / 2;
  return markup`<g><rect class="lw-plate" x="${place(x)}" y="${place(height - 48)}" width="${place(plate)}" height="38" rx="4"/><line class="lw-scale-bar" x1="${place(middle - length / 2)}" x2="${place(middle + length / 2)}" y1="${place(height - 19)}" y2="${place(height - 19)}"/><text class="lw-on-picture" x="${place(middle)}" y="${place(height - 29)}" text-anchor="middle">${String(length_um)} µm</text></g>`;
}

/** The largest of 1, 2, 5 × a power of ten that is not above `length`. */
export function roundLength(length: number): number {
  const power = Number(length.toExponential().split("e")[1]);
  const digit = [5, 2, 1].find((d) => Number(`${d}e${power}`) <= length) ?? 1;
  return Number(`${digit}e${power}`);
}

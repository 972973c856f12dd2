import { max, scaleLinear } from "d3";
import type { Interval } from "../../quantities/index.ts";
import { type Markup, markup } from "../markup.ts";
import { axisBelow, axisLeft, place } from "./axis.ts";

/** One cell: how long it was followed, how fast it was, and the standard error of that. */
export interface DurationPoint {
  readonly duration_s: number;
  readonly speed: number;
  readonly speedSe: number | null;
}

/** What the duration chart shows. Speeds in `unit`. */
export interface DurationChartInput {
  readonly points: readonly DurationPoint[];
  readonly mean: number | null;
  readonly ci95: Interval | null;
  readonly unit: string;
}

const width = 720;
const height = 300;
const left = 48;
const right = width - 20;
const top = 34;
const bottom = 252;

/**
 * Each cell's speed against the time it was followed, with ± one standard error, over the mean's 95 % interval, as an
 * SVG element. A slope here means that cells which are easily followed differ from the rest.
 */
export function durationChart({ points, mean, ci95, unit }: DurationChartInput): Markup {
  const x = scaleLinear([0, Math.max(max(points, (p) => p.duration_s) ?? 0, 1e-9)], [left, right]).nice(8);
  const highest = max(points, (p) => p.speed + (p.speedSe ?? 0)) ?? 0;
  const y = scaleLinear([0, Math.max(highest, 1e-9)], [bottom, top]).nice(5);
  const bars = points
    .filter((p) => p.speedSe !== null)
    .map((p) => {
      const at = place(x(p.duration_s));
      const ends = [p.speed + p.speedSe!, Math.max(0, p.speed - p.speedSe!)].map((value) => place(y(value)));
      return markup`<line class="lw-bar" x1="${at}" x2="${at}" y1="${ends[0]!}" y2="${ends[1]!}"/>`;
    });
  const dots = points.map(
    (p) => markup`<circle class="lw-dot" cx="${place(x(p.duration_s))}" cy="${place(y(p.speed))}" r="3.2"/>`,
  );
  const band =
    ci95 &&
    markup`<rect class="lw-mean-band" x="${left}" width="${right - left}" y="${place(y(ci95[1]))}" height="${place(Math.max(0.5, y(Math.max(0, ci95[0])) - y(ci95[1])))}"/>`;
  const line =
    mean === null
      ? null
      : markup`<line class="lw-mean-line" x1="${left}" x2="${right}" y1="${place(y(mean))}" y2="${place(y(mean))}"/>`;
  return markup`<svg class="lw-chart" viewBox="0 0 ${width} ${height}" role="img" aria-label="Speed of ${points.length} cells against the time each was followed.">${axisLeft(y, left, right, `speed (${unit})`)}${band}${line}${bars}${dots}${axisBelow(x, bottom, "time followed (s)", 8)}</svg>`;
}

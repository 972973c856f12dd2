import { max, scaleLinear } from "d3";
import type { Interval } from "../../quantities/index.ts";
import { type Markup, markup } from "../markup.ts";
import { readable, readableAlone } from "../numbers.ts";
import { axisBelow, place } from "./axis.ts";
import { fittingSwarm } from "./beeswarm.ts";

/** What the speed chart shows. Speeds in `unit`, one a cell. */
export interface SpeedChartInput {
  readonly speeds: readonly number[];
  readonly mean: number | null;
  readonly ci95: Interval | null;
  readonly unit: string;
}

const width = 720;
const height = 232;
const left = 16;
const right = width - 24;
const middle = 112;
const room = 64;

/**
 * Every cell's speed as a faint dot, the mean and its 95 % interval drawn firmly beneath the swarm, as an SVG element.
 * Colours come from {@link chartStyle}'s variables. An empty list gives an empty axis.
 */
export function speedChart({ speeds, mean, ci95, unit }: SpeedChartInput): Markup {
  const end = Math.max(max(speeds) ?? 0, ci95?.[1] ?? 0, 1e-9);
  const scale = scaleLinear([0, end], [left, right]).nice(7);
  const { radius, dots } = fittingSwarm(
    speeds.map((speed) => scale(speed)),
    [5, 4, 3.2, 2.5, 2, 1.5, 1],
    room,
  );
  const swarm = dots.map(
    (dot) => markup`<circle class="lw-dot" cx="${place(dot.along)}" cy="${place(middle + dot.aside)}" r="${radius}"/>`,
  );
  const title =
    mean === null
      ? `Speeds of ${speeds.length} cells, in ${unit}.`
      : `Speeds of ${speeds.length} cells, in ${unit}; the mean is ${readableAlone(mean)}.`;
  return markup`<svg class="lw-chart" viewBox="0 0 ${width} ${height}" role="img" aria-label="${title}">${
    mean !== null && ci95 !== null ? meanMarks(mean, ci95, scale, unit) : null
  }${swarm}${axisBelow(scale, 186, `speed of each cell (${unit})`)}</svg>`;
}

function meanMarks(mean: number, ci95: Interval, scale: (value: number) => number, unit: string): Markup {
  const [low, high] = ci95.map((value) => scale(Math.max(0, value))) as [number, number];
  const x = scale(mean);
  const half = (ci95[1] - ci95[0]) / 2;
  const text = `mean ${readable(mean, half)} ${unit}`;
  const anchor = x < 110 ? "start" : x > width - 110 ? "end" : "middle";
  const top = 30;
  return markup`<rect class="lw-mean-band" x="${place(low)}" width="${place(Math.max(0.5, high - low))}" y="${top}" height="${186 - top}"/><line class="lw-interval" x1="${place(low)}" x2="${place(high)}" y1="${top}" y2="${top}"/><circle class="lw-mean" cx="${place(x)}" cy="${top}" r="5.5"/><text class="lw-mean-text" x="${place(anchor === "middle" ? x : anchor === "start" ? low : high)}" y="${top - 13}" text-anchor="${anchor}">${text}</text>`;
}

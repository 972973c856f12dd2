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
const left = 16;
const right = width - 24;
const meanAt = 32;
/** Widest the swarm may be to either side. */
const room = 76;

/**
 * Every cell's speed as a faint dot, the mean and its 95 % interval drawn firmly beneath the swarm, as an SVG element.
 * Colours come from {@link chartStyle}'s variables. An empty list gives an empty axis.
 */
export function speedChart({ speeds, mean, ci95, unit }: SpeedChartInput): Markup {
  const end = Math.max(max(speeds) ?? 0, ci95?.[1] ?? 0, 1e-9);
  const scale = scaleLinear([0, end], [left, right]).nice(7);
  const { radius, dots } = fittingSwarm(
    speeds.map((speed) => scale(speed)),
    [6, 5, 4, 3.2, 2.5, 2, 1.5, 1],
    room,
  );
  const reach = Math.max(18, ...dots.map((dot) => Math.abs(dot.aside) + radius));
  const middle = meanAt + 16 + reach;
  const bottom = middle + reach + 12;
  const swarm = dots.map(
    (dot) => markup`<circle class="lw-dot" cx="${place(dot.along)}" cy="${place(middle + dot.aside)}" r="${radius}"/>`,
  );
  const title =
    mean === null
      ? `Speeds of ${speeds.length} cells, in ${unit}.`
      : `Speeds of ${speeds.length} cells, in ${unit}; the mean is ${readableAlone(mean)}.`;
  const marks = mean !== null && ci95 !== null && meanMarks(mean, ci95, scale, unit, bottom);
  return markup`<svg class="lw-chart" viewBox="0 0 ${width} ${place(bottom + 46)}" role="img" aria-label="${title}">${marks}${swarm}${axisBelow(scale, bottom, `speed of each cell (${unit})`)}</svg>`;
}

/** The mean as a dot and its interval as a bar above the swarm, a band of the interval's width down to the axis. */
function meanMarks(
  mean: number,
  ci95: Interval,
  scale: (value: number) => number,
  unit: string,
  bottom: number,
): Markup {
  const [low, high] = ci95.map((value) => scale(Math.max(0, value))) as [number, number];
  const x = scale(mean);
  const [textX, anchor] = x < 110 ? [low, "start"] : x > width - 110 ? [high, "end"] : [x, "middle"];
  const text = `mean ${readable(mean, (ci95[1] - ci95[0]) / 2)} ${unit}`;
  return markup`<rect class="lw-mean-band" x="${place(low)}" width="${place(Math.max(0.5, high - low))}" y="${meanAt}" height="${place(bottom - meanAt)}"/><line class="lw-interval" x1="${place(low)}" x2="${place(high)}" y1="${meanAt}" y2="${meanAt}"/><circle class="lw-mean" cx="${place(x)}" cy="${meanAt}" r="5.5"/><text class="lw-mean-text" x="${place(textX)}" y="${meanAt - 13}" text-anchor="${anchor}">${text}</text>`;
}

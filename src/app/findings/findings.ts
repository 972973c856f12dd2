import type { Figure, Interval, MeasuredTrial } from "../../quantities/index.ts";
import { many, readable, readableAlone, share, shareRange } from "../../report/index.ts";

/** One finding as it is read, and the cells it rests on. */
export interface Finding {
  /** Short stable name. */
  readonly name: "speed" | "spread" | "share" | "flow";
  /** The sentence in pieces; the figure itself stands out. */
  readonly before: string;
  readonly figure: string;
  readonly after: string;
  /** What stands behind it: n in words. */
  readonly behind: string;
  /** Indices of the paths it rests on. */
  readonly evidence: readonly number[];
}

/** The findings of a measured trial, most important first. What can't be had is said in words, never left out. */
export function findingsOf(measured: MeasuredTrial): Finding[] {
  if (measured.paths.count === 0) return [];
  return [speedFinding(measured), ...spreadFinding(measured), ...shareFinding(measured), ...flowFinding(measured)];
}

/** Unit of speeds, and its size in pixels a second. */
export function speedUnit({ scale }: Pick<MeasuredTrial, "scale">): { unit: string; factor: number } {
  return scale ? { unit: "µm/s", factor: scale.um_per_px } : { unit: "px/s", factor: 1 };
}

/** Indices of the paths whose cells fit. */
function where(measured: MeasuredTrial, fits: (cell: MeasuredTrial["cells"][number]) => boolean): number[] {
  return measured.cells.flatMap((cell, p) => (fits(cell) ? [p] : []));
}

function speedFinding(measured: MeasuredTrial): Finding {
  const { speed, scale } = measured;
  const mean = (scale ? speed?.mean_um_s : speed?.mean_px_s) ?? null;
  const evidence = where(measured, (cell) => cell.kept);
  const { unit } = speedUnit(measured);
  if (mean) {
    return {
      name: "speed",
      before: "Cells swim at ",
      figure: `${readable(mean.value, halfWidth(mean))} ${unit}`,
      after: intervalWords(mean),
      behind: many(mean.n, "motile cell", "motile cells"),
      evidence,
    };
  }
  const judged = speed?.n_judged ?? 0;
  const motile = where(measured, (cell) => cell.motile === true);
  if (judged === 0) {
    return {
      name: "speed",
      before: "",
      figure: "No cell could be judged",
      after: ": every path is too short to tell swimming from diffusion.",
      behind: many(measured.paths.count, "path", "paths"),
      evidence: where(measured, () => true),
    };
  }
  if (motile.length === 0) {
    return {
      name: "speed",
      before: "",
      figure: "No cell swims",
      after: ": none moves more than diffusion and flow explain.",
      behind: many(judged, "cell that could be judged", "cells that could be judged"),
      evidence: where(measured, (cell) => cell.motile !== null),
    };
  }
  return {
    name: "speed",
    before: "The mean speed ",
    figure: "can’t be had",
    after: ": no motile cell was followed for 0.5 s or more.",
    behind: many(motile.length, "motile cell", "motile cells"),
    evidence: motile,
  };
}

function spreadFinding(measured: MeasuredTrial): Finding[] {
  const { speed } = measured;
  if (!speed || speed.median_px_s === null || speed.sd_px_s === null || speed.n_cells < 2) return [];
  const { unit, factor } = speedUnit(measured);
  const half = speed.mean_px_s ? halfWidth(speed.mean_px_s)! * factor : null;
  return [
    {
      name: "spread",
      before: "Half of them are faster than ",
      figure: `${readable(speed.median_px_s * factor, half)} ${unit}`,
      after: `; from cell to cell speeds differ by ${readable(speed.sd_px_s * factor, half)} ${unit} (standard deviation)`,
      behind: many(speed.n_cells, "motile cell", "motile cells"),
      evidence: where(measured, (cell) => cell.kept),
    },
  ];
}

function shareFinding(measured: MeasuredTrial): Finding[] {
  const { speed } = measured;
  if (!speed || speed.motile_fraction === null) return [];
  const ci95 = speed.ci95_motile_fraction;
  return [
    {
      name: "share",
      before: "",
      figure: share(speed.motile_fraction),
      after: ` of cells swim${ci95 ? ` (95 % between ${shareRange(ci95).replace(" to ", " and ")})` : ""}`,
      behind: many(speed.n_judged, "cell that could be judged", "cells that could be judged"),
      evidence: where(measured, (cell) => cell.motile !== null),
    },
  ];
}

function flowFinding(measured: MeasuredTrial): Finding[] {
  const { drift } = measured;
  if (!drift) return [];
  const { unit, factor } = speedUnit(measured);
  const still = drift.ci95_px_s.every(([low, high]) => low <= 0 && high >= 0);
  const diffusing = drift.from === "diffusing cells";
  const component = (axis: 0 | 1, name: string) => {
    const [low, high] = drift.ci95_px_s[axis];
    const ci95: Interval = [low * factor, high * factor];
    const half = (ci95[1] - ci95[0]) / 2;
    const value = readable(drift.velocity_px_s[axis] * factor, half);
    return `${name} ${value}${still ? ` ${unit}` : ""} (95 % between ${between(ci95, half)})`;
  };
  const [vx, vy] = drift.velocity_px_s;
  const widths = drift.ci95_px_s.map(([low, high]) => high - low);
  const speed = readable(Math.hypot(vx, vy) * factor, (Math.max(...widths) / 2) * factor);
  const angle = Math.round((Math.atan2(vy, vx) * 180) / Math.PI);
  return [
    {
      name: "flow",
      before: still ? "" : "The fluid flows at ",
      figure: still ? "No flow" : `${speed} ${unit}`,
      after: `${still ? " is seen" : ` ${towards(angle)}`}: ${component(0, "rightwards")}, ${component(1, "upwards")}`,
      behind: many(
        drift.n_cells,
        diffusing ? "cell that only diffuses" : "swimmer that turns",
        diffusing ? "cells that only diffuse" : "swimmers that turn",
      ),
      evidence: where(measured, (cell) => cell.motile === !diffusing),
    },
  ];
}

const directions = [
  "to the right",
  "up to the right",
  "upwards",
  "up to the left",
  "to the left",
  "down to the left",
  "downwards",
  "down to the right",
];

/** A direction in words, to the nearest eighth of a turn. Degrees counter-clockwise from right. */
export function towards(angle_deg: number): string {
  return directions[((Math.round(angle_deg / 45) % 8) + 8) % 8]!;
}

function intervalWords(figure: Figure): string {
  const half = halfWidth(figure);
  if (figure.n < 2 || half === null) return "; an interval needs more cells";
  return ` (95 % between ${between(figure.ci95, half)})`;
}

function between([low, high]: Interval, half: number): string {
  return half > 0
    ? `${readable(low, half)} and ${readable(high, half)}`
    : `${readableAlone(low)} and ${readableAlone(high)}`;
}

function halfWidth({ ci95: [low, high] }: Figure): number | null {
  return high > low ? (high - low) / 2 : null;
}

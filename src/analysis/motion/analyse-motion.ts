import type { Cell, DriftFinding, Paths, Scale, SpeedFinding, Warning } from "../../quantities/index.ts";
import { median } from "../../statistics/index.ts";
import { bodyDiffusion, type Diffusion, diffusionOf, diffusionOfSwimmers, pooledDiffusion } from "./diffusion.ts";
import { agree, type Flow, flowOfDrifters, flowOfTurners } from "./flow.ts";
import { chanceOfDiffusing } from "./motile.ts";
import { speedFinding } from "./population.ts";
import type { MotionSettings } from "./settings.ts";
import { chooseWindow_s, type PathSpeed, pathSpeed } from "./speed.ts";
import { relativeTo, type Track, trackOf } from "./track.ts";
import { overallVelocity } from "./windows.ts";

/** How the cells of a trial move. */
export interface Motion {
  /** One for each path, in order. */
  readonly cells: readonly Cell[];
  readonly speed: SpeedFinding;
  readonly drift: DriftFinding | null;
  /** Stretch over which velocities were taken, seconds. */
  readonly window_s: number;
  /** Diffusion of the cells that only diffuse (or what was assumed of it), pixels² per second. */
  readonly diffusion_px2_s: number | null;
  readonly warnings: readonly Warning[];
}

/** Flow from swimmers is believed when its interval is within this part of their speed. */
const flowKnownTo = 0.05;
/** Fewest diffusing cells whose diffusion is taken for everybody's. */
const fewestDiffusers = 3;
/** Judging and learning the diffusion take turns this often. */
const rounds = 3;

/**
 * Tells swimmers from cells that only diffuse, measures the common flow, and gives each cell its speed relative to it
 * with a standard error, and the trial its mean with an interval.
 *
 * @param interval_s median time between frames
 * @param scale micrometres per pixel, or null for figures in pixels only
 */
export function analyseMotion(paths: Paths, interval_s: number, scale: Scale | null, settings: MotionSettings): Motion {
  const tracks = Array.from({ length: paths.count }, (_, p) => trackOf(paths, p));
  const long = tracks.filter((t) => t.duration >= settings.shortestPath_s);
  const flow = measureFlow(tracks, long, settings);
  const judgement = judge(tracks, flow, settings);
  const { motile, pooled, diffusers } = judgement;
  const relative = tracks.map((t) => (flow ? relativeTo(t, flow.vx, flow.vy) : t));
  const typical = relative.filter((t, i) => motile[i] && t.duration >= settings.shortestPath_s).map(netSpeed);
  const window_s = chooseWindow_s(
    typical.length > 0 ? median(typical) : Number.POSITIVE_INFINITY,
    { ...pooled, variance: Math.max(pooled.variance, medianStated(tracks)) },
    interval_s,
    settings.shortestWindow_s,
    settings.longestWindow_s,
  );
  const flowVariance = flow ? (flow.seX ** 2 + flow.seY ** 2) / 2 : 0;
  const speeds = relative.map((t) => speedOf(t, window_s, pooled, flowVariance));
  const cells = tracks.map((t, p) => cellOf(p, t, motile[p] as boolean, speeds[p] ?? null, settings));
  const counted = cells.filter((c) => c.kept);
  const judged = cells.filter((c) => c.last_t_s - c.first_t_s >= settings.shortestPath_s);
  const speed = speedFinding(
    counted.map((c) => c.speed_px_s as number),
    { n: judged.length, motile: judged.filter((c) => c.motile).length },
    scale,
  );
  return {
    cells,
    speed,
    drift: flow?.finding ?? null,
    window_s,
    diffusion_px2_s: diffusers >= fewestDiffusers ? pooled.coefficient : null,
    warnings: warningsOf(speed, flow, judged.length),
  };
}

/**
 * The common flow: from cells that only diffuse where there are such, unless swimmers that turn contradict them, which
 * tells of swimmers that happened to go alike; else from swimmers that turn. Null when neither tells.
 */
function measureFlow(tracks: readonly Track[], long: readonly Track[], settings: MotionSettings): Flow | null {
  const fromDrifters = flowOfDrifters(long);
  const { motile, pooled } = judge(tracks, null, settings);
  const movers = tracks.filter((t, i) => motile[i] && t.duration >= settings.shortestPath_s);
  const found = flowOfTurners(movers, pooled);
  const fromTurners = found && known(found, movers) ? found : null;
  if (!fromDrifters || !fromTurners) return fromDrifters ?? fromTurners;
  return agree(fromDrifters, fromTurners) ? fromDrifters : fromTurners;
}

interface Judgement {
  readonly motile: readonly boolean[];
  readonly pooled: Diffusion;
  /** Cells that count and only diffuse. */
  readonly diffusers: number;
}

/** Which tracks move more than diffusion and flow explain; the diffusion is learnt from those that don't. */
function judge(tracks: readonly Track[], flow: Flow | null, settings: MotionSettings): Judgement {
  const relative = tracks.map((t) => (flow ? relativeTo(t, flow.vx, flow.vy) : t));
  const own = relative.map((t) => diffusionOf(t, "own"));
  const flowVariance = flow ? (flow.seX ** 2 + flow.seY ** 2) / 2 : 0;
  const limit = settings.falsePositiveRate / Math.max(1, tracks.length);
  const long = relative.filter((t) => t.duration >= settings.shortestPath_s);
  if (long.length === 0) return { motile: tracks.map(() => false), pooled: nothingKnown, diffusers: 0 };
  const body = bodyDiffusion(long);
  let pooled = body.likely;
  let motile: boolean[] = [];
  let diffusers = 0;
  for (let round = 0; round < rounds; round++) {
    const before = motile;
    motile = relative.map((t, i) => chanceOfDiffusing(t, own[i] as Diffusion, pooled, flowVariance) < limit);
    const still = own.filter((_, i) => !motile[i] && (relative[i] as Track).duration >= settings.shortestPath_s);
    diffusers = still.length;
    if (before.length > 0 && motile.every((m, i) => m === before[i])) break;
    const swimmers = relative.filter((_, i) => motile[i]);
    const next = diffusers < fewestDiffusers ? diffusionOfSwimmers(swimmers) : pooledDiffusion(still);
    // Swimmers taken for diffusing by mistake must not make diffusion so large that more of them are.
    if (next) pooled = { ...next, coefficient: clamp(next.coefficient, 1e-6, body.most) };
  }
  return { motile, pooled, diffusers };
}

/** Diffusion where no track is long enough to show any. */
const nothingKnown: Diffusion = { coefficient: 1e-6, variance: 0, steps: 1 };

function clamp(value: number, low: number, high: number): number {
  return Math.min(high, Math.max(low, value));
}

function known(flow: Flow, swimmers: readonly Track[]): boolean {
  const typical = median(swimmers.map(netSpeed));
  const [x, y] = flow.finding.ci95_px_s;
  return Math.max(x[1] - x[0], y[1] - y[0]) / 2 < flowKnownTo * typical;
}

/** Speed over a third of a second or the whole track, whichever is shorter: near enough to choose a window by. */
function netSpeed(track: Track): number {
  const { t, x, y } = track;
  const speeds: number[] = [];
  let a = 0;
  for (let b = 1; b < t.length; b++) {
    if ((t[b] as number) - (t[a] as number) < Math.min(0.33, 0.99 * track.duration)) continue;
    const dx = (x[b] as number) - (x[a] as number);
    const dy = (y[b] as number) - (y[a] as number);
    speeds.push(Math.sqrt(dx * dx + dy * dy) / ((t[b] as number) - (t[a] as number)));
    a = b;
  }
  return speeds.length > 0
    ? median(speeds)
    : Math.sqrt(overallVelocity(track).vx ** 2 + overallVelocity(track).vy ** 2);
}

function speedOf(track: Track, window_s: number, pooled: Diffusion, flowVariance: number): PathSpeed | null {
  const noise = { variance: Math.max(0, pooled.variance, track.statedVariance), coefficient: pooled.coefficient };
  return pathSpeed(track, window_s, noise, flowVariance);
}

function cellOf(p: number, track: Track, motile: boolean, speed: PathSpeed | null, settings: MotionSettings): Cell {
  const followed = track.duration >= settings.shortestPath_s;
  const kept = motile && followed && speed !== null;
  return {
    cell: p + 1,
    first_t_s: track.t[0] as number,
    last_t_s: track.t.at(-1) as number,
    frames: track.t.length,
    motile: motile ? true : followed ? false : null,
    speed_px_s: speed?.speed ?? null,
    speedSe_px_s: speed?.standardError ?? null,
    // Of a body that only diffuses, net displacement over swum length says nothing.
    straightness: motile ? (speed?.straightness ?? null) : null,
    kept,
    reason: kept ? "" : !followed ? `followed for less than ${settings.shortestPath_s} s` : reasonNot(motile),
  };
}

function reasonNot(motile: boolean): string {
  return motile ? "sighted too seldom for a speed" : "only diffuses";
}

function medianStated(tracks: readonly Track[]): number {
  return tracks.length > 0 ? median(tracks.map((t) => t.statedVariance)) : 0;
}

function warningsOf(speed: SpeedFinding, flow: Flow | null, judged: number): Warning[] {
  const warnings: Warning[] = [];
  if (judged === 0) {
    warnings.push({
      code: "no-cells",
      message: "No cell was followed for 0.5 s or more, so there is no speed and no share of motile cells.",
    });
  } else if (speed.n_cells === 0) {
    warnings.push({
      code: "nothing-swims",
      message: `No motile cell: none of the ${judged} cells followed for 0.5 s or more moved farther than diffusion and flow explain.`,
    });
  } else if (speed.n_cells === 1) {
    warnings.push({
      code: "one-motile-cell",
      message:
        "Only one motile cell: its speed is in cells.csv, but one cell gives no mean and no interval. Film longer, or more cells.",
    });
  }
  if (!flow && judged > 0) {
    warnings.push({
      code: "flow-unknown",
      message:
        "The common flow could not be measured: that takes at least three cells that only diffuse, or swimmers that turn. Speeds include any flow there was.",
    });
  }
  return warnings;
}

import type { DriftFinding } from "../../quantities/index.ts";
import { median, t975 } from "../../statistics/index.ts";
import { bodyDiffusion, diffusionError, diffusionOf, diffusionOfSwimmers } from "./diffusion.ts";
import type { Track } from "./track.ts";
import { overallVelocity, velocitiesOf } from "./windows.ts";

/** Common flow with its covariance-free standard errors, pixels per second, y up; null where it can't be had. */
export interface Flow {
  readonly vx: number;
  readonly vy: number;
  readonly seX: number;
  readonly seY: number;
  readonly finding: DriftFinding;
}

interface Candidate {
  readonly vx: number;
  readonly vy: number;
  readonly variance: number;
}

/** Fewest cells that must agree on the flow. */
const fewestDrifters = 3;
/** Cells agree with a flow within this many standard errors. */
const agreement = 3;
/** Cells whose own diffusion is above this multiple of that of the calmest few turn about: they swim. */
const calm = 4;
/** The calmest few wander by no more than this multiple of a body's diffusion, if they only diffuse. */
const mostOfBody = 4;
/** Swimmers needed to tell flow from swimming. */
const fewestTurners = 6;
/** Windows for telling flow from swimming, seconds. */
const turnerWindow_s = 0.15;

/**
 * The flow that carries everything, from cells that only diffuse: their mean velocities agree with one another as
 * closely as diffusion lets them, which those of swimmers don't. Null when no such group stands out.
 *
 * Each member's velocity is the slope of its path; the flow is their weighted mean, with a 95 % interval from their own
 * scatter (Student's t).
 */
export function flowOfDrifters(tracks: readonly Track[]): Flow | null {
  if (tracks.length < fewestDrifters) return null;
  const usual = diffusionOfSwimmers(tracks)?.coefficient ?? 0;
  const spreads = tracks.map((track) => wandering(track, usual));
  const calmest = [...spreads].sort((a, b) => a - b)[fewestDrifters - 1] as number;
  // Even the calmest wander more than bodies diffuse: nothing here only diffuses.
  if (calmest > mostOfBody * bodyDiffusion(tracks).likely.coefficient) return null;
  const candidates = tracks.flatMap((track, i): Candidate[] => {
    const coefficient = spreads[i] as number;
    if (coefficient > calm * calmest + 1e-12) return [];
    const { vx, vy, position, diffusion } = overallVelocity(track);
    const variance = position * track.statedVariance + diffusion * Math.max(coefficient, calmest);
    return [{ vx, vy, variance: variance + 1e-6 }];
  });
  const group = tightestGroup(candidates);
  if (!group) return null;
  let flow = weightedMean(group);
  let members = group;
  for (let round = 0; round < 4; round++) {
    members = candidates.filter((c) => distance2(c, flow) <= 2 * agreement ** 2 * c.variance);
    if (members.length < fewestDrifters) return null;
    flow = weightedMean(members);
  }
  // Around a flow there is next to nothing; among swimmers that happen to swim alike there are more just outside.
  const usualVariance = median(members.map((m) => m.variance));
  const outside = candidates.filter(
    (c) => !members.includes(c) && distance2(c, flow) <= 9 * 2 * agreement ** 2 * usualVariance,
  ).length;
  if (outside > members.length / 2) return null;
  const t = t975(members.length - 1);
  return flowFrom(flow.vx, flow.vy, flow.seX, flow.seY, t, members.length, "diffusing cells");
}

/** Stretches over which a swimmer's heading has had time to wander, seconds. */
const longStretch_s = 0.4;

/**
 * Diffusion coefficient of a track about its own mean velocity, from single steps or from longer stretches, whichever is
 * more, plus its standard error, so that short tracks that happen to look calm aren't the measure of all others. For a
 * body that only diffuses both are alike; a swimmer's wandering heading makes the longer one much greater, however
 * straight it swims from frame to frame.
 *
 * @param usual what bodies of this clip diffuse by, near enough to tell the error
 */
function wandering(track: Track, usual: number): number {
  const short = diffusionOf(track, "own");
  const { t, x, y } = track;
  const n = t.length - 1;
  const mx = ((x[n] as number) - (x[0] as number)) / track.duration;
  const my = ((y[n] as number) - (y[0] as number)) / track.duration;
  let squares = 0;
  let time = 0;
  let stretches = 0;
  for (let a = 0, b = 1; b <= n; b++) {
    const h = (t[b] as number) - (t[a] as number);
    if (h < longStretch_s - 1e-6) continue;
    const dx = (x[b] as number) - (x[a] as number) - mx * h;
    const dy = (y[b] as number) - (y[a] as number) - my * h;
    squares += dx * dx + dy * dy - 4 * track.statedVariance;
    time += h;
    stretches++;
    a = b;
  }
  const long = stretches > 1 ? (squares / (4 * time)) * (stretches / (stretches - 1)) : 0;
  return Math.max(0, short.coefficient, long / 1.5) + diffusionError(track, Math.max(short.coefficient, usual));
}

/**
 * The group of candidates that agree with one of them and together tell a velocity best: cells followed long enough to agree
 * closely, not the many short paths that agree with anything.
 */
function tightestGroup(candidates: readonly Candidate[]): Candidate[] | null {
  let best: Candidate[] | null = null;
  let most = 0;
  for (const centre of candidates) {
    const near = candidates.filter((c) => distance2(c, centre) <= agreement ** 2 * (c.variance + centre.variance));
    const weight = near.reduce((sum, c) => sum + 1 / c.variance, 0);
    if (near.length >= fewestDrifters && weight > most) {
      best = near;
      most = weight;
    }
  }
  return best;
}

function distance2(
  a: { readonly vx: number; readonly vy: number },
  b: { readonly vx: number; readonly vy: number },
): number {
  return (a.vx - b.vx) ** 2 + (a.vy - b.vy) ** 2;
}

function weightedMean(members: readonly Candidate[]) {
  let w = 0;
  let vx = 0;
  let vy = 0;
  for (const m of members) {
    w += 1 / m.variance;
    vx += m.vx / m.variance;
    vy += m.vy / m.variance;
  }
  vx /= w;
  vy /= w;
  const free = members.length - 1;
  const scatter = (of: (m: Candidate) => number, mean: number) =>
    Math.sqrt(members.reduce((sum, m) => sum + (of(m) - mean) ** 2 / m.variance, 0) / free / w);
  return { vx, vy, seX: scatter((m) => m.vx, vx), seY: scatter((m) => m.vy, vy) };
}

/**
 * The flow from swimmers that turn: a cell that swims steadily in a flow u moves at w with |w − u|² unchanged, so over
 * its own path |w|² rises with 2 w·u. The slope over all cells, each about its own mean, is u; what the noise of w
 * does to it is taken off. Null when cells don't turn enough to tell. Interval from leaving out one cell at a time.
 *
 * The relation is elementary kinematics; common practice, no source.
 *
 * @param noise variance of a position (pixels²) and diffusion coefficient (pixels² per second) of the cells
 */
export function flowOfTurners(tracks: readonly Track[], noise: { variance: number; coefficient: number }): Flow | null {
  const sums = tracks.flatMap((track) => {
    const sum = turnerSums(track, noise);
    return sum ? [sum] : [];
  });
  if (sums.length < fewestTurners) return null;
  const all = solve(sums);
  if (!all) return null;
  const without = sums.map((_, i) => solve(sums.filter((__, j) => j !== i)));
  if (without.some((u) => u === null)) return null;
  const n = sums.length;
  const se = (of: 0 | 1) => {
    const mean = without.reduce((sum, u) => sum + (u as [number, number])[of], 0) / n;
    return Math.sqrt(((n - 1) / n) * without.reduce((sum, u) => sum + ((u as [number, number])[of] - mean) ** 2, 0));
  };
  return flowFrom(all[0], all[1], se(0), se(1), t975(n - 1), n, "turning swimmers");
}

interface TurnerSums {
  xx: number;
  xy: number;
  yy: number;
  xq: number;
  yq: number;
}

function turnerSums(track: Track, noise: { variance: number; coefficient: number }): TurnerSums | null {
  const v = velocitiesOf(track, turnerWindow_s);
  const n = v.vx.length;
  if (n < 4) return null;
  const sum = (values: readonly number[]) => values.reduce((a, b) => a + b, 0) / n;
  const mx = sum(v.vx);
  const my = sum(v.vy);
  const squares = v.vx.map((x, i) => x * x + (v.vy[i] as number) ** 2);
  const mq = sum(squares);
  const s = { xx: 0, xy: 0, yy: 0, xq: 0, yq: 0 };
  for (let i = 0; i < n; i++) {
    const gain = v.noise[i] as { position: number; diffusion: number };
    const s2 = gain.position * noise.variance + gain.diffusion * noise.coefficient;
    const x = 2 * ((v.vx[i] as number) - mx);
    const y = 2 * ((v.vy[i] as number) - my);
    const q = (squares[i] as number) - mq;
    // Noise of w lies in both sides of the regression: 4 s² in the squares of 2 w, 4 s² w in their product with |w|².
    s.xx += x * x - 4 * s2;
    s.yy += y * y - 4 * s2;
    s.xy += x * y;
    s.xq += x * q - 4 * s2 * mx;
    s.yq += y * q - 4 * s2 * my;
  }
  return s;
}

/** Robust rounds of {@link solve}. */
const robustRounds = 6;

/**
 * Solves the pooled regression. A cell that turns out of the picture plane seems to change its speed as it turns, one way
 * or the other as it happened to turn: such cells count less (Huber 1964, Ann. Math. Stat. 35, 73), by how far their own
 * score lies outside those of most.
 */
function solve(sums: readonly TurnerSums[]): [number, number] | null {
  let weights = sums.map(() => 1);
  let u: [number, number] | null = null;
  for (let round = 0; round < robustRounds; round++) {
    u = weightedSolution(sums, weights);
    if (!u) return null;
    const [ux, uy] = u;
    const scores = sums.map((s) =>
      Math.sqrt((s.xq - s.xx * ux - s.xy * uy) ** 2 + (s.yq - s.xy * ux - s.yy * uy) ** 2),
    );
    const usual = 1.5 * median(scores);
    weights = scores.map((score) => (score <= usual ? 1 : usual / score));
  }
  return u;
}

function weightedSolution(sums: readonly TurnerSums[], weights: readonly number[]): [number, number] | null {
  const s = { xx: 0, xy: 0, yy: 0, xq: 0, yq: 0 };
  sums.forEach((one, i) => {
    for (const k of ["xx", "xy", "yy", "xq", "yq"] as const) s[k] += (weights[i] as number) * one[k];
  });
  const determinant = s.xx * s.yy - s.xy * s.xy;
  if (!(determinant > 1e-6 * (s.xx + s.yy) ** 2)) return null;
  return [(s.xq * s.yy - s.yq * s.xy) / determinant, (s.yq * s.xx - s.xq * s.xy) / determinant];
}

function flowFrom(
  vx: number,
  vy: number,
  seX: number,
  seY: number,
  t: number,
  n_cells: number,
  from: DriftFinding["from"],
): Flow {
  return {
    vx,
    vy,
    seX,
    seY,
    finding: {
      velocity_px_s: [vx, vy],
      ci95_px_s: [
        [vx - t * seX, vx + t * seX],
        [vy - t * seY, vy + t * seY],
      ],
      n_cells,
      from,
    },
  };
}

/** Do two flows agree, within four times the error of their difference along either axis? */
export function agree(a: Flow, b: Flow): boolean {
  const within = (d: number, seA: number, seB: number) => d * d <= 16 * (seA * seA + seB * seB);
  return within(a.vx - b.vx, a.seX, b.seX) && within(a.vy - b.vy, a.seY, b.seY);
}

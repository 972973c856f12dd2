import { assign, type Pairing } from "../../src/tracking/assignment.ts";

/** One path: its place in each frame in which it is there. */
export type PlacesByFrame = ReadonlyMap<number, readonly [x: number, y: number]>;

/** How well measured paths match true ones. */
export interface PathAgreement {
  /** True positions matched, true ones missed, measured ones too many. */
  readonly truePositives: number;
  readonly missed: number;
  readonly spurious: number;
  /** Jaccard index of positions: matched over all. */
  readonly jaccard: number;
  /** Identity F1: share of positions that bear the right identity, of true and measured ones together. */
  readonly identityF1: number;
  readonly identityTruePositives: number;
  /** Root mean square distance of matched positions, pixels. */
  readonly rms_px: number;
}

/**
 * Matches measured paths one-to-one with true ones and scores them.
 *
 * Positions: paths are paired at least total distance gated at `gate_px`, a missing position counting as the gate, and
 * positions of paired paths count as matched within it (Chenouard et al. 2014, Nature Methods 11, 281, supplementary
 * note). Identity: paths are paired for the most matched positions (Ristani et al. 2016, "Performance measures and a data
 * set for multi-target, multi-camera tracking").
 */
export function pathAgreement(
  truth: readonly PlacesByFrame[],
  measured: readonly PlacesByFrame[],
  gate_px = 5,
): PathAgreement {
  const byDistance: Pairing[] = [];
  const byMatches: Pairing[] = [];
  const matches = new Map<string, { n: number; squares: number }>();
  truth.forEach((t, row) => {
    measured.forEach((m, column) => {
      const { n, saved, squares } = compare(t, m, gate_px);
      if (n === 0) return;
      matches.set(`${row} ${column}`, { n, squares });
      byDistance.push({ row, column, cost: -saved });
      byMatches.push({ row, column, cost: -n });
    });
  });
  const total = (paths: readonly PlacesByFrame[]) => paths.reduce((sum, p) => sum + p.size, 0);
  const count = (pairs: readonly Pairing[], of: "n" | "squares") =>
    pairs.reduce((sum, { row, column }) => sum + (matches.get(`${row} ${column}`)?.[of] as number), 0);
  const paired = assign(byDistance, 0);
  const truePositives = count(paired, "n");
  const missed = total(truth) - truePositives;
  const spurious = total(measured) - truePositives;
  const identityTruePositives = count(assign(byMatches, 0), "n");
  return {
    truePositives,
    missed,
    spurious,
    jaccard: truePositives / (truePositives + missed + spurious),
    identityF1: (2 * identityTruePositives) / (total(truth) + total(measured)),
    identityTruePositives,
    rms_px: Math.sqrt(count(paired, "squares") / truePositives),
  };
}

/** Positions matched, how far the gated distance falls short of nothing being matched, and the sum of squares. */
function compare(truth: PlacesByFrame, measured: PlacesByFrame, gate: number) {
  let n = 0;
  let saved = 0;
  let squares = 0;
  // Against pairing the true path with nothing, which costs the gate for each of its positions.
  for (const frame of measured.keys()) if (!truth.has(frame)) saved -= gate;
  for (const [frame, [x, y]] of truth) {
    const at = measured.get(frame);
    if (!at) continue;
    const d = Math.hypot(at[0] - x, at[1] - y);
    if (d >= gate) continue;
    n++;
    saved += gate - d;
    squares += d * d;
  }
  return { n, saved, squares };
}

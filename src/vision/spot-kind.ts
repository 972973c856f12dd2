import { chooseEvenly } from "./background.ts";
import type { Exposure } from "./exposure.ts";
import type { Sample } from "./survey.ts";
import { gaussianTaps, type Whitener } from "./whitener.ts";

/** What the cells of this clip look like. */
export interface SpotKind {
  /** Standard deviation of the Gaussian that fits them best, frame pixels. */
  readonly sigma_px: number;
  /** +1 brighter than the background, -1 darker. */
  readonly sign: 1 | -1;
  /** False when nothing stood out and the values are only the usual ones. */
  readonly seen: boolean;
}

/** Candidate sizes, frame pixels: a factor of sqrt(2) apart. */
const candidates = [1, 1.41, 2, 2.83, 4, 5.66, 8] as const;
/** A maximum this far above the noise is no chance in any clip. */
const sure = 6.5;
const looked = 6;

/** A sample with its shake and exposure. */
export interface Placed {
  readonly sample: Sample;
  readonly shift: { readonly x: number; readonly y: number };
  readonly exposure: Exposure;
}

/**
 * Finds the size and polarity of the cells: the matched filter gives the highest signal over noise at the spot's own
 * size (T. Lindeberg 1998 on scale selection, with the noise-normalised response in place of a derivative).
 *
 * @param fine full-size, `coarse` half-size whitener; sizes from 2.8 px on are looked at on the coarse one.
 */
export function findSpotKind(fine: Whitener, coarse: Whitener, samples: readonly Placed[]): SpotKind {
  const frames = chooseEvenly(samples, Math.min(looked, samples.length));
  const responses = new Map<string, number[]>();
  for (const sign of [1, -1] as const) for (const sigma of candidates) responses.set(`${sign} ${sigma}`, []);
  for (const { sample, shift, exposure } of frames) {
    fine.whiten(sample.luma, shift, exposure);
    coarse.whiten(sample.luma, shift, exposure);
    for (const sigma of candidates) {
      const on = sigma < 2.5 ? fine : coarse;
      const filtered = on.filter(gaussianTaps(sigma / on.bin));
      const sd = on.filteredSd();
      for (const sign of [1, -1] as const) {
        for (const i of on.peaks(sign, sure * sd)) responses.get(`${sign} ${sigma}`)!.push((sign * filtered[i]!) / sd);
      }
    }
  }

  let best: SpotKind = { sigma_px: 2, sign: -1, seen: false };
  let most = 0;
  for (const sign of [1, -1] as const) {
    const lists = candidates.map((sigma) => responses.get(`${sign} ${sigma}`)!.sort((a, b) => b - a));
    const count = Math.max(...lists.map((l) => l.length));
    if (count < 3) continue;
    // The same number of strongest maxima at every size, so that one cell seen as two doesn't count for more.
    const n = Math.min(400, Math.max(3, Math.round(count / 3)));
    const scores = lists.map((l) => l.slice(0, n).reduce((s, v) => s + v, 0) / n);
    const k = scores.indexOf(Math.max(...scores));
    const total = scores[k]! * n;
    if (total <= most) continue;
    most = total;
    best = { sigma_px: vertex(scores, k), sign, seen: true };
  }
  return best;
}

/** Size at the top of the parabola through the best score and its neighbours, on a logarithmic scale. */
function vertex(scores: readonly number[], k: number): number {
  const at = candidates[k]!;
  const [a, b, c] = [scores[k - 1], scores[k]!, scores[k + 1]];
  if (a === undefined || c === undefined) return at;
  const bend = a - 2 * b + c;
  if (!(bend < 0)) return at;
  const step = Math.max(-0.5, Math.min(0.5, (0.5 * (a - c)) / bend));
  return at * Math.exp(step * 0.34657359);
}

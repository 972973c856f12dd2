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
  /** Mean signal over noise of the strongest spots. */
  readonly strength: number;
}

/** Candidate sizes, frame pixels: a factor of sqrt(2) apart. */
const candidates = [1, 1.41, 2, 2.83, 4, 5.66, 8] as const;
/** A maximum this far above the noise is no chance in any clip. */
const sure = 6.5;
const looked = 6;

/**
 * Width of the filter that cells are looked for with, frame pixels. A filter three quarters the size of the spot costs 4 % of
 * its signal over noise and tells cells apart that nearly touch; faint cells need all of it.
 */
export function detectionSigma_px(kind: SpotKind): number {
  return kind.strength > 12 ? Math.max(0.8, 0.75 * kind.sigma_px) : kind.sigma_px;
}

/** A sample with its shake and exposure. */
export interface Placed {
  readonly sample: Sample;
  readonly shift: { readonly x: number; readonly y: number };
  readonly exposure: Exposure;
}

/**
 * Finds the size and polarity of the cells: the matched filter gives the highest signal over noise at the spot's own
 * size (T. Lindeberg 1998, Int. J. Comput. Vis. 30, 79, on scale selection; filters have unit energy). Returns what
 * was found for either polarity, the likelier first.
 *
 * @param fine full-size, `coarse` half-size whitener; sizes from 2.8 px on are looked at on the coarse one.
 */
export function findSpotKinds(fine: Whitener, coarse: Whitener, samples: readonly Placed[]): SpotKind[] {
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
        // Compared as they are, not over the noise of their size: noise that an encoder has smoothed away at the finest
        // size would make that size win whatever cells look like.
        for (const i of on.peaks(sign, sure * sd)) responses.get(`${sign} ${sigma}`)!.push(sign * filtered[i]!);
      }
    }
  }

  // The same number of strongest maxima at every size and for either sign, so that one cell seen as two, or a halo seen
  // as several spots round a cell, doesn't count for more: what stands out furthest wins.
  const lists = [...responses.values()];
  for (const list of lists) list.sort((a, b) => b - a);
  const count = Math.max(...lists.map((l) => l.length));
  const kinds: SpotKind[] = [];
  for (const sign of [1, -1] as const) {
    const n = Math.min(400, Math.max(3, Math.round(count / 4)));
    const scores = candidates.map((sigma) => {
      const list = responses.get(`${sign} ${sigma}`)!;
      return list.slice(0, n).reduce((s, v) => s + v, 0) / n;
    });
    const k = scores.indexOf(Math.max(...scores));
    const seen = responses.get(`${sign} ${candidates[k]!}`)!.length >= 3;
    kinds.push({ sigma_px: seen ? vertex(scores, k) : 2, sign, seen, strength: scores[k]! });
  }
  return kinds.sort((a, b) => b.strength - a.strength || a.sign - b.sign);
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

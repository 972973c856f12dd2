import type { Frame, SightingsBuilder } from "../quantities/index.ts";
import { type Exposure, fitExposure } from "./exposure.ts";
import { fitTogether, mostTogether } from "./joint-fit.ts";
import type { Scene } from "./scene.ts";
import { detectionSigma_px } from "./spot-kind.ts";
import { axesOf, measureSpot, positionErrors, type SpotShape, type Whitened } from "./spot-shape.ts";
import { measureShift } from "./steady.ts";
import { gaussianTaps, type Whitener } from "./whitener.ts";

/** What was noted of one frame besides its sightings. */
export interface FrameNote {
  readonly shift: { readonly x: number; readonly y: number };
  readonly exposure: Exposure;
  /**
   * Maxima of the opposite polarity above the threshold, away from any sighting: what noise alone does here. Counted in
   * one frame of four, null in the others.
   */
  readonly falseAlarms: number | null;
  readonly sightings: number;
}

const falseAlarmsEvery = 4;
/** Above this signal over noise a spot's own shape is measured in full; below half of it not at all. */
const shapeSnr = 24;

/** Finds and measures the cells of one frame after another, against a known still scene. */
export class Spotter {
  private readonly scene: Scene;
  private readonly whitener: Whitener;
  private readonly taps: Float32Array;
  private readonly sigma: number;
  private last: { x: number; y: number } = { x: 0, y: 0 };
  private lastExposure: Exposure = { gain: 1, offset: 0 };

  constructor(scene: Scene, whitener: Whitener) {
    this.scene = scene;
    this.whitener = whitener;
    this.sigma = scene.kind.sigma_px / whitener.bin;
    this.taps = gaussianTaps(detectionSigma_px(scene.kind) / whitener.bin);
  }

  /** Adds the frame's sightings to the table, in scene coordinates, and returns what else was noted. */
  spot(frame: Frame, into: SightingsBuilder): FrameNote {
    const { scene, whitener } = this;
    const { shift, exposure } = this.place(frame.luma);
    const picture = whitener.whiten(frame.luma, shift, exposure);
    const filtered = whitener.filter(this.taps);
    const threshold = scene.threshold * scene.filteredSd;
    const found = this.separate(whitener.peaks(scene.kind.sign, threshold), filtered);
    const spots = this.measure(picture, filtered, found);
    const falseAlarms = frame.index % falseAlarmsEvery === 0 ? this.countFalseAlarms(threshold, spots) : null;
    for (const { spot, snr } of spots) {
      if (!this.whole(spot)) continue;
      const axes = axesOf(spot);
      const errors = positionErrors(spot, scene.filteredSd);
      const at = Math.round(spot.y) * whitener.width + Math.round(spot.x);
      into.add({
        frame: frame.index,
        x_px: whitener.toFrame(spot.x) - shift.x,
        y_px: whitener.toFrame(spot.y) - shift.y,
        seX_px: errors.seX * whitener.bin,
        seY_px: errors.seY * whitener.bin,
        snr,
        contrast: scene.kind.sign * spot.peak * whitener.noiseAt(at),
        major_px: axes.major * whitener.bin,
        minor_px: axes.minor * whitener.bin,
        axis_rad: axes.axis_rad,
      });
    }
    return { shift, exposure, falseAlarms, sightings: spots.length };
  }

  private place(luma: Uint8Array): { shift: { x: number; y: number }; exposure: Exposure } {
    const { scene } = this;
    if (scene.steady) {
      const m = measureShift(scene.texture, luma, this.last, this.lastExposure.gain, this.lastExposure.offset);
      if (m.agreement > 0.3) this.last = { x: m.x, y: m.y };
    }
    const step = Math.round(this.last.y) * scene.width + Math.round(this.last.x);
    this.lastExposure = fitExposure(scene.exposurePoints, luma, step, this.lastExposure);
    return { shift: this.last, exposure: this.lastExposure };
  }

  /** Leaves out maxima that are only ripples on the flank or body of a greater one. */
  private separate(indices: Int32Array, filtered: Float32Array): number[] {
    const { width } = this.whitener;
    const sign = this.scene.kind.sign;
    const order = Array.from(indices).filter((i) => this.whitener.sees(i));
    order.sort((a, b) => sign * (filtered[b]! - filtered[a]!) || a - b);
    const reach = 4 * this.sigma;
    const kept: number[] = [];
    for (const i of order) {
      const x = i % width;
      const y = Math.floor(i / width);
      const value = sign * filtered[i]!;
      const ripple = kept.some((k) => {
        const dx = (k % width) - x;
        const dy = Math.floor(k / width) - y;
        const d2 = dx * dx + dy * dy;
        if (d2 > reach * reach) return false;
        if (d2 < 2.25 * this.sigma * this.sigma) return true;
        // Two cells have a dip between them, deeper than the noise of the filtered picture makes.
        const dip = value - this.saddle(filtered, x, y, dx, dy);
        return dip < Math.max(0.12 * value, 1.5 * this.scene.filteredSd);
      });
      if (!ripple) kept.push(i);
    }
    return kept.sort((a, b) => a - b);
  }

  private saddle(filtered: Float32Array, x: number, y: number, dx: number, dy: number): number {
    const sign = this.scene.kind.sign;
    const steps = Math.max(2, Math.ceil(Math.sqrt(dx * dx + dy * dy)));
    let least = Number.POSITIVE_INFINITY;
    for (let s = 0; s <= steps; s++) {
      const i = Math.round(y + (dy * s) / steps) * this.whitener.width + Math.round(x + (dx * s) / steps);
      least = Math.min(least, sign * filtered[i]!);
    }
    return least;
  }

  private measure(picture: Whitened, filtered: Float32Array, found: readonly number[]) {
    const { scene, sigma } = this;
    const { width } = this.whitener;
    const first = found.map((i) => {
      const snr = (scene.kind.sign * filtered[i]!) / scene.filteredSd;
      const freedom = Math.max(0, Math.min(1, (2 * snr) / shapeSnr - 1));
      const start = topOf(filtered, width, i);
      return { snr, freedom, ...start, near: [] as number[], spot: null as SpotShape | null };
    });
    // Neighbours whose light reaches into a spot's window.
    for (let a = 0; a < first.length; a++) {
      for (let b = a + 1; b < first.length; b++) {
        const d2 = (first[a]!.x - first[b]!.x) ** 2 + (first[a]!.y - first[b]!.y) ** 2;
        if (d2 < (9 * sigma) ** 2) {
          first[a]!.near.push(b);
          first[b]!.near.push(a);
        }
      }
    }
    const read = (f: (typeof first)[number], others: readonly SpotShape[]) =>
      measureSpot(picture, scene.kind.sign, f.x, f.y, sigma, f.freedom, others);
    const touching = groupsWithin(first, 6 * sigma);
    for (const group of touching) {
      if (group.length > 1 && group.length <= mostTogether) {
        const start = group.map((k) => ({
          x: first[k]!.x,
          y: first[k]!.y,
          peak: peakAt(picture, scene.kind.sign, first[k]!),
        }));
        const others = group.flatMap((k) => first[k]!.near).filter((k) => !group.includes(k));
        const known = [...new Set(others)].flatMap((k) => first[k]!.spot ?? []);
        fitTogether(picture, scene.kind.sign, start, sigma, known).forEach((spot, i) => {
          first[group[i]!]!.spot = spot;
        });
      } else {
        for (const k of group) first[k]!.spot = read(first[k]!, []);
      }
    }
    for (const group of touching) {
      if (group.length > 1 && group.length <= mostTogether) continue;
      for (const k of group) {
        const f = first[k]!;
        if (f.near.length === 0) continue;
        f.spot = read(
          f,
          f.near.flatMap((j) => (first[j]!.spot?.good ? [first[j]!.spot] : [])),
        );
      }
    }
    return first.flatMap((f) => (f.spot?.good ? [{ spot: f.spot, snr: f.snr }] : []));
  }

  /**
   * Is the spot's middle in the picture, clear of its edge? Of a cell beyond the edge only a flank is seen, and the place
   * of a flank is not the place of a cell.
   */
  private whole(spot: SpotShape): boolean {
    const margin = 0.8 * this.scene.kind.sigma_px;
    const x = this.whitener.toFrame(spot.x);
    const y = this.whitener.toFrame(spot.y);
    return x >= margin && y >= margin && x <= this.scene.width - 1 - margin && y <= this.scene.height - 1 - margin;
  }

  private countFalseAlarms(threshold: number, spots: readonly { spot: SpotShape }[]): number {
    const opposite = this.scene.kind.sign === 1 ? -1 : 1;
    const { width } = this.whitener;
    const reach = (7 * this.sigma) ** 2;
    let count = 0;
    for (const i of this.whitener.peaks(opposite, threshold)) {
      if (!this.whitener.sees(i)) continue;
      const x = i % width;
      const y = Math.floor(i / width);
      if (!spots.some(({ spot }) => (spot.x - x) ** 2 + (spot.y - y) ** 2 < reach)) count++;
    }
    return count;
  }
}

/** Spots within reach of one another, directly or through others, as lists of indices. */
function groupsWithin(spots: readonly { readonly x: number; readonly y: number }[], reach: number): number[][] {
  const group = spots.map((_, i) => i);
  for (let a = 0; a < spots.length; a++) {
    for (let b = a + 1; b < spots.length; b++) {
      const d2 = (spots[a]!.x - spots[b]!.x) ** 2 + (spots[a]!.y - spots[b]!.y) ** 2;
      if (d2 >= reach * reach || group[a] === group[b]) continue;
      const [keep, drop] = [group[a]!, group[b]!];
      for (let i = 0; i < group.length; i++) if (group[i] === drop) group[i] = keep;
    }
  }
  const lists = new Map<number, number[]>();
  group.forEach((g, i) => {
    lists.set(g, [...(lists.get(g) ?? []), i]);
  });
  return [...lists.values()];
}

function peakAt(picture: Whitened, sign: 1 | -1, at: { readonly x: number; readonly y: number }): number {
  return Math.max(1, sign * picture.z[Math.round(at.y) * picture.width + Math.round(at.x)]!);
}

/** Sub-pixel top of the parabolas through a maximum. */
function topOf(f: Float32Array, width: number, i: number): { x: number; y: number } {
  const x = i % width;
  const y = Math.floor(i / width);
  return { x: x + vertex(f[i - 1]!, f[i]!, f[i + 1]!), y: y + vertex(f[i - width]!, f[i]!, f[i + width]!) };
}

function vertex(a: number, b: number, c: number): number {
  const bend = a - 2 * b + c;
  return bend === 0 ? 0 : Math.max(-0.5, Math.min(0.5, (0.5 * (a - c)) / bend));
}

import { type Background, boxMean, learnBackground } from "./background.ts";
import { type ExposurePoints, exposurePoints, fitExposure } from "./exposure.ts";
import { thresholdFor } from "./false-alarms.ts";
import { bestKernels, stackSize } from "./kernels/index.ts";
import { type Circle, findLitCircle, rimMargin, viewMask } from "./lit-view.ts";
import type { VisionSettings } from "./settings.ts";
import { detectionSigma_px, findSpotKinds, type Placed, type SpotKind } from "./spot-kind.ts";
import { findTexture, measureShift, type Texture } from "./steady.ts";
import { fillLively, separateStill } from "./still-spots.ts";
import type { Sample, Survey } from "./survey.ts";
import { gaussianTaps, Whitener } from "./whitener.ts";

/** What is known of a clip's still scene, and how cells stand out from it: all that finding cells in a frame needs. */
export interface Scene {
  readonly width: number;
  readonly height: number;
  readonly still: Background;
  readonly circle: Circle | null;
  readonly inView: Uint8Array;
  readonly texture: Texture;
  /** True when there is texture enough to measure camera shake. */
  readonly steady: boolean;
  readonly exposurePoints: ExposurePoints;
  readonly kind: SpotKind;
  /** Threshold on the filtered picture, in units of its standard deviation. */
  readonly threshold: number;
  /** Standard deviation of the filtered picture; 1 if the noise were white. */
  readonly filteredSd: number;
  /** Spots that never move, scene pixels. */
  readonly stillSpots: readonly { readonly x_px: number; readonly y_px: number }[];
  /** Area looked at, pixels². */
  readonly area_px2: number;
}

/** Shifts can be trusted when they are known to better than this. */
const shiftNeeded_px = 0.12;
/** Opposite-polarity maxima a frame allowed when the threshold is checked. */
const oppositeAllowed = 3;
/** Noise that an encoder has smoothed away is still believed to be there: what it drew instead is no better known. */
const leastFilteredSd = 1;
/**
 * The check raises the threshold this far at most, or to this part of how far the cells themselves stand out: what stands
 * higher in the opposite polarity isn't noise.
 */
const highestRaised = 6.5;
const partOfCells = 0.27;
/** Above this multiple of the threshold by chance, the opposite polarity shows an encoder's artefacts, not noise. */
const artefacts = 1.3;
/** How much further than in the opposite polarity artefacts stand out in the cells' own. */
const trails = 1.25;

/**
 * Learns the still scene from a survey of the clip, and returns it with the whitener that finding cells uses.
 *
 * Throws a plain Error when the survey holds no frame.
 */
export function learnScene(survey: Survey, settings: VisionSettings): { scene: Scene; whitener: Whitener } {
  const { samples, width, height } = survey;
  if (samples.length === 0) throw new Error("a scene can't be learnt from no frames");
  const layer = learnStillLayer(samples, width, height);
  const { still, placed, inView } = layer;

  const bytes = Whitener.bytesFor(width, height, 1) + Whitener.bytesFor(width, height, 2);
  const kernels = bestKernels(bytes);
  const fine = new Whitener(kernels, still, inView, width, height, 1);
  const coarse = new Whitener(kernels, still, inView, width, height, 2);
  const look = (level: Float32Array): SpotKind[] => {
    for (const w of [fine, coarse]) w.setStill({ ...still, level }, inView);
    return findSpotKinds(fine, coarse, placed);
  };
  const kind = decideKind(settings, still, inView, width, height, placed, look);
  const whitener = kind.sigma_px >= 2.8 ? coarse : fine;

  const calm = fillLively(still, inView, width, height, Math.ceil(4 * kind.sigma_px));
  const separated = separateStill(still, calm, inView, width, height, kind, placed);
  const cleaned: Background = { ...still, level: separated.level };
  whitener.setStill(cleaned, inView);

  let lit = 0;
  for (const v of inView) lit += v;
  const sigma = detectionSigma_px(kind) / whitener.bin;
  const area = lit / (whitener.bin * whitener.bin);
  const byChance = thresholdFor(settings.falseAlarmsPerFrame, area, sigma);
  const { threshold, filteredSd } = checkThreshold(whitener, kind, placed, byChance, settings.falseAlarmsPerFrame);
  return {
    scene: {
      width,
      height,
      still: cleaned,
      circle: layer.circle,
      inView,
      texture: layer.texture,
      steady: layer.texture.sd_px < shiftNeeded_px,
      exposurePoints: exposurePoints(cleaned.level, inView),
      kind,
      threshold,
      filteredSd,
      stillSpots: separated.still,
      area_px2: lit,
    },
    whitener,
  };
}

/**
 * Size and polarity of the cells. Against a temporal background alone, cells that hardly move would show as nothing or as
 * pairs of opposite spots; so first whatever looks like a spot in the still layer but wanders is taken out of it, for either
 * polarity, and then the cells are looked at.
 */
function decideKind(
  settings: VisionSettings,
  still: Background,
  inView: Uint8Array,
  width: number,
  height: number,
  placed: readonly Placed[],
  look: (level: Float32Array) => SpotKind[],
): SpotKind {
  let level = fillLively(still, inView, width, height, 6);
  for (const first of look(boxMean(still.level, width, height, 20))) {
    if (first.seen) level = separateStill(still, level, inView, width, height, first, placed).level;
  }
  const found = look(level);
  const sign = settings.polarity === "dark" ? -1 : settings.polarity === "bright" ? 1 : found[0]!.sign;
  const chosen = found.find((k) => k.sign === sign)!;
  return { ...chosen, sigma_px: settings.spotSigma_px ?? chosen.sigma_px };
}

interface StillLayer {
  readonly still: Background;
  readonly circle: Circle | null;
  readonly inView: Uint8Array;
  readonly texture: Texture;
  readonly placed: readonly Placed[];
}

/**
 * Background, noise, view and the shake and exposure of each sample. The first background is taken as the frames
 * come; the samples are then laid over it and a sharper one is taken, twice, as each makes the other better.
 */
function learnStillLayer(samples: readonly Sample[], width: number, height: number): StillLayer {
  const n = width * height;
  const kernels = bestKernels(n * (stackSize + 8) + stackSize * 64);
  const planes = Array.from({ length: stackSize }, () => kernels.bytes(n));
  const out = { level: kernels.floats(n), spread: kernels.floats(n) };
  let placed: Placed[] = samples.map((sample) => ({
    sample,
    shift: { x: 0, y: 0 },
    exposure: { gain: 1, offset: 0 },
  }));
  let layer: StillLayer | null = null;
  for (let round = 0; round < 3; round++) {
    const bySample = new Map(placed.map((p) => [p.sample, p]));
    const still = learnBackground(
      kernels,
      samples,
      planes,
      (s, plane) => place(bySample.get(s)!, plane, width, height),
      width,
      height,
      out,
    );
    const circle = roundCircle(findLitCircle(still.level, width, height));
    const inView = viewMask(width, height, circle, circle ? widestMargin(circle, placed) : 0);
    const texture = chooseTexture(still, inView, circle, width, height);
    const next = placeAll(texture, exposurePoints(still.level, inView), samples, width);
    layer = { still, circle, inView, texture, placed: next };
    const moved = next.some((p, i) => differs(p, placed[i]!));
    placed = next;
    if (!moved) break;
  }
  const { circle, still } = layer!;
  if (!circle) return layer!;
  return {
    ...layer!,
    inView: viewMask(width, height, circle, rimMargin(still, width, height, circle, widestMargin(circle, placed))),
  };
}

/** The rim of the view is steep: what shake leaves uncorrected there would look like cells. */
function widestMargin(circle: Circle, placed: readonly Placed[]): number {
  const wobble = Math.max(...placed.map((p) => Math.max(Math.abs(p.shift.x), Math.abs(p.shift.y))));
  return Math.max(6, 0.02 * circle.radius) + Math.min(wobble, 10);
}

/** Texture within the view if there is enough; else with the rim of the view. */
function chooseTexture(
  still: Background,
  inView: Uint8Array,
  circle: Circle | null,
  width: number,
  height: number,
): Texture {
  const noise = medianOf(still.noise, inView);
  const inside = findTexture(still.level, width, height, inView, noise);
  if (inside.sd_px < shiftNeeded_px || !circle) return inside;
  return findTexture(still.level, width, height, new Uint8Array(width * height).fill(1), noise);
}

function placeAll(texture: Texture, points: ExposurePoints, samples: readonly Sample[], width: number): Placed[] {
  const steady = texture.sd_px < shiftNeeded_px;
  let shift = { x: 0, y: 0 };
  return samples.map((sample) => {
    let exposure = fitExposure(points, sample.luma, Math.round(shift.y) * width + Math.round(shift.x));
    if (steady) {
      const m = measureShift(texture, sample.luma, shift, exposure.gain, exposure.offset);
      if (m.agreement > 0.3) shift = { x: m.x, y: m.y };
      exposure = fitExposure(points, sample.luma, Math.round(shift.y) * width + Math.round(shift.x));
    }
    return { sample, shift, exposure };
  });
}

function differs(a: Placed, b: Placed): boolean {
  return (
    Math.abs(a.shift.x - b.shift.x) > 0.1 ||
    Math.abs(a.shift.y - b.shift.y) > 0.1 ||
    Math.abs(a.exposure.gain - b.exposure.gain) > 0.008 ||
    Math.abs(a.exposure.offset - b.exposure.offset) > 1
  );
}

/** Writes a sample into a plane as the unmoved scene at the usual exposure would have looked. */
function place({ sample, shift, exposure }: Placed, plane: Uint8Array, width: number, height: number): void {
  const still = Math.abs(shift.x) < 0.1 && Math.abs(shift.y) < 0.1;
  const plain = Math.abs(exposure.gain - 1) < 0.008 && Math.abs(exposure.offset) < 1;
  if (still && plain) {
    plane.set(sample.luma);
    return;
  }
  const { luma } = sample;
  const { gain, offset } = plain ? { gain: 1, offset: 0 } : exposure;
  const fx = Math.floor(shift.x);
  const fy = Math.floor(shift.y);
  const ax = still ? 0 : shift.x - fx;
  const ay = still ? 0 : shift.y - fy;
  for (let y = 0; y < height; y++) {
    const y0 = Math.min(Math.max(y + (still ? 0 : fy), 0), height - 1) * width;
    const y1 = Math.min(Math.max(y + (still ? 0 : fy) + 1, 0), height - 1) * width;
    for (let x = 0; x < width; x++) {
      const x0 = Math.min(Math.max(x + (still ? 0 : fx), 0), width - 1);
      const x1 = Math.min(x0 + 1, width - 1);
      const top = luma[y0 + x0]! * (1 - ax) + luma[y0 + x1]! * ax;
      const bottom = luma[y1 + x0]! * (1 - ax) + luma[y1 + x1]! * ax;
      const level = (top * (1 - ay) + bottom * ay - offset) / gain;
      plane[y * width + x] = level < 0 ? 0 : level > 255 ? 255 : Math.round(level);
    }
  }
}

/**
 * Measures what the filtered noise really is, and raises the threshold until the polarity that cells don't have stays
 * as quiet as it should: compressed video has heavier tails than the theory of smooth normal noise.
 */
function checkThreshold(
  whitener: Whitener,
  kind: SpotKind,
  placed: readonly Placed[],
  byChance: number,
  rate: number,
): { threshold: number; filteredSd: number } {
  const taps = gaussianTaps(detectionSigma_px(kind) / whitener.bin);
  const opposite = kind.sign === 1 ? -1 : 1;
  const every = Math.max(1, Math.floor(placed.length / 12));
  const chosen = placed.filter((_, i) => i % every === 0);
  const spreads: number[] = [];
  const heights: number[] = [];
  const reach = ((7 * kind.sigma_px) / whitener.bin) ** 2;
  for (const { sample, shift, exposure } of chosen) {
    whitener.whiten(sample.luma, shift, exposure);
    const filtered = whitener.filter(taps);
    const sd = Math.max(leastFilteredSd, whitener.filteredSd());
    spreads.push(sd);
    const cells = Array.from(whitener.peaks(kind.sign, byChance * sd)).map((i) => xy(i, whitener.width));
    for (const i of whitener.peaks(opposite, byChance * sd)) {
      if (!whitener.sees(i)) continue;
      const at = xy(i, whitener.width);
      if (cells.some((c) => (c.x - at.x) ** 2 + (c.y - at.y) ** 2 < reach)) continue;
      heights.push((opposite * filtered[i]!) / sd);
    }
  }
  spreads.sort((a, b) => a - b);
  heights.sort((a, b) => b - a);
  const allowed = Math.ceil(oppositeAllowed * rate * chosen.length);
  const needed = heights.length > allowed ? heights[allowed]! + 0.05 : 0;
  const filteredSd = spreads[spreads.length >> 1]!;
  const highest = Math.max(highestRaised, (partOfCells * kind.strength) / filteredSd);
  // Beyond noise it is the encoder that draws what isn't there, and it draws more in the cells' own polarity: their trails.
  const wanted = needed > artefacts * byChance ? trails * needed : needed;
  return { threshold: Math.max(byChance, Math.min(highest, wanted)), filteredSd };
}

function xy(i: number, width: number): { x: number; y: number } {
  return { x: i % width, y: Math.floor(i / width) };
}

/** To a hundredth of a pixel, so that the last bits of a cosine can't move a mask pixel on another machine. */
function roundCircle(c: Circle | null): Circle | null {
  const r = (v: number) => Math.round(v * 100) / 100;
  return c && { x: r(c.x), y: r(c.y), radius: r(c.radius) };
}

function medianOf(values: Float32Array, inView: Uint8Array): number {
  const v = values.filter((_, i) => inView[i] === 1 && i % 7 === 0).sort();
  return v.length ? v[v.length >> 1]! : 1;
}

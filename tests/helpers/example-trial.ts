import {
  type Cell,
  type Figure,
  type MeasuredTrial,
  type Paths,
  type Random,
  type Sightings,
  SightingsBuilder,
  seededRandom,
  type View,
} from "../../src/quantities/index.ts";

const width = 1280;
const height = 720;
const fps = 60;
const frames = 600;
const um_per_px = 0.494;
const jitter = 0.15;

/**
 * A measured trial as a measurement could have given it: invented swimmers and drifters on an invented background.
 * Nothing here was measured; it is for testing what is made of a measurement.
 */
export function exampleTrial(changes: Partial<MeasuredTrial> = {}, seed = 20): MeasuredTrial {
  const random = seededRandom(seed);
  const frameTimes_s = Float64Array.from({ length: frames }, (_, i) => i / fps);
  const tracks = Array.from({ length: 96 }, (_, i) => track(i < 70, random));
  const paths = pathsOf(tracks);
  const cells = tracks.map((it, p) => cellOf(it, p));
  const counted = cells.filter((cell) => cell.kept);
  const mean = meanOf(counted.map((cell) => cell.speed_px_s!));
  const judged = cells.filter((cell) => cell.motile !== null);
  const motile = judged.filter((cell) => cell.motile).length;
  return {
    trial: "T07",
    strain: "WT",
    culture: "C2",
    condition: "22 C",
    source: {
      recording: "swim.mp4",
      sha256: "9f2c4b0e7d5a1836c0f4e2b19a7d6c58e3b1f0a2d4c6987b5e3f1a0c2d4e6f80",
      frames,
      duration_s: (frames - 1) / fps,
      fps_median: fps,
      width_px: width,
      height_px: height,
      decoder: "ffmpeg core 0.12.10 (wasm)",
      container: "mp4",
      codec: "avc1.64001f",
      rotation_deg: 0,
      timeFactor: 1,
      timeFactorFrom: "none",
      framesExpected: frames,
    },
    settings: {
      trial: { schema: "lodewake/trial@1", trial: "T07", recording: "swim.mp4", scale: { um_per_px } },
      vision: { falseAlarmsPerFrame: 0.01, backgroundFrames: 61 },
      tracking: { gateSigmas: 4, coastFrames: 5 },
      motion: { falsePositiveRate: 0.01, shortest_s: 0.5 },
    },
    tool: { name: "lodewake", version: "0.1.0" },
    scale: { um_per_px, uncertainty_um_per_px: 0.001, from: "trial.json" },
    frameTimes_s,
    shift: {
      x_px: Float32Array.from(frameTimes_s, (t) => 0.8 * Math.sin(9 * t)),
      y_px: Float32Array.from(frameTimes_s, (t) => -0.5 * Math.sin(7 * t)),
    },
    view: viewOf(random),
    sightings: sightingsOf(paths),
    paths,
    cells,
    speed: {
      mean_px_s: mean,
      mean_um_s: scaled(mean, um_per_px),
      median_px_s: median(counted.map((cell) => cell.speed_px_s!)),
      sd_px_s: mean.standardError * Math.sqrt(mean.n),
      n_cells: counted.length,
      n_judged: judged.length,
      motile_fraction: motile / judged.length,
      ci95_motile_fraction: [motile / judged.length - 0.09, motile / judged.length + 0.08],
    },
    drift: {
      velocity_px_s: [3.1, -1.4],
      ci95_px_s: [
        [2.6, 3.6],
        [-1.9, -0.9],
      ],
      n_cells: judged.length - motile,
      from: "diffusing cells",
    },
    quality: [
      {
        check: "focus",
        figure: 2.31,
        unit: "px",
        verdict: "good",
        advice: "Cells are sharp enough to be located well.",
      },
      {
        check: "frame_rate",
        figure: 60,
        unit: "frames/s",
        verdict: "good",
        advice: "A cell moves less than half of the distance to its neighbour between frames.",
      },
      {
        check: "exposure",
        figure: 0.034,
        unit: "",
        verdict: "fair",
        advice: "3 % of the lit field is at the white limit. Lower the lamp a little.",
      },
      { check: "shake", figure: 0.8, unit: "px", verdict: "good", advice: "The camera hardly moved." },
      {
        check: "crowding",
        figure: 0.41,
        unit: "",
        verdict: "poor",
        advice:
          "Cells often come closer to each other than a step takes them. Dilute the sample, or film at twice the rate.",
      },
      {
        check: "repeated_frames",
        figure: null,
        unit: "%",
        verdict: "unknown",
        advice: "The recording is too still to tell repeated frames from real ones.",
      },
    ],
    warnings: [
      {
        code: "crowded",
        message:
          "Cells come close to each other in 41 % of frames: some paths may join two cells. Dilute the sample or film faster.",
      },
    ],
    ...changes,
  };
}

/** The example as it would be without a scale. */
export function withoutScale(): MeasuredTrial {
  const whole = exampleTrial();
  return { ...whole, scale: null, speed: { ...whole.speed!, mean_um_s: null } };
}

/** The example in which every cell only diffuses. */
export function nothingSwims(): MeasuredTrial {
  const whole = exampleTrial();
  const cells = whole.cells.map((cell) => ({
    ...cell,
    motile: cell.motile && false,
    kept: false,
    reason: "not motile",
  }));
  const n_judged = cells.filter((cell) => cell.motile !== null).length;
  const none = { mean_px_s: null, mean_um_s: null, median_px_s: null, sd_px_s: null, n_cells: 0 };
  return { ...whole, cells, speed: { ...none, n_judged, motile_fraction: 0, ci95_motile_fraction: [0, 0.041] } };
}

/** The example with an empty scene: no sightings, no paths. */
export function emptyScene(): MeasuredTrial {
  const paths = pathsOf([]);
  return exampleTrial({ paths, sightings: sightingsOf(paths), cells: [], speed: null, drift: null });
}

interface Track {
  readonly swims: boolean;
  readonly first: number;
  readonly xs: readonly number[];
  readonly ys: readonly number[];
  readonly speed: number;
  readonly began: Paths["began"][number];
  readonly ended: Paths["ended"][number];
}

function track(swims: boolean, random: Random): Track {
  const late = random() < 0.6;
  const first = late ? Math.floor(random() * frames * 0.8) : 0;
  const speed = swims ? 66 + 20 * gauss(random) : 0;
  let x = 640 + 300 * Math.sqrt(random()) * Math.cos(6.283 * random());
  let y = 360 + 300 * (2 * random() - 1) * 0.9;
  let heading = 0.5 * gauss(random);
  const xs: number[] = [];
  const ys: number[] = [];
  const reversal = frames / 2;
  for (let frame = first; frame < frames; frame++) {
    if ((x - 640) ** 2 + (y - 360) ** 2 > 345 ** 2) break;
    xs.push(x + jitter * gauss(random));
    ys.push(y + jitter * gauss(random));
    if (xs.length > 20 && random() < 0.004) break;
    const wanted = frame < reversal ? 0 : Math.PI;
    heading += 0.06 * Math.sin(wanted - heading + 0.01) + 0.06 * gauss(random);
    x += swims ? (speed / fps) * Math.cos(heading) : 0.05 + 0.35 * gauss(random);
    y += swims ? -(speed / fps) * Math.sin(heading) : 0.02 + 0.35 * gauss(random);
  }
  const ended = first + xs.length >= frames ? "last frame" : xs.length > 20 && random() < 0.5 ? "lost" : "left view";
  return { swims, first, xs, ys, speed, began: first === 0 ? "first frame" : "appeared", ended };
}

function cellOf(it: Track, p: number): Cell {
  const n = it.xs.length;
  const motile = n < 12 ? null : it.swims;
  const kept = motile === true && n >= fps / 2;
  return {
    cell: p + 1,
    first_t_s: it.first / fps,
    last_t_s: (it.first + n - 1) / fps,
    frames: n,
    motile,
    speed_px_s: n < 12 ? null : it.speed,
    speedSe_px_s: n < 12 ? null : 14 / Math.sqrt(n / fps) / 2,
    straightness: n < 12 ? null : it.swims ? 0.91 : 0.08,
    kept,
    reason: kept
      ? ""
      : motile === null
        ? "path too short to judge"
        : motile
          ? "followed for less than 0.5 s"
          : "not motile",
  };
}

function pathsOf(tracks: readonly Track[]): Paths {
  const start = Uint32Array.of(0, ...tracks.map(() => 0));
  tracks.forEach((it, p) => {
    start[p + 1] = start[p]! + it.xs.length;
  });
  const count = start[tracks.length]!;
  const frame = Uint32Array.from(tracks.flatMap((it) => it.xs.map((_, i) => it.first + i)));
  return {
    count: tracks.length,
    start,
    frame,
    t_s: Float64Array.from(frame, (f) => f / fps),
    x_px: Float64Array.from(tracks.flatMap((it) => it.xs)),
    y_px: Float64Array.from(tracks.flatMap((it) => it.ys)),
    seX_px: new Float32Array(count).fill(jitter),
    seY_px: new Float32Array(count).fill(jitter),
    sighting: Uint32Array.from({ length: count }, (_, i) => i),
    began: tracks.map((it) => it.began),
    ended: tracks.map((it) => it.ended),
  };
}

function sightingsOf(paths: Paths): Sightings {
  const rows = Array.from(paths.frame, (_, i) => i).sort((a, b) => paths.frame[a]! - paths.frame[b]! || a - b);
  const builder = new SightingsBuilder();
  for (const row of rows) {
    builder.add({
      frame: paths.frame[row]!,
      x_px: paths.x_px[row]!,
      y_px: paths.y_px[row]!,
      seX_px: jitter,
      seY_px: jitter,
      snr: 14,
      contrast: -22,
      major_px: 2.4,
      minor_px: 1.6,
      axis_rad: 0,
    });
  }
  return builder.seal();
}

function viewOf(random: Random): View {
  const background = new Uint8Array(width * height);
  for (let y = 0; y < height; y++) {
    for (let x = 0; x < width; x++) {
      const r = Math.sqrt((x - 640) ** 2 + (y - 360) ** 2);
      const lit = 168 - 44 * (r / 350) ** 2 + 5 * Math.sin(x / 90) * Math.cos(y / 70);
      const edge = Math.min(1, Math.max(0, (352 - r) / 6));
      background[y * width + x] = Math.round(14 + (lit - 14) * edge + 1.4 * gauss(random));
    }
  }
  return { width, height, background, circle: { x: 640, y: 360, radius: 348 }, still: [{ x_px: 500, y_px: 300 }] };
}

function meanOf(values: readonly number[]): Figure {
  const n = values.length;
  const value = values.reduce((a, b) => a + b, 0) / n;
  const sd = Math.sqrt(values.reduce((sum, it) => sum + (it - value) ** 2, 0) / (n - 1));
  const standardError = sd / Math.sqrt(n);
  return { value, standardError, ci95: [value - 2 * standardError, value + 2 * standardError], n };
}

function scaled(it: Figure, by: number): Figure {
  const ci95 = [it.ci95[0] * by, it.ci95[1] * by] as const;
  return { value: it.value * by, standardError: it.standardError * by, ci95, n: it.n };
}

function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const half = Math.floor(sorted.length / 2);
  return sorted.length % 2 ? sorted[half]! : (sorted[half - 1]! + sorted[half]!) / 2;
}

/** Roughly normal, from twelve uniform numbers. */
function gauss(random: Random): number {
  let sum = -6;
  for (let i = 0; i < 12; i++) sum += random();
  return sum;
}

import type { Figure, Interval } from "./figure.ts";
import type { Paths } from "./paths.ts";
import type { Sightings } from "./sightings.ts";
import type { Warning } from "./warning.ts";

/** Everything one measurement of one trial found: what reports are made from. Lengths are scene pixels unless named. */
export interface MeasuredTrial {
  readonly trial: string | null;
  readonly strain: string | null;
  readonly culture: string | null;
  readonly condition: string | null;
  readonly source: SourceFacts;
  /** Everything needed to run it again: the trial as understood and the settings in force. JSON-able. */
  readonly settings: Readonly<Record<string, unknown>>;
  readonly tool: { readonly name: string; readonly version: string };
  readonly scale: Scale | null;
  /** Capture time of every decoded frame. */
  readonly frameTimes_s: Float64Array;
  /** Camera shake: where scene pixel (0, 0) lies in the picture of each frame. */
  readonly shift: Shift;
  readonly view: View;
  readonly sightings: Sightings;
  readonly paths: Paths;
  /** One for each path, in order; `cell` is path index + 1. */
  readonly cells: readonly Cell[];
  readonly speed: SpeedFinding | null;
  readonly drift: DriftFinding | null;
  readonly quality: readonly QualityCheck[];
  readonly warnings: readonly Warning[];
}

/** The recording that was measured. */
export interface SourceFacts {
  readonly recording: string;
  readonly sha256: string;
  readonly frames: number;
  readonly duration_s: number;
  /** Median of 1 / frame interval. Null with fewer than two frames. */
  readonly fps_median: number | null;
  readonly width_px: number;
  readonly height_px: number;
  readonly decoder: string;
  readonly container: string;
  readonly codec: string;
  readonly rotation_deg: number;
  readonly timeFactor: number;
  readonly timeFactorFrom: string;
  readonly framesExpected: number | null;
}

/** Micrometres per scene pixel with its standard uncertainty, and where it came from. */
export interface Scale {
  readonly um_per_px: number;
  readonly uncertainty_um_per_px: number;
  readonly from: string;
}

/** Displacement of the picture per frame, pixels: picture position = scene position + shift. */
export interface Shift {
  readonly x_px: Float32Array;
  readonly y_px: Float32Array;
}

/** What the camera looked at: the still layer of the scene, and where it was lit. */
export interface View {
  readonly width: number;
  readonly height: number;
  /** Background picture, one byte a pixel, upright. */
  readonly background: Uint8Array;
  /** The lit circle of an eyepiece, or null when the whole frame is lit. Pixels. */
  readonly circle: { readonly x: number; readonly y: number; readonly radius: number } | null;
  /** Spots that never moved (debris, stuck cells), scene pixels. */
  readonly still: readonly { readonly x_px: number; readonly y_px: number }[];
}

/** One cell: what its path says. Null where it can't be had. */
export interface Cell {
  readonly cell: number;
  readonly first_t_s: number;
  readonly last_t_s: number;
  readonly frames: number;
  /** Distinguishable from diffusion plus flow at the stated false-positive rate; null when the path is too short to say. */
  readonly motile: boolean | null;
  readonly speed_px_s: number | null;
  readonly speedSe_px_s: number | null;
  /** Net displacement over path length, noise-corrected, 0 … 1. */
  readonly straightness: number | null;
  /** Counted in the trial's figures. */
  readonly kept: boolean;
  /** Why not kept; empty when kept. */
  readonly reason: string;
}

/** Speed over motile cells followed for 0.5 s or more, each once. `_um_s` is null without a scale. */
export interface SpeedFinding {
  readonly mean_px_s: Figure | null;
  readonly mean_um_s: Figure | null;
  readonly median_px_s: number | null;
  readonly sd_px_s: number | null;
  /** Motile cells behind the mean. */
  readonly n_cells: number;
  /** Cells for which motile or not could be told. */
  readonly n_judged: number;
  readonly motile_fraction: number | null;
  readonly ci95_motile_fraction: Interval | null;
}

/** Common flow of the fluid. Components x right, y up. */
export interface DriftFinding {
  readonly velocity_px_s: readonly [vx: number, vy: number];
  /** 95 % interval of each component. */
  readonly ci95_px_s: readonly [x: Interval, y: Interval];
  readonly n_cells: number;
  /** How it was measured: from cells that only diffuse, or from swimmers that turn. */
  readonly from: "diffusing cells" | "turning swimmers";
}

/** One check of the footage: its figure, its verdict, and what to do next time. */
export interface QualityCheck {
  /** Short stable name: `focus`, `frame_rate`. */
  readonly check: string;
  readonly figure: number | null;
  readonly unit: string;
  readonly verdict: "good" | "fair" | "poor" | "unknown";
  /** A sentence: what the figure means and what to do about it when filming again. */
  readonly advice: string;
}

import type { AssayOptions } from "./options.ts";

/** One assay worth having, and what is hard about it. */
export interface Preset {
  readonly about: string;
  readonly options: AssayOptions;
  /** What the trial is to be called; what is left out is named after the preset. */
  readonly labels?: TrialLabels;
  /** Quality of the encoded recording, where the usual one won't do: constant rate factor and speed preset. */
  readonly encoding?: { readonly crf: number; readonly preset: string };
}

/** What a trial is called. */
export interface TrialLabels {
  readonly trial?: string;
  readonly strain?: string;
  readonly culture?: string;
  readonly condition?: string;
}

const eyepiece = { eyepiece: 0.94 };

/** Assays by name, each for one thing that makes footage hard. */
export const assayPresets: Readonly<Record<string, Preset>> = {
  demo: {
    about: "the bundled demo: a phone at the eyepiece, a field that reverses twice",
    labels: { trial: "D01", strain: "QK-11", culture: "C2", condition: "22 C, fresh medium" },
    encoding: { crf: 19, preset: "medium" },
    options: {
      seed: 20260412,
      picture: { width_px: 960, height_px: 720, um_per_px: 0.432 },
      time: { seconds: 12, fps: 30 },
      sample: { depth_um: 28, flow_um_s: [1.6, -0.9] },
      swimmers: { cells: 46, speed_um_s: 38, speedCv: 0.28, moment_A_m2: 4.2e-16 },
      dead: { cells: 9 },
      stuck: { cells: 4 },
      debris: { pieces: 16, size_um: 1.6, contrast: 0.28 },
      field: {
        steps: [
          { t_s: 0, magnitude_mT: 0.4, angle_deg: 0 },
          { t_s: 4, magnitude_mT: 0.4, angle_deg: 180 },
          { t_s: 8, magnitude_mT: 0.4, angle_deg: 0 },
        ],
        ambient_mT: [0.012, 0.018],
      },
      light: { level: 172, vignette: 0.3, eyepiece: 0.96 },
      sensor: { noise: 1.8, gainDrift: 0.015 },
      phone: { shake_px: 0.35 },
    },
  },
  plain: { about: "dark cells in good focus on an even field", options: {} },
  dense: {
    about: "many cells that cross and touch",
    options: { swimmers: { cells: 160 }, dead: { cells: 20 }, sample: { depth_um: 40 } },
  },
  faint: {
    about: "low contrast in noise, cells near the limit of what can be seen",
    options: { optics: { contrast: 0.08, contrastCv: 0.2, defocus: 0.03 }, sensor: { noise: 3 } },
  },
  bright: {
    about: "bright cells on a dim field",
    options: { optics: { polarity: "bright", contrast: 0.9 }, light: { level: 70 } },
  },
  phase: { about: "dark cores with bright halos", options: { optics: { polarity: "phase", contrast: 0.35 } } },
  flow: {
    about: "everything carried along by a common flow",
    options: { sample: { flow_um_s: [9, -5] }, dead: { cells: 20 } },
  },
  dead: { about: "cells that only diffuse", options: { swimmers: { cells: 0 }, dead: { cells: 40 } } },
  empty: {
    about: "no cells, only debris",
    options: { swimmers: { cells: 0 }, dead: { cells: 0 }, stuck: { cells: 0 } },
  },
  "still-scene": {
    about: "stuck cells and debris: nothing moves",
    options: { swimmers: { cells: 0 }, dead: { cells: 0 }, stuck: { cells: 25 }, debris: { pieces: 20 } },
  },
  "shaky-phone": {
    about: "a phone at the eyepiece: shake, one knock, exposure drifting and stepping",
    options: {
      light: eyepiece,
      phone: { shake_px: 1.2, bump_px: 6 },
      sensor: { gainDrift: 0.04, gainStep: 0.06 },
    },
  },
  "shaky-stage": {
    about: "the sample moves under a still rim",
    options: { light: eyepiece, phone: { shake_px: 1, shakes: "stage", bump_px: 4 } },
  },
  "variable-rate": {
    about: "frame intervals that wander and jitter, frames dropped and repeated",
    options: { time: { jitter: 0.06, wander: 0.18, dropped: 0.02, repeated: 0.01 } },
  },
  "slow-motion": {
    about: "captured at 120 frames/s, played at 30",
    options: { time: { seconds: 4, fps: 120, container_fps: 30, exposure_s: 0.004 }, swimmers: { speed_um_s: 90 } },
  },
  "fast-cells": {
    about: "cells that go far between frames",
    options: { swimmers: { cells: 25, speed_um_s: 160 }, time: { fps: 60 } },
  },
  "crossing-debris": {
    about: "cells crossing large and small debris",
    options: { debris: { pieces: 70, size_um: 3.5, contrast: 0.35 } },
  },
  "mixed-poles": {
    about: "north- and south-seekers together, some wobbling far above thermal",
    options: { swimmers: { southFraction: 0.4, restlessness: 3 } },
  },
  "rotating-field": {
    about: "a field that turns",
    options: { field: { steps: [{ t_s: 0, magnitude_mT: 0.6, angle_deg: 0 }], rotation_hz: 0.5 } },
  },
  "deep-chamber": {
    about: "cells drifting in and out of focus",
    options: { sample: { depth_um: 90 }, swimmers: { cells: 80 }, optics: { defocus: 0.09 } },
  },
};

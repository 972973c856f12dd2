/** What `trial.json` says, with defaults filled in and everything that was left out explicitly null. */
export interface TrialDescription {
  readonly trial: string | null;
  readonly strain: string | null;
  readonly culture: string | null;
  readonly condition: string | null;
  /** Path inside the trial folder, `/` between folders. */
  readonly recording: string;
  readonly subject: Subject;
  readonly scale: ScaleDescription | null;
  /** True capture rate of slow-motion footage, frames per second; null: time stamps are capture times. */
  readonly captureFps: number | null;
  readonly field: FieldDescription | null;
  readonly sample: { readonly temperature_C: number | null; readonly cellRadius_um: number | null };
}

export type Subject = "cells" | "spot" | "both";

/** Scale as numbers, or the stage micrometer it is to be measured from. */
export type ScaleDescription =
  | { readonly from: "numbers"; readonly um_per_px: number; readonly uncertainty_um_per_px: number }
  | { readonly from: "micrometer"; readonly file: string; readonly division_um: number };

/** The applied field as steps or as a log. `ambient_mT` is [right, up] in the picture plane. */
export type FieldDescription =
  | {
      readonly from: "steps";
      /** In order of time, at least one. */
      readonly steps: readonly FieldStep[];
      readonly rotation_hz: number;
      readonly ambient_mT: readonly [x: number, y: number];
    }
  | {
      readonly from: "log";
      readonly file: string;
      readonly clockOffset_s: number | "auto";
      readonly coils: Coils | null;
      readonly ambient_mT: readonly [x: number, y: number];
    };

/** From `t_s` until the next step. Angle in degrees counter-clockwise from image right. */
export interface FieldStep {
  readonly t_s: number;
  readonly magnitude_mT: number;
  readonly angle_deg: number;
}

/** Field per current of two coil pairs, and the direction of each pair's field. */
export interface Coils {
  readonly x_mT_per_A: number;
  readonly y_mT_per_A: number;
  readonly x_deg: number;
  readonly y_deg: number;
}

/** The trial of a folder that has one recording and no `trial.json`: nothing known but the recording. */
export function bareTrial(recording: string): TrialDescription {
  return {
    trial: null,
    strain: null,
    culture: null,
    condition: null,
    recording,
    subject: "cells",
    scale: null,
    captureFps: null,
    field: null,
    sample: { temperature_C: null, cellRadius_um: null },
  };
}

/**
 * The trial as understood, in the shape of a `trial.json` that would be read as the same trial: what the settings
 * block of a result holds. Defaults are written out; what was left out is left out.
 */
export function describeTrial(trial: TrialDescription): Record<string, unknown> {
  const out: Record<string, unknown> = { schema: "lodewake/trial@1" };
  for (const name of ["trial", "strain", "culture", "condition"] as const) {
    if (trial[name] !== null) out[name] = trial[name];
  }
  out.recording = trial.recording;
  out.subject = trial.subject;
  if (trial.scale) out.scale = scaleAsWritten(trial.scale);
  if (trial.captureFps !== null) out.clock = { capture_fps: trial.captureFps };
  if (trial.field) out.field = fieldAsWritten(trial.field);
  const sample: Record<string, number> = {};
  if (trial.sample.temperature_C !== null) sample.temperature_C = trial.sample.temperature_C;
  if (trial.sample.cellRadius_um !== null) sample.cell_radius_um = trial.sample.cellRadius_um;
  if (Object.keys(sample).length > 0) out.sample = sample;
  return out;
}

function scaleAsWritten(scale: ScaleDescription): Record<string, unknown> {
  return scale.from === "numbers"
    ? { um_per_px: scale.um_per_px, uncertainty_um_per_px: scale.uncertainty_um_per_px }
    : { micrometer: scale.file, division_um: scale.division_um };
}

function fieldAsWritten(field: FieldDescription): Record<string, unknown> {
  if (field.from === "steps") {
    return {
      steps: field.steps.map((step) => ({ ...step })),
      rotation_hz: field.rotation_hz,
      ambient_mT: [...field.ambient_mT],
    };
  }
  return {
    log: field.file,
    clock_offset_s: field.clockOffset_s,
    ...(field.coils ? { coils: { ...field.coils } } : {}),
    ambient_mT: [...field.ambient_mT],
  };
}

import type { AssaySettings } from "./options.ts";
import type { Assay } from "./plan.ts";
import type { TrialLabels } from "./presets.ts";
import type { TruthRow } from "./truth.ts";

/** Relative uncertainty stated for the scale: that of a stage micrometer read with care (common practice, no source). */
const scaleUncertainty = 0.002;

/**
 * The trial.json of an assay: what the person filming would have written down, and nothing that only the simulator
 * knows.
 */
export function trialJson(settings: AssaySettings, recording: string, labels: TrialLabels): Record<string, unknown> {
  const { picture, time, field, sample } = settings;
  const { trial, strain, culture, condition } = labels;
  const slow = time.container_fps !== null && time.container_fps !== time.fps;
  return {
    schema: "lodewake/trial@1",
    // In the contract's order; those not given drop out when it is written.
    ...{ trial, strain, culture, condition },
    recording,
    subject: "cells",
    scale: {
      um_per_px: picture.um_per_px,
      uncertainty_um_per_px: Number((picture.um_per_px * scaleUncertainty).toPrecision(2)),
    },
    ...(slow ? { clock: { capture_fps: time.fps } } : {}),
    ...(field.steps.length > 0
      ? { field: { steps: field.steps, rotation_hz: field.rotation_hz, ambient_mT: field.ambient_mT } }
      : {}),
    sample: { temperature_C: sample.temperature_C, cell_radius_um: sample.cellRadius_um },
  };
}

/** Columns of truth.csv. */
const columns = "cell,kind,frame,t_s,x_px,y_px,x_um,y_um,speed_um_s,signal_to_noise,visible";

/**
 * truth.csv: a row for every swimmer and dead cell in every frame it is in view. Positions to a hundredth of a pixel
 * and of a micrometre. What keeps still (stuck cells, debris) is listed once, in truth.json.
 */
export function truthCsv(assay: Assay): string {
  const lines = [columns];
  for (const row of assay.truth().rows) if (moves(row)) lines.push(csvRow(row));
  return `${lines.join("\n")}\n`;
}

function moves(row: TruthRow): boolean {
  return row.kind === "swimmer" || row.kind === "dead";
}

function csvRow(r: TruthRow): string {
  const speed = Math.hypot(r.vx_um_s, r.vy_um_s);
  const lengths = [r.x_px, r.y_px, r.x_um, r.y_um, speed].map((v) => decimals(v, 2));
  const end = [decimals(r.signalToNoise, 1), r.visible ? 1 : 0];
  return [r.cell, r.kind, r.frame, decimals(r.t_s, 6), ...lengths, ...end].join(",");
}

/** truth.json: the assay's settings, the trial's own truth, each cell's, what keeps still, and repeated frames. */
export function truthJson(assay: Assay): Record<string, unknown> {
  const { rows, cells, trial, repeatedFrames } = assay.truth();
  const still = new Map<number, TruthRow>();
  for (const row of rows) if (!moves(row) && !still.has(row.cell)) still.set(row.cell, row);
  return {
    schema: "lodewake/assay-truth@1",
    frames: assay.frames,
    width_px: assay.width,
    height_px: assay.height,
    trial: rounded(trial),
    repeated_frames: repeatedFrames,
    settings: assay.settings,
    cells: cells.map(rounded),
    still: [...still.values()].map(({ cell, kind, x_um, y_um, signalToNoise }) =>
      rounded({ cell, kind, x_um, y_um, signal_to_noise: signalToNoise }),
    ),
  };
}

/** Numbers to six significant digits: enough for any comparison, and the same from engines that differ in the last bit. */
function rounded(record: object): Record<string, unknown> {
  const entries = Object.entries(record).map(([name, value]) => [
    name,
    typeof value === "number" && !Number.isInteger(value) ? Number(value.toPrecision(6)) : value,
  ]);
  return Object.fromEntries(entries) as Record<string, unknown>;
}

function decimals(value: number, digits: number): string {
  const text = value.toFixed(digits);
  return text.includes(".") ? text.replace(/\.?0+$/, "").replace(/^-0$/, "0") : text;
}

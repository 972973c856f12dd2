export { trialJson, truthCsv, truthJson } from "./files.ts";
export type { AssayOptions, AssaySettings, FieldStep } from "./options.ts";
export { type Assay, planAssay } from "./plan.ts";
export { assayPresets, type Preset, type TrialLabels } from "./presets.ts";
export type { AssayTruth, TrialTruth, TruthCell, TruthRow } from "./truth.ts";

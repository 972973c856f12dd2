export { chooseRecording, isRecordingName } from "./choose-recording.ts";
export { readTrial } from "./read-trial.ts";
export type { FieldDescription, ScaleDescription, TrialDescription } from "./trial-description.ts";
export { bareTrial, describeTrial } from "./trial-description.ts";

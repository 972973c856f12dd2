export type { Context, Progress } from "./context.ts";
export type { AbortSignalLike } from "./errors.ts";
export { InputError, Stopped, throwIfStopped } from "./errors.ts";
export type { Figure, Interval, Refusal } from "./figure.ts";
export { isRefusal, refuse } from "./figure.ts";
export type { Appetite, Frame } from "./frame.ts";
export type {
  Cell,
  DriftFinding,
  MeasuredTrial,
  QualityCheck,
  Scale,
  Shift,
  SourceFacts,
  SpeedFinding,
  View,
} from "./measured-trial.ts";
export type { Beginning, Ending, Paths } from "./paths.ts";
export { duration_s, rowsOf } from "./paths.ts";
export type { Random } from "./random.ts";
export { seededRandom } from "./random.ts";
export type { Sighting, Sightings } from "./sightings.ts";
export { SightingsBuilder } from "./sightings.ts";
export type { TimeLeft } from "./time-left.ts";
export { timeLeft } from "./time-left.ts";
export type { Warning } from "./warning.ts";

export type { MeasureOrder } from "./contract/measure.ts";
export { startMeasuring } from "./host/measure.ts";
export type { Run } from "./host/one-answer.ts";
export { startMakingResults } from "./host/results.ts";
export type { TimeLeft } from "./host/time-left.ts";
export { timeLeft } from "./host/time-left.ts";

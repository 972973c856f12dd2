export type { MeasureOrder } from "./contract/measure.ts";
export type { OpenedPictures } from "./contract/pictures.ts";
export { startMeasuring } from "./host/measure.ts";
export type { Run } from "./host/one-answer.ts";
export type { PicturesWorker } from "./host/pictures.ts";
export { openPictures } from "./host/pictures.ts";
export { startMakingResults } from "./host/results.ts";

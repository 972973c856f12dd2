export type { MotionModel } from "./motion-model.ts";
export { defaultTrackingSettings, type TrackingSettings } from "./settings.ts";
export { type Tracked, type TrackingView, trackCells } from "./track-cells.ts";

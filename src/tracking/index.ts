export type { MotionModel } from "./motion-model.ts";
export { defaultTrackingSettings, type TrackingSettings } from "./settings.ts";
export { type Tracked, trackCells } from "./track-cells.ts";
export type { TrackingView } from "./view.ts";

import { defaultMotionSettings, type MotionSettings } from "../analysis/motion/index.ts";
import { defaultTrackingSettings, type TrackingSettings } from "../tracking/index.ts";
import { defaultVisionSettings, type VisionSettings } from "../vision/index.ts";

/** Everything that can be set about a measurement and changes its numbers. Recorded in the result. */
export interface MeasureSettings {
  readonly vision: VisionSettings;
  readonly tracking: TrackingSettings;
  readonly motion: MotionSettings;
}

export const defaultMeasureSettings: MeasureSettings = {
  vision: defaultVisionSettings,
  tracking: defaultTrackingSettings,
  motion: defaultMotionSettings,
};

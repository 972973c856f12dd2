/** What of the finding of cells can be set. Recorded in every result. */
export interface VisionSettings {
  /** False sightings allowed in one frame, on average, by chance alone. */
  readonly falseAlarmsPerFrame: number;
  /** Are cells darker or brighter than the background, or is that to be found out? */
  readonly polarity: "auto" | "dark" | "bright";
  /** Standard deviation of a cell's picture, pixels; null to find it from the clip. */
  readonly spotSigma_px: number | null;
  /** Length of footage from which the still background is learnt, seconds. */
  readonly surveySpan_s: number;
}

export const defaultVisionSettings: VisionSettings = {
  falseAlarmsPerFrame: 0.1,
  polarity: "auto",
  spotSigma_px: null,
  surveySpan_s: 8,
};

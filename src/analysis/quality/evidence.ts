/** What of the footage is looked at, gathered by whoever measured it. */
export interface FootageEvidence {
  /** Capture time of every frame. */
  readonly times_s: Float64Array;
  readonly repeatedFrames: number;
  readonly framesExpected: number | null;
  /** Displacement of the picture per frame, pixels; null when there was nothing to measure it by. */
  readonly shift: { readonly x_px: Float32Array; readonly y_px: Float32Array } | null;
  /** Brightness of each frame over that of the usual frame. */
  readonly gain: Float32Array;
  /** Opposite-polarity maxima above the threshold: what noise alone does. Null when not counted. */
  readonly falseAlarmsPerFrame: number | null;
  /** Lit part of the picture, 0 … 1, and part of that which is black or white, 0 … 1. */
  readonly litShare: number;
  readonly clippedShare: number;
  /** Standard deviation of a cell's picture, pixels; null when no cell was seen. */
  readonly spotSigma_px: number | null;
  /** Narrow standard deviation and signal over noise of every sighting. */
  readonly minor_px: Float32Array;
  readonly snr: Float32Array;
  /** Median distance from a sighting to its nearest neighbour, pixels; null when no frame has two. */
  readonly neighbourDistance_px: number | null;
  /** Duration of every path, seconds, and median speed of the motile cells, pixels per second (null: none). */
  readonly pathDurations_s: readonly number[];
  readonly typicalSpeed_px_s: number | null;
}

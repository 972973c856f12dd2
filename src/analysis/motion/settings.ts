/** What of the analysis of motion can be set. Recorded in every result. */
export interface MotionSettings {
  /** Cells followed for less than this don't count in the trial's figures, seconds. */
  readonly shortestPath_s: number;
  /** Chance that any of a clip's cells is called motile though it only diffuses. */
  readonly falsePositiveRate: number;
  /** Shortest stretch over which velocities are taken, seconds: quicker to-and-fro is the cell's wobble, not its way. */
  readonly shortestWindow_s: number;
  /** Longest such stretch, seconds. */
  readonly longestWindow_s: number;
}

export const defaultMotionSettings: MotionSettings = {
  shortestPath_s: 0.5,
  falsePositiveRate: 0.01,
  shortestWindow_s: 0.066,
  longestWindow_s: 0.25,
};

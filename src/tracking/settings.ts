/** What of the following of cells can be set. Recorded in every result. */
export interface TrackingSettings {
  /** A sighting belongs to a prediction only within this squared distance over its covariance (chi-squared, 2 degrees). */
  readonly gate: number;
  /** How long a cell that is not sighted is expected back, seconds. */
  readonly coast_s: number;
  /** Longest gap over which two pieces of path are joined afterwards, seconds. */
  readonly join_s: number;
  /** Paths of fewer sightings are taken for noise. */
  readonly fewestSightings: number;
}

export const defaultTrackingSettings: TrackingSettings = { gate: 16, coast_s: 0.25, join_s: 0.5, fewestSightings: 4 };

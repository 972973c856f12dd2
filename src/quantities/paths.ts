/** Why a path began. */
export type Beginning = "first frame" | "entered view" | "appeared";
/** Why a path ended. */
export type Ending = "last frame" | "left view" | "lost";

/**
 * Paths of cells as columns: the points of path p are rows `start[p] … start[p + 1] - 1`, in frame order.
 *
 * Positions are scene pixels as in {@link Sightings} (shake removed, x right, y down). Only frames in which the cell
 * was sighted have a row; frames it was coasted through have none.
 */
export interface Paths {
  readonly count: number;
  /** Length count + 1: first row of each path, and one past the last. */
  readonly start: Uint32Array;
  readonly frame: Uint32Array;
  readonly t_s: Float64Array;
  readonly x_px: Float64Array;
  readonly y_px: Float64Array;
  readonly seX_px: Float32Array;
  readonly seY_px: Float32Array;
  /** Row in the sightings table that each point came from. */
  readonly sighting: Uint32Array;
  readonly began: readonly Beginning[];
  readonly ended: readonly Ending[];
}

/** Rows of path `p` as [first, one past last]. */
export function rowsOf(paths: Paths, p: number): [first: number, end: number] {
  return [paths.start[p] as number, paths.start[p + 1] as number];
}

/** Time from first to last sighting of path `p`, seconds. */
export function duration_s(paths: Paths, p: number): number {
  const [a, b] = rowsOf(paths, p);
  return (paths.t_s[b - 1] as number) - (paths.t_s[a] as number);
}

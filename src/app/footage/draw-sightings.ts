import { type MeasuredTrial, type Paths, rowsOf } from "../../quantities/index.ts";
import { sightingsAt } from "./rows-at.ts";
import { toStage, type ViewTransform } from "./view-transform.ts";

/** What is drawn over one frame. */
export interface SightingLook {
  readonly frame: number;
  /** Paths that stand out; null when all count alike. */
  readonly lit: ReadonlySet<number> | null;
  /** Path of each sighting, −1 for none: {@link pathOfSightings}. */
  readonly pathOf: Int32Array;
}

/** For each of `count` sightings the path it belongs to, −1 for none. */
export function pathOfSightings(paths: Paths, count: number): Int32Array {
  const pathOf = new Int32Array(count).fill(-1);
  for (let p = 0; p < paths.count; p++) {
    const [first, end] = rowsOf(paths, p);
    for (let row = first; row < end; row++) pathOf[paths.sighting[row]!] = p;
  }
  return pathOf;
}

/**
 * Draws a ring around every sighting of a frame, in CSS pixels of the stage: an ellipse along the body, three standard
 * deviations of the spot out so that the cell itself stays to be seen. Those that don't stand out are faint.
 */
export function drawSightings(
  pen: CanvasRenderingContext2D,
  measured: MeasuredTrial,
  view: ViewTransform,
  { frame, lit, pathOf }: SightingLook,
): void {
  const { sightings, shift } = measured;
  const [first, end] = sightingsAt(sightings, frame);
  const [dx, dy] = [shift.x_px[frame] ?? 0, shift.y_px[frame] ?? 0];
  const clear = new Path2D();
  const faint = new Path2D();
  for (let row = first; row < end; row++) {
    const { x, y } = toStage(view, { x: sightings.x_px[row]! + dx, y: sightings.y_px[row]! + dy });
    const long = Math.max(5, 3 * sightings.major_px[row]! * view.zoom);
    const short = Math.max(5, 3 * sightings.minor_px[row]! * view.zoom);
    // Angles are counter-clockwise, the canvas counts clockwise.
    const turn = -sightings.axis_rad[row]!;
    const rings = lit === null || lit.has(pathOf[row]!) ? clear : faint;
    rings.moveTo(x + long * Math.cos(turn), y + long * Math.sin(turn));
    rings.ellipse(x, y, long, short, turn, 0, 2 * Math.PI);
  }
  pen.setLineDash([]);
  strokeRings(pen, faint, 0.25);
  strokeRings(pen, clear, 1);
}

function strokeRings(pen: CanvasRenderingContext2D, rings: Path2D, opacity: number): void {
  pen.globalAlpha = opacity;
  pen.strokeStyle = "rgb(8 12 16 / 0.55)";
  pen.lineWidth = 2.6;
  pen.stroke(rings);
  pen.strokeStyle = "#f4f7f9";
  pen.lineWidth = 1.1;
  pen.stroke(rings);
  pen.globalAlpha = 1;
}

import type { MeasuredTrial } from "../../quantities/index.ts";
import { sightingsAt } from "./rows-at.ts";
import { toStage, type ViewTransform } from "./view-transform.ts";

/**
 * Draws a ring around every sighting of a frame, in CSS pixels of the stage: an ellipse along the body, three standard
 * deviations of the spot out so that the cell itself stays to be seen.
 */
export function drawSightings(
  pen: CanvasRenderingContext2D,
  measured: MeasuredTrial,
  view: ViewTransform,
  frame: number,
): void {
  const { sightings, shift } = measured;
  const [first, end] = sightingsAt(sightings, frame);
  const [dx, dy] = [shift.x_px[frame] ?? 0, shift.y_px[frame] ?? 0];
  const rings = new Path2D();
  for (let row = first; row < end; row++) {
    const { x, y } = toStage(view, { x: sightings.x_px[row]! + dx, y: sightings.y_px[row]! + dy });
    const long = Math.max(5, 3 * sightings.major_px[row]! * view.zoom);
    const short = Math.max(5, 3 * sightings.minor_px[row]! * view.zoom);
    // Angles are counter-clockwise, the canvas counts clockwise.
    const turn = -sightings.axis_rad[row]!;
    rings.moveTo(x + long * Math.cos(turn), y + long * Math.sin(turn));
    rings.ellipse(x, y, long, short, turn, 0, 2 * Math.PI);
  }
  pen.setLineDash([]);
  pen.strokeStyle = "rgb(8 12 16 / 0.55)";
  pen.lineWidth = 2.6;
  pen.stroke(rings);
  pen.strokeStyle = "#f4f7f9";
  pen.lineWidth = 1.1;
  pen.stroke(rings);
}

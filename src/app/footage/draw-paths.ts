import { type MeasuredTrial, rowsOf } from "../../quantities/index.ts";
import { firstRowFrom, isUnderWay } from "./rows-at.ts";
import { toStage, type ViewTransform } from "./view-transform.ts";

/** What is drawn over one frame. */
export interface PathLook {
  readonly frame: number;
  readonly tail_s: number | null;
  /** Chosen cell as index of its path. */
  readonly cell: number | null;
  /** Paths that stand out; null when all count alike. */
  readonly lit: ReadonlySet<number> | null;
}

const casing = "rgb(8 12 16 / 0.6)";
const kinds = {
  motile: { colour: "#ffa62b", dash: [] },
  still: { colour: "#8fd0ff", dash: [1.5, 3] },
  unsure: { colour: "#f2f2f2", dash: [5, 3] },
} as const;
type Kind = keyof typeof kinds;

/** Widths of a path's pieces from its far end to its cell: the way it goes shows without colour. */
const widths = [0.7, 1.1, 1.6, 2.2];

/**
 * Draws the paths under way in a frame, in CSS pixels of the stage: each a tail that swells towards its cell, with an
 * arrow head on cells that swim. Solid and orange swims, dotted and blue doesn't, dashed and white can't be told.
 */
export function drawPaths(
  pen: CanvasRenderingContext2D,
  measured: MeasuredTrial,
  view: ViewTransform,
  look: PathLook,
): void {
  const { paths } = measured;
  const order: number[] = [];
  for (let p = 0; p < paths.count; p++) if (p !== look.cell && isUnderWay(paths, p, look.frame)) order.push(p);
  const isLit = (p: number) => look.lit === null || look.lit.has(p);
  order.sort((a, b) => Number(isLit(a)) - Number(isLit(b)) || a - b);
  pen.lineJoin = "round";
  for (const p of order) {
    pen.globalAlpha = isLit(p) ? 1 : 0.22;
    drawTail(pen, measured, view, look, p);
  }
  pen.globalAlpha = 1;
  if (look.cell !== null && look.cell < paths.count) drawChosen(pen, measured, view, look, look.cell);
}

function kindOf({ cells }: MeasuredTrial, p: number): Kind {
  const motile = cells[p]?.motile ?? null;
  return motile === null ? "unsure" : motile ? "motile" : "still";
}

function drawTail(
  pen: CanvasRenderingContext2D,
  measured: MeasuredTrial,
  view: ViewTransform,
  look: PathLook,
  p: number,
): void {
  const { paths, frameTimes_s } = measured;
  const [first, end] = rowsOf(paths, p);
  const next = firstRowFrom(paths, p, look.frame);
  const last = next < end && paths.frame[next] === look.frame ? next : next - 1;
  const from_s = look.tail_s === null ? Number.NEGATIVE_INFINITY : frameTimes_s[look.frame]! - look.tail_s;
  let start = last;
  while (start > first && paths.t_s[start - 1]! >= from_s) start--;
  const whole = pointsOf(measured, view, look.frame, start, last);
  const kind = kindOf(measured, p);
  pen.lineCap = "butt";
  if (kind === "motile") {
    const body = bodyOf(measured, view, last);
    const points = clearOf(body, whole);
    stroke(pen, points, casing, 3.4, []);
    const piece = Math.max(1, Math.ceil((points.length - 1) / widths.length));
    for (let i = widths.length - 1, to = points.length - 1; to > 0; to -= piece, i--) {
      stroke(pen, points.slice(Math.max(0, to - piece), to + 1), kinds.motile.colour, widths[Math.max(0, i)]!, []);
    }
    drawHead(pen, whole, body, kinds.motile.colour);
    return;
  }
  stroke(pen, whole, casing, 3.4, []);
  stroke(pen, whole, kinds[kind].colour, 1.4, kinds[kind].dash);
}

/** Half the length of the cell at a row of the path table, CSS pixels, with a little room around it. */
function bodyOf({ paths, sightings }: MeasuredTrial, view: ViewTransform, row: number): number {
  return Math.max(5, 3 * (sightings.major_px[paths.sighting[row]!] ?? 0) * view.zoom) + 1.5;
}

/** The points of a path up to where its cell begins, so that the cell stays to be seen. */
function clearOf(body: number, points: readonly StagePoint[]): readonly StagePoint[] {
  const tip = points.at(-1);
  const last = points.findLastIndex((point) => tip && Math.hypot(tip.x - point.x, tip.y - point.y) >= body);
  return points.slice(0, last + 1);
}

/** The whole path of the chosen cell, before and after the frame alike, in white on a heavy casing. */
function drawChosen(
  pen: CanvasRenderingContext2D,
  measured: MeasuredTrial,
  view: ViewTransform,
  { frame }: PathLook,
  p: number,
): void {
  const { paths } = measured;
  const [first, end] = rowsOf(paths, p);
  const split = Math.max(first, Math.min(end, firstRowFrom(paths, p, frame + 1)));
  const before = pointsOf(measured, view, frame, first, split - 1);
  const after = pointsOf(measured, view, frame, Math.max(first, split - 1), end - 1);
  pen.lineCap = "round";
  stroke(pen, after, "rgb(8 12 16 / 0.55)", 3, []);
  stroke(pen, after, "#ffffff", 1.2, [1.5, 4]);
  stroke(pen, before, "rgb(8 12 16 / 0.85)", 5, []);
  stroke(pen, before, "#ffffff", 2.4, []);
  if (kindOf(measured, p) === "motile")
    drawHead(pen, before, bodyOf(measured, view, Math.max(first, split - 1)), "#ffffff");
}

interface StagePoint {
  readonly x: number;
  readonly y: number;
}

/** Rows `first` … `last` of the path table on the stage, as the picture of `frame` lies. */
function pointsOf(
  { paths, shift }: MeasuredTrial,
  view: ViewTransform,
  frame: number,
  first: number,
  last: number,
): StagePoint[] {
  const [dx, dy] = [shift.x_px[frame] ?? 0, shift.y_px[frame] ?? 0];
  const points: StagePoint[] = [];
  for (let row = first; row <= last; row++) {
    points.push(toStage(view, { x: paths.x_px[row]! + dx, y: paths.y_px[row]! + dy }));
  }
  return points;
}

function stroke(
  pen: CanvasRenderingContext2D,
  points: readonly StagePoint[],
  colour: string,
  width: number,
  dash: readonly number[],
): void {
  if (points.length < 2) return;
  pen.beginPath();
  for (const [i, { x, y }] of points.entries()) i === 0 ? pen.moveTo(x, y) : pen.lineTo(x, y);
  pen.strokeStyle = colour;
  pen.lineWidth = width;
  pen.setLineDash([...dash]);
  pen.stroke();
}

/** An arrow head just ahead of the cell, along the last stretch long enough to have a direction. */
function drawHead(pen: CanvasRenderingContext2D, points: readonly StagePoint[], body: number, colour: string): void {
  const tip = points.at(-1);
  const from = points.findLast((point) => tip && Math.hypot(tip.x - point.x, tip.y - point.y) >= 6);
  if (!tip || !from) return;
  const angle = Math.atan2(tip.y - from.y, tip.x - from.x);
  pen.save();
  pen.translate(tip.x, tip.y);
  pen.rotate(angle);
  pen.beginPath();
  pen.moveTo(body + 6.5, 0);
  pen.lineTo(body, -3.6);
  pen.lineTo(body, 3.6);
  pen.closePath();
  pen.setLineDash([]);
  pen.lineWidth = 1.6;
  pen.strokeStyle = casing;
  pen.stroke();
  pen.fillStyle = colour;
  pen.fill();
  pen.restore();
}

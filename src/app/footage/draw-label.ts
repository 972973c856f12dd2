import type { MeasuredTrial } from "../../quantities/index.ts";
import { speedText } from "../cells/cells-row.tsx";
import { speedUnit } from "../findings/findings.ts";
import { firstRowFrom, isUnderWay } from "./rows-at.ts";
import { toStage, type ViewTransform } from "./view-transform.ts";

/** Names the chosen cell beside where it is in a frame, with its speed; nothing when it isn't there. */
export function drawLabel(
  pen: CanvasRenderingContext2D,
  measured: MeasuredTrial,
  view: ViewTransform,
  frame: number,
  p: number,
): void {
  const { paths, cells, shift } = measured;
  if (!isUnderWay(paths, p, frame)) return;
  const row = firstRowFrom(paths, p, frame);
  const at = toStage(view, {
    x: paths.x_px[row]! + (shift.x_px[frame] ?? 0),
    y: paths.y_px[row]! + (shift.y_px[frame] ?? 0),
  });
  const cell = cells[p]!;
  const { unit, factor } = speedUnit(measured);
  const speed = speedText(cell, factor);
  const text = `cell ${cell.cell}${speed && `  ${speed} ${unit}`}`;
  pen.font = "600 12px ui-sans-serif, system-ui, sans-serif";
  const width = pen.measureText(text).width + 14;
  const left = at.x + 16 + width > pen.canvas.clientWidth ? at.x - 16 - width : at.x + 16;
  const top = Math.max(4, at.y - 30);
  pen.fillStyle = "rgb(16 22 28 / 0.86)";
  pen.beginPath();
  pen.roundRect(left, top, width, 22, 4);
  pen.fill();
  pen.fillStyle = "#ffffff";
  pen.textBaseline = "middle";
  pen.fillText(text, left + 7, top + 11.5);
}

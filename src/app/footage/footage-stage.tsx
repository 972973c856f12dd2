import { type Dispatch, useCallback, useMemo } from "react";
import type { MeasuredTrial } from "../../quantities/index.ts";
import type { Viewing, ViewingAction } from "../state/viewing.ts";
import { drawLabel } from "./draw-label.ts";
import { drawPaths } from "./draw-paths.ts";
import { drawSightings, pathOfSightings } from "./draw-sightings.ts";
import "./footage-stage.css";
import { greyCanvas } from "./grey-canvas.ts";
import { pathNear, sightingsAt } from "./rows-at.ts";
import { StageNote } from "./stage-note.tsx";
import { useCanvas } from "./use-canvas.ts";
import type { Pictures } from "./use-pictures.ts";
import { usePointer } from "./use-pointer.ts";
import { useSize } from "./use-size.ts";
import { useViewTransform } from "./use-view-transform.ts";
import { type Point, type Size, toPicture } from "./view-transform.ts";
import { ZoomButtons } from "./zoom-buttons.tsx";

/** Distance in CSS pixels within which a click finds a cell. */
const reach = 14;

export interface FootageStageProps {
  readonly pictures: Pictures;
  readonly measured: MeasuredTrial | null;
  readonly view: Viewing;
  readonly lit: ReadonlySet<number> | null;
  readonly dispatch: Dispatch<ViewingAction>;
}

/** The footage: the picture of a frame, with what was found in that very frame drawn over it. */
export function FootageStage({ pictures, measured, view, lit, dispatch }: FootageStageProps) {
  const [stage, size] = useSize<HTMLDivElement>();
  const { opened, picture, problem } = pictures;
  const width = opened?.width ?? measured?.view.width ?? 16;
  const height = opened?.height ?? measured?.view.height ?? 9;
  const pictureSize: Size = useMemo(() => ({ width, height }), [width, height]);
  const control = useViewTransform(pictureSize, size);
  const { view: transform } = control;

  // Without pictures the still background stands in for them.
  const background = useMemo(
    () =>
      problem && measured ? greyCanvas(measured.view.width, measured.view.height, measured.view.background) : null,
    [problem, measured],
  );
  const pathOf = useMemo(
    () => (measured ? pathOfSightings(measured.paths, measured.sightings.count) : null),
    [measured],
  );
  const image = picture?.bitmap ?? background;
  const frame = picture?.frame ?? view.frame;

  const paintPicture = useCallback(
    (pen: CanvasRenderingContext2D) => {
      if (!image) return;
      pen.imageSmoothingEnabled = transform.zoom < 3;
      pen.imageSmoothingQuality = "high";
      pen.drawImage(image, transform.left, transform.top, width * transform.zoom, height * transform.zoom);
    },
    [image, transform, width, height],
  );
  const paintFindings = useCallback(
    (pen: CanvasRenderingContext2D) => {
      if (!measured || !pathOf || !image) return;
      if (view.paths) drawPaths(pen, measured, transform, { frame, tail_s: view.tail_s, cell: view.cell, lit });
      if (view.sightings) drawSightings(pen, measured, transform, { frame, lit, pathOf });
      if (view.cell !== null) drawLabel(pen, measured, transform, frame, view.cell);
    },
    [measured, pathOf, image, transform, frame, lit, view.paths, view.tail_s, view.cell, view.sightings],
  );
  const pictureCanvas = useCanvas(size, paintPicture);
  const findingsCanvas = useCanvas(size, paintFindings);

  const pick = (at: Point) => {
    if (!measured) return;
    const { x, y } = toPicture(transform, at);
    const [dx, dy] = [measured.shift.x_px[frame] ?? 0, measured.shift.y_px[frame] ?? 0];
    dispatch({ type: "cell chosen", cell: pathNear(measured.paths, frame, x - dx, y - dy, reach / transform.zoom) });
  };
  usePointer(stage, { pick, zoom: control.zoom, move: control.move });

  const sighted = measured ? sightingsAt(measured.sightings, frame) : null;
  const count = sighted ? sighted[1] - sighted[0] : null;
  return (
    <div className="footage-stage" ref={stage}>
      <canvas ref={pictureCanvas} />
      <canvas
        ref={findingsCanvas}
        role="img"
        aria-label={`Frame ${frame + 1} of ${view.frames}${count === null ? "" : `, cells sighted: ${count}`}`}
        data-frame={picture ? frame : undefined}
      />
      <StageNote pictures={pictures} hasBackground={background !== null} />
      {measured?.scale && image && (
        <ScaleBar um_per_px={measured.scale.um_per_px} zoom={transform.zoom} room={size.width} />
      )}
      <ZoomButtons control={control} />
    </div>
  );
}

/** A bar of a round length, about an eighth of the stage long. */
function ScaleBar({ um_per_px, zoom, room }: { um_per_px: number; zoom: number; room: number }) {
  const most_um = (room / 6) * (um_per_px / zoom);
  const power = 10 ** Math.floor(Math.log10(most_um));
  const length_um = ([5, 2, 1].find((digit) => digit * power <= most_um) ?? 1) * power;
  return (
    <div className="scale-bar">
      {Number(length_um.toPrecision(1))} µm
      <span style={{ width: (length_um / um_per_px) * zoom }} />
    </div>
  );
}

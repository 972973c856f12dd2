import { useMemo, useState } from "react";
import { fitted, moved, type Point, type Size, type ViewTransform, zoomedAt } from "./view-transform.ts";

/** How the picture lies on the stage, and ways to change it. */
export interface ViewControl {
  readonly view: ViewTransform;
  zoom(factor: number, at?: Point): void;
  move(by: Point): void;
  fit(): void;
  readonly isFitted: boolean;
}

/** The picture fitted to the stage until someone zooms in; fitted again when the stage or the picture changes size. */
export function useViewTransform(picture: Size, stage: Size): ViewControl {
  const whole = useMemo(() => fitted(picture, stage), [picture, stage]);
  const [chosen, setChosen] = useState<{ readonly whole: ViewTransform; readonly view: ViewTransform } | null>(null);
  const view = chosen?.whole === whole ? chosen.view : whole;
  const change = (next: (view: ViewTransform) => ViewTransform) =>
    setChosen((last) => ({ whole, view: next(last?.whole === whole ? last.view : whole) }));
  const middle = { x: stage.width / 2, y: stage.height / 2 };
  return {
    view,
    zoom: (factor, at = middle) => change((last) => zoomedAt(last, factor, at, picture, stage)),
    move: (by) => change((last) => moved(last, by, picture, stage)),
    fit: () => setChosen(null),
    isFitted: view.zoom <= whole.zoom * 1.001,
  };
}

/** Where the picture lies on the stage. Stage lengths are CSS pixels; `zoom` is CSS pixels a picture pixel. */
export interface ViewTransform {
  readonly zoom: number;
  /** Stage position of the picture's top-left corner. */
  readonly left: number;
  readonly top: number;
}

export interface Size {
  readonly width: number;
  readonly height: number;
}

export interface Point {
  readonly x: number;
  readonly y: number;
}

/** The whole picture, as large as fits, in the middle. */
export function fitted(picture: Size, stage: Size): ViewTransform {
  const zoom = Math.min(stage.width / picture.width, stage.height / picture.height);
  return {
    zoom,
    left: (stage.width - picture.width * zoom) / 2,
    top: (stage.height - picture.height * zoom) / 2,
  };
}

/**
 * Zoomed by `factor` about a point of the stage, which keeps its place in the picture. Never smaller than fitted,
 * never larger than 16 CSS pixels a picture pixel, and never away from the stage.
 */
export function zoomedAt(view: ViewTransform, factor: number, at: Point, picture: Size, stage: Size): ViewTransform {
  const least = fitted(picture, stage).zoom;
  const zoom = Math.max(least, Math.min(Math.max(16, least), view.zoom * factor));
  const by = zoom / view.zoom;
  return held({ zoom, left: at.x - (at.x - view.left) * by, top: at.y - (at.y - view.top) * by }, picture, stage);
}

/** Moved by some CSS pixels, as far as the picture still covers the stage. */
export function moved(view: ViewTransform, by: Point, picture: Size, stage: Size): ViewTransform {
  return held({ ...view, left: view.left + by.x, top: view.top + by.y }, picture, stage);
}

/** Stage position of a picture position. Whole numbers of picture pixels are centres of pixels. */
export function toStage(view: ViewTransform, { x, y }: Point): Point {
  return { x: view.left + (x + 0.5) * view.zoom, y: view.top + (y + 0.5) * view.zoom };
}

/** Picture position of a stage position: the inverse of {@link toStage}. */
export function toPicture(view: ViewTransform, { x, y }: Point): Point {
  return { x: (x - view.left) / view.zoom - 0.5, y: (y - view.top) / view.zoom - 0.5 };
}

function held(view: ViewTransform, picture: Size, stage: Size): ViewTransform {
  return {
    zoom: view.zoom,
    left: heldAlong(view.left, picture.width * view.zoom, stage.width),
    top: heldAlong(view.top, picture.height * view.zoom, stage.height),
  };
}

function heldAlong(start: number, length: number, room: number): number {
  if (length <= room) return (room - length) / 2;
  return Math.min(0, Math.max(room - length, start));
}

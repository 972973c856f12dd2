/** Where cells can be seen, scene pixels. */
export interface TrackingView {
  readonly width: number;
  readonly height: number;
  readonly circle: { readonly x: number; readonly y: number; readonly radius: number } | null;
  readonly area_px2: number;
}

/** Distance from a place in view to where the view ends, pixels: negative outside. */
export function toEdge(view: TrackingView, x: number, y: number): number {
  const frame = Math.min(x, y, view.width - 1 - x, view.height - 1 - y);
  if (!view.circle) return frame;
  const { circle } = view;
  return Math.min(frame, circle.radius - Math.sqrt((x - circle.x) ** 2 + (y - circle.y) ** 2));
}

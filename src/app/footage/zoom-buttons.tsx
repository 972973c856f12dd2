import { Icon } from "../chrome/icon.tsx";
import type { ViewControl } from "./use-view-transform.ts";

/** Larger, smaller, and the whole picture. */
export function ZoomButtons({ control }: { control: ViewControl }) {
  return (
    <div className="zoom-buttons">
      <button type="button" aria-label="Zoom in" title="Zoom in (wheel)" onClick={() => control.zoom(1.5)}>
        <Icon name="plus" />
      </button>
      <button
        type="button"
        aria-label="Zoom out"
        title="Zoom out (wheel)"
        disabled={control.isFitted}
        onClick={() => control.zoom(1 / 1.5)}
      >
        <Icon name="minus" />
      </button>
      <button
        type="button"
        aria-label="Show the whole picture"
        title="Show the whole picture"
        disabled={control.isFitted}
        onClick={control.fit}
      >
        <Icon name="whole" />
      </button>
    </div>
  );
}

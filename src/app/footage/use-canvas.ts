import { type RefObject, useLayoutEffect, useRef } from "react";
import type { Size } from "./view-transform.ts";

/**
 * A canvas as sharp as the screen, painted anew whenever `paint` or the size changes. `paint` draws in CSS pixels on
 * an empty canvas; keep it the same function while nothing changed.
 */
export function useCanvas(
  size: Size,
  paint: (pen: CanvasRenderingContext2D) => void,
): RefObject<HTMLCanvasElement | null> {
  const ref = useRef<HTMLCanvasElement>(null);
  useLayoutEffect(() => {
    const canvas = ref.current;
    const pen = canvas?.getContext("2d");
    if (!canvas || !pen || size.width === 0) return;
    const sharpness = window.devicePixelRatio || 1;
    const [width, height] = [Math.round(size.width * sharpness), Math.round(size.height * sharpness)];
    if (canvas.width !== width || canvas.height !== height) {
      canvas.width = width;
      canvas.height = height;
    }
    pen.setTransform(1, 0, 0, 1, 0, 0);
    pen.clearRect(0, 0, width, height);
    pen.setTransform(width / size.width, 0, 0, height / size.height, 0, 0);
    paint(pen);
  }, [size, paint]);
  return ref;
}

import { type RefObject, useLayoutEffect, useRef, useState } from "react";
import type { Size } from "./view-transform.ts";

/** An element's inner size in CSS pixels, kept up to date; 0 × 0 until it is laid out. */
export function useSize<E extends Element>(): readonly [ref: RefObject<E | null>, size: Size] {
  const ref = useRef<E>(null);
  const [size, setSize] = useState<Size>({ width: 0, height: 0 });
  useLayoutEffect(() => {
    if (!ref.current) return;
    const observer = new ResizeObserver(([entry]) => {
      const { width, height } = entry!.contentRect;
      setSize({ width, height });
    });
    observer.observe(ref.current);
    return () => observer.disconnect();
  }, []);
  return [ref, size];
}

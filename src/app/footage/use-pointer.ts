import { type RefObject, useEffect, useRef } from "react";
import type { Point } from "./view-transform.ts";

/** What a pointer does on the stage. Positions and lengths are CSS pixels from the stage's corner. */
export interface PointerActions {
  pick(at: Point): void;
  zoom(factor: number, at: Point): void;
  move(by: Point): void;
}

/** A press that moves less than this is a click, CSS pixels. */
const clickReach = 4;

/** Click picks, drag moves, wheel zooms. */
export function usePointer(stage: RefObject<HTMLElement | null>, actions: PointerActions): void {
  const latest = useRef(actions);
  latest.current = actions;
  useEffect(() => {
    const element = stage.current;
    if (!element) return;
    let press: { at: Point; last: Point; dragged: boolean } | null = null;
    const at = (event: MouseEvent): Point => {
      const box = element.getBoundingClientRect();
      return { x: event.clientX - box.left, y: event.clientY - box.top };
    };
    const down = (event: PointerEvent) => {
      if (event.button !== 0 || (event.target as Element).closest("button")) return;
      press = { at: at(event), last: at(event), dragged: false };
      element.setPointerCapture(event.pointerId);
    };
    const go = (event: PointerEvent) => {
      if (!press) return;
      const now = at(event);
      press.dragged ||= Math.hypot(now.x - press.at.x, now.y - press.at.y) > clickReach;
      if (press.dragged) latest.current.move({ x: now.x - press.last.x, y: now.y - press.last.y });
      press.last = now;
    };
    const up = (event: PointerEvent) => {
      if (press && !press.dragged) latest.current.pick(at(event));
      press = null;
    };
    const cancel = () => {
      press = null;
    };
    const wheel = (event: WheelEvent) => {
      event.preventDefault();
      latest.current.zoom(1.0018 ** -event.deltaY, at(event));
    };
    element.addEventListener("pointerdown", down);
    element.addEventListener("pointermove", go);
    element.addEventListener("pointerup", up);
    element.addEventListener("pointercancel", cancel);
    element.addEventListener("wheel", wheel, { passive: false });
    return () => {
      element.removeEventListener("pointerdown", down);
      element.removeEventListener("pointermove", go);
      element.removeEventListener("pointerup", up);
      element.removeEventListener("pointercancel", cancel);
      element.removeEventListener("wheel", wheel);
    };
  }, [stage]);
}

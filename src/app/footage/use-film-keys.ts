import { type Dispatch, useEffect } from "react";
import type { ViewingAction } from "../state/viewing.ts";

/** Elements that have uses of their own for the keys. */
const own = "input, select, textarea, [contenteditable], [role=tab], dialog";

/** The action of a key on the footage, or null. */
export function filmKey(key: string, shift: boolean, frames: number): ViewingAction | null {
  switch (key) {
    case "ArrowLeft":
      return { type: "stepped", by: shift ? -10 : -1 };
    case "ArrowRight":
      return { type: "stepped", by: shift ? 10 : 1 };
    case "Home":
      return { type: "went", frame: 0 };
    case "End":
      return { type: "went", frame: frames - 1 };
    case " ":
      return { type: "play toggled" };
    case "Escape":
      return { type: "evidence put away" };
    default:
      return null;
  }
}

/** Steps, plays and puts evidence away from the keyboard, wherever the focus is, but in elements that use the key. */
export function useFilmKeys(frames: number, dispatch: Dispatch<ViewingAction>): void {
  useEffect(() => {
    const press = (event: KeyboardEvent) => {
      if (event.defaultPrevented || event.ctrlKey || event.metaKey || event.altKey) return;
      const target = event.target instanceof Element ? event.target : null;
      if (target?.closest(own)) return;
      if (event.key === " " && target?.closest("button, summary, a, [role=row]")) return;
      const action = filmKey(event.key, event.shiftKey, frames);
      if (!action) return;
      event.preventDefault();
      dispatch(action);
    };
    window.addEventListener("keydown", press);
    return () => window.removeEventListener("keydown", press);
  }, [frames, dispatch]);
}

import { type Dispatch, useEffect } from "react";
import type { Viewing, ViewingAction } from "../state/viewing.ts";
import { frameAt } from "./frame-at.ts";

/** Moves the frame on with the clock while playing, by the frames' own capture times. */
export function usePlayback(view: Viewing, times_s: Float64Array, dispatch: Dispatch<ViewingAction>): void {
  const { playing, rate } = view;
  // The frame at which playing starts matters, those that follow come from here.
  // biome-ignore lint/correctness/useExhaustiveDependencies: see above
  useEffect(() => {
    if (!playing) return;
    const start_s = times_s[view.frame] ?? 0;
    let last = view.frame;
    let began_ms: number | null = null;
    let request = requestAnimationFrame(function tick(now_ms) {
      began_ms ??= now_ms;
      const frame = frameAt(times_s, start_s + ((now_ms - began_ms) / 1000) * rate);
      if (frame !== last) dispatch({ type: "played", frame });
      last = frame;
      request = requestAnimationFrame(tick);
    });
    return () => cancelAnimationFrame(request);
  }, [playing, rate, times_s, dispatch]);
}

import type { Warning } from "../../quantities/index.ts";
import type { FootageFacts } from "../footage.ts";

/** How container time becomes capture time, and on whose word. */
export interface CaptureClock {
  readonly factor: number;
  readonly from: FootageFacts["timeFactorFrom"];
  readonly warnings: readonly Warning[];
}

/** Relative difference within which two frame rates are the same one; containers round, phones wander. */
const sameRate = 0.02;

const close = (a: number, b: number): boolean => Math.abs(a / b - 1) <= sameRate;

const fps = (rate: number): string => rate.toFixed(2);

/**
 * Decides by what factor container seconds become capture seconds: the rate at which the container plays the frames
 * over the rate at which they were captured. The trial's word wins; else the recording's own tag is believed if it is
 * the container's rate or a whole multiple of it; else time is taken as it stands.
 *
 * @param containerRate_hz frames per container second (1 / median interval), null when it can't be known
 * @param stated_hz capture rate as the trial states it
 * @param tag_hz capture rate as the recording's own tag states it
 */
export function captureClock(
  containerRate_hz: number | null,
  stated_hz: number | undefined,
  tag_hz: number | null,
): CaptureClock {
  if (stated_hz !== undefined && containerRate_hz !== null) {
    if (close(containerRate_hz, stated_hz)) return { factor: 1, from: "trial", warnings: [] };
    return {
      factor: containerRate_hz / stated_hz,
      from: "trial",
      warnings: doubtful(containerRate_hz, stated_hz) ? [doubtfulRate(containerRate_hz, stated_hz)] : [],
    };
  }
  if (stated_hz === undefined && tag_hz !== null && containerRate_hz !== null) {
    const ratio = tag_hz / containerRate_hz;
    if (close(ratio, 1)) return { factor: 1, from: "recording tag", warnings: [] };
    if (ratio > 1.5 && close(ratio, Math.round(ratio)))
      return { factor: containerRate_hz / tag_hz, from: "recording tag", warnings: [] };
    return { factor: 1, from: "none", warnings: [strangeTag(containerRate_hz, tag_hz)] };
  }
  return { factor: 1, from: "none", warnings: [] };
}

/** Slow motion plays whole multiples slower; a stated rate below the container's, or an odd multiple, is a likely slip. */
function doubtful(containerRate_hz: number, stated_hz: number): boolean {
  const ratio = stated_hz / containerRate_hz;
  return ratio < 1 || !close(ratio, Math.round(ratio));
}

const doubtfulRate = (container: number, stated: number): Warning => ({
  code: "capture-rate-doubtful",
  message: `The trial states a capture rate of ${fps(stated)} frames/s, but the recording plays ${fps(container)} frames/s, and the one is no whole multiple of the other. The stated rate was used; check clock.capture_fps.`,
});

const strangeTag = (container: number, tag: number): Warning => ({
  code: "capture-rate-tag-ignored",
  message: `The recording's own tag says it was captured at ${fps(tag)} frames/s, but it plays ${fps(container)} frames/s, and the one is no whole multiple of the other. The tag was ignored; if this is slow motion, state clock.capture_fps in the trial.`,
});

import { Camera } from "./camera.ts";
import { captureTimes } from "./capture.ts";
import { fieldProgram } from "./field.ts";
import { move } from "./motion.ts";
import type { AssayOptions, AssaySettings } from "./options.ts";
import { boxOf, populate } from "./population.ts";
import { resolveOptions } from "./resolve.ts";
import { handling } from "./shake.ts";
import { type AssayTruth, gatherTruth } from "./truth.ts";

/** A synthetic assay with known truth: pictures on request, in any order, and what truly happened. */
export interface Assay {
  readonly settings: AssaySettings;
  readonly frames: number;
  readonly width: number;
  readonly height: number;
  /** Capture time of each frame since the first. */
  readonly times_s: Float64Array;
  /** Time of each frame as its container tells it: stretched in slow motion. */
  readonly containerTimes_s: Float64Array;
  /** All frame intervals are alike. */
  readonly constantRate: boolean;
  /**
   * Writes the upright luma of a frame to `out` (width × height bytes, row-major, y down). The same frame gives the
   * same bytes whenever it is asked for.
   */
  render(frame: number, out: Uint8Array): void;
  /** What truly happened, gathered at the first call. */
  truth(): AssayTruth;
}

/**
 * Plans an assay: all motion is simulated here, pictures are made when asked for. The same options give the same bytes
 * wherever sines, exponentials and logarithms have the same last bit: in Node and Chromium on every machine (V8 brings
 * its own), not surely in other browsers.
 * @throws InputError when an option is out of bounds.
 */
export function planAssay(options: AssayOptions = {}): Assay {
  const settings = resolveOptions(options);
  const capture = captureTimes(settings.seed, settings.time);
  const program = fieldProgram(settings.field);
  const box = boxOf(settings);
  const exposure_s = capture.frames > 1 ? Math.min(settings.time.exposure_s, 0.95 * shortest(capture.times_s)) : 0;
  const motions = populate(settings, box).map((body) =>
    move(body, box, program, capture.times_s, exposure_s, settings),
  );
  const hand = handling(settings.seed, settings.time.seconds, settings.phone, settings.sensor);
  const camera = new Camera(settings, capture, motions, hand);
  const { x_mT, y_mT } = program.at(0);
  let truth: AssayTruth | null = null;
  return {
    settings,
    frames: capture.frames,
    width: settings.picture.width_px,
    height: settings.picture.height_px,
    times_s: capture.times_s,
    containerTimes_s: capture.containerTimes_s,
    constantRate: capture.constantRate,
    render: (frame, out) => camera.render(frame, out),
    truth() {
      truth ??= gatherTruth(settings, capture, motions, camera, hand, Math.hypot(x_mT, y_mT));
      return truth;
    },
  };
}

function shortest(times_s: Float64Array): number {
  let least = Number.POSITIVE_INFINITY;
  for (let i = 1; i < times_s.length; i++) least = Math.min(least, (times_s[i] as number) - (times_s[i - 1] as number));
  return least;
}

import type { AssaySettings } from "./options.ts";
import { stream } from "./variates.ts";

/** Displacement of the picture and gain of the exposure over time. */
export interface Handling {
  /** Picture position = scene position + shift, pixels (x right, y down). Zero in the first frame. */
  shift_px(t_s: number): readonly [x: number, y: number];
  /** Factor on the light. 1 in the first frame. */
  gain(t_s: number): number;
  /** No shift is larger, pixels. */
  readonly reach_px: number;
}

const tones = 7;
const lowest_hz = 0.3;
const highest_hz = 9;

/**
 * A hand-held or clamped phone: shake as a sum of seven tones, stronger the slower they are, with random phases (any
 * time can be asked for in any order), one knock that rings out and leaves the picture displaced, and the exposure
 * drifting and stepping.
 */
export function handling(
  seed: number,
  seconds: number,
  phone: AssaySettings["phone"],
  sensor: AssaySettings["sensor"],
): Handling {
  const x = tonesOf(stream(seed, "shake", "x"), phone.shake_px);
  const y = tonesOf(stream(seed, "shake", "y"), phone.shake_px);
  const knock_s = 0.6 * seconds;
  const knock = (t: number) => {
    if (t < knock_s || phone.bump_px === 0) return 0;
    const since = t - knock_s;
    return phone.bump_px * (0.4 + 0.6 * Math.exp(-since / 0.25) * Math.cos(2 * Math.PI * 5 * since));
  };
  const gain = (t: number) =>
    (1 + sensor.gainDrift * Math.sin((2 * Math.PI * t) / Math.max(4, seconds))) *
    (t >= seconds / 2 ? 1 + sensor.gainStep : 1);
  const x0 = x(0);
  const y0 = y(0);
  return {
    shift_px: (t) => [x(t) - x0 + knock(t), y(t) - y0 + 0.5 * knock(t)],
    gain,
    reach_px: Math.ceil(2 * phone.shake_px * Math.sqrt(2 * tones) + Math.abs(phone.bump_px)),
  };
}

function tonesOf(random: () => number, rms_px: number): (t_s: number) => number {
  if (rms_px === 0) return () => 0;
  const list = Array.from({ length: tones }, (_, k) => {
    const hz = lowest_hz * (highest_hz / lowest_hz) ** ((k + random()) / tones);
    return { hz, phase: 2 * Math.PI * random(), size: 1 / Math.sqrt(hz) };
  });
  const power = list.reduce((sum, tone) => sum + tone.size ** 2 / 2, 0);
  const scale = rms_px / Math.sqrt(power);
  return (t) => {
    let sum = 0;
    for (const tone of list) sum += scale * tone.size * Math.sin(2 * Math.PI * tone.hz * t + tone.phase);
    return sum;
  };
}

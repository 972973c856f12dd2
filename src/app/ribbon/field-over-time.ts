import type { FieldDescription } from "../../trial/index.ts";

/** The field in the picture plane at one time. */
export interface FieldVector {
  readonly magnitude_mT: number;
  /** Degrees counter-clockwise from image right, −180 … 180. */
  readonly angle_deg: number;
}

type Steps = Extract<FieldDescription, { from: "steps" }>;

/** Net field (applied and ambient, added as vectors) at `t_s`; before the first step the ambient field alone. */
export function fieldAt(field: Steps, t_s: number): FieldVector {
  let [x, y] = field.ambient_mT as readonly [number, number];
  const step = field.steps.findLast((it) => it.t_s <= t_s);
  if (step) {
    const angle = ((step.angle_deg + 360 * field.rotation_hz * t_s) * Math.PI) / 180;
    x += step.magnitude_mT * Math.cos(angle);
    y += step.magnitude_mT * Math.sin(angle);
  }
  return { magnitude_mT: Math.hypot(x, y), angle_deg: (Math.atan2(y, x) * 180) / Math.PI };
}

/** Times at which the net field turns by more than a right angle at once. None while it rotates. */
export function reversalTimes_s(field: Steps): number[] {
  if (field.rotation_hz !== 0) return [];
  return field.steps.slice(1).flatMap(({ t_s }, i) => {
    const before = fieldAt(field, field.steps[i]!.t_s);
    const after = fieldAt(field, t_s);
    if (before.magnitude_mT === 0 || after.magnitude_mT === 0) return [];
    return turnBetween_deg(before.angle_deg, after.angle_deg) > 90 ? [t_s] : [];
  });
}

/** The angle between two directions, 0 … 180. */
export function turnBetween_deg(a: number, b: number): number {
  const turn = (((b - a) % 360) + 360) % 360;
  return turn > 180 ? 360 - turn : turn;
}

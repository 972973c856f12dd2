import type { AssaySettings } from "./options.ts";

/** Net in-plane field, mT: x right, y up. */
export interface NetField {
  readonly x_mT: number;
  readonly y_mT: number;
}

/** What acts on the cells when: the field at a time, when it jumps, how strong and how fast-turning it can be. */
export interface FieldProgram {
  at(t_s: number): NetField;
  /** Times at which the field jumps, rising; the first step's own time left out when it is not after the start. */
  readonly jumps_s: readonly number[];
  readonly strongest_mT: number;
  readonly rotation_hz: number;
}

/**
 * Builds the field program: the step in force (the first one also before its own time) turned counter-clockwise at
 * `rotation_hz` from its angle at t = 0, plus the ambient vector.
 */
export function fieldProgram(field: AssaySettings["field"]): FieldProgram {
  const steps = [...field.steps].sort((a, b) => a.t_s - b.t_s);
  const [ambientX, ambientY] = field.ambient_mT;
  const strongest = steps.reduce((most, s) => Math.max(most, s.magnitude_mT), 0);
  return {
    at(t_s) {
      let step = steps[0];
      for (const s of steps) if (s.t_s <= t_s) step = s;
      if (!step) return { x_mT: ambientX, y_mT: ambientY };
      const angle = (step.angle_deg * Math.PI) / 180 + 2 * Math.PI * field.rotation_hz * t_s;
      return {
        x_mT: step.magnitude_mT * Math.cos(angle) + ambientX,
        y_mT: step.magnitude_mT * Math.sin(angle) + ambientY,
      };
    },
    jumps_s: steps.slice(1).map((s) => s.t_s),
    strongest_mT: strongest + Math.hypot(ambientX, ambientY),
    rotation_hz: field.rotation_hz,
  };
}

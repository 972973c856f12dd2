import { describe, expect, it } from "vitest";
import { fieldProgram } from "./field.ts";

const steps = [
  { t_s: 0, magnitude_mT: 0.4, angle_deg: 0 },
  { t_s: 5, magnitude_mT: 0.3, angle_deg: 90 },
];

describe("field program", () => {
  it("holds each step until the next and adds the ambient vector", () => {
    const program = fieldProgram({ steps, rotation_hz: 0, ambient_mT: [0.01, -0.02] });
    expect(program.at(4.999).x_mT).toBeCloseTo(0.41, 12);
    expect(program.at(4.999).y_mT).toBeCloseTo(-0.02, 12);
    expect(program.at(5).x_mT).toBeCloseTo(0.01, 12);
    expect(program.at(5).y_mT).toBeCloseTo(0.28, 12);
    expect(program.at(-1)).toEqual(program.at(0));
    expect(program.jumps_s).toEqual([5]);
  });

  it("turns counter-clockwise, up being up, from the step's angle at t = 0", () => {
    const program = fieldProgram({ steps: steps.slice(0, 1), rotation_hz: 0.5, ambient_mT: [0, 0] });
    expect(program.at(0.5).x_mT).toBeCloseTo(0, 12);
    expect(program.at(0.5).y_mT).toBeCloseTo(0.4, 12);
    expect(program.at(1).x_mT).toBeCloseTo(-0.4, 12);
  });

  it("is the ambient field alone when there are no steps", () => {
    const program = fieldProgram({ steps: [], rotation_hz: 0, ambient_mT: [0.02, 0.03] });
    expect(program.at(3)).toEqual({ x_mT: 0.02, y_mT: 0.03 });
  });
});

import { describe, expect, it } from "vitest";
import { fieldAt, reversalTimes_s, turnBetween_deg } from "./field-over-time.ts";

const steps = (angles: number[], more: { rotation_hz?: number; ambient_mT?: [number, number] } = {}) => ({
  from: "steps" as const,
  steps: angles.map((angle_deg, i) => ({ t_s: i * 5, magnitude_mT: 0.3, angle_deg })),
  rotation_hz: more.rotation_hz ?? 0,
  ambient_mT: more.ambient_mT ?? ([0, 0] as [number, number]),
});

describe("fieldAt", () => {
  it("holds a step until the next", () => {
    const field = steps([0, 180]);
    expect(fieldAt(field, 4.99).angle_deg).toBeCloseTo(0, 9);
    expect(Math.abs(fieldAt(field, 5).angle_deg)).toBeCloseTo(180, 9);
    expect(fieldAt(field, 99).magnitude_mT).toBeCloseTo(0.3, 12);
  });

  it("adds the ambient field as a vector", () => {
    const field = steps([0], { ambient_mT: [0, 0.3] });
    expect(fieldAt(field, 0).angle_deg).toBeCloseTo(45, 9);
    expect(fieldAt(field, 0).magnitude_mT).toBeCloseTo(0.3 * Math.SQRT2, 12);
    expect(fieldAt(field, -1)).toEqual({ magnitude_mT: 0.3, angle_deg: 90 });
  });

  it("turns counter-clockwise with a positive rotation", () => {
    expect(fieldAt(steps([0], { rotation_hz: 0.5 }), 0.5).angle_deg).toBeCloseTo(90, 9);
  });
});

describe("reversalTimes_s", () => {
  it("finds turns by more than a right angle", () => {
    expect(reversalTimes_s(steps([0, 180, 170, 60, 300]))).toEqual([5, 15, 20]);
    expect(reversalTimes_s(steps([0, 60]))).toEqual([]);
    expect(reversalTimes_s(steps([0, 180], { rotation_hz: 1 }))).toEqual([]);
  });

  it("goes by the net field", () => {
    expect(reversalTimes_s(steps([0, 180], { ambient_mT: [1, 0] }))).toEqual([]);
  });
});

describe("turnBetween_deg", () => {
  it("is the shorter way round", () => {
    expect(turnBetween_deg(170, -170)).toBe(20);
    expect(turnBetween_deg(-90, 90)).toBe(180);
  });
});

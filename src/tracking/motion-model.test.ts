import { describe, expect, it } from "vitest";
import { normalFrom } from "../../tests/helpers/normal.ts";
import { seededRandom } from "../quantities/index.ts";
import { firstBelief, type MotionModel, predict, update } from "./motion-model.ts";

const model: MotionModel = {
  speedSd_px_s: 40,
  turning_per_s: 0,
  diffusion_px2_s: 1.5,
  arrivals_per_px2: 1e-6,
  sighted: 0.98,
};

describe("Kalman filter", () => {
  // Normalised innovation squared, two components: mean 2, variance 4 each, independent when the model is right (Bar-Shalom,
  // Li and Kirubarajan 2001, section 5.4).
  it.each([
    ["even", () => 1 / 30],
    ["uneven", (u: number) => 0.01 + 0.06 * u],
  ])("misses by as much as it says on motion of its own model, at %s times", (_, step) => {
    const random = seededRandom(11);
    const normal = normalFrom(random);
    // With no turning the velocity's variance grows by a fixed rate, so the filter is exact.
    const q = 0.02 * model.speedSd_px_s ** 2;
    let sum = 0;
    let n = 0;
    for (let cell = 0; cell < 200; cell++) {
      const state = [50, model.speedSd_px_s * normal(), 80, model.speedSd_px_s * normal()] as [
        number,
        number,
        number,
        number,
      ];
      let belief = firstBelief(model, 0, state[0] + 0.3 * normal(), state[2] + 0.3 * normal(), 0.09);
      for (let k = 0; k < 30; k++) {
        const dt = step(random());
        for (const axis of [0, 2] as const) {
          // White acceleration over dt: position and velocity noise of covariance q [dt³/3, dt²/2; dt²/2, dt].
          const [a, b] = [normal(), normal()];
          const dv = Math.sqrt(q * dt) * a;
          state[axis] += state[axis + 1]! * dt + (dt / 2) * dv + Math.sqrt((q * dt ** 3) / 12) * b;
          state[axis] += Math.sqrt(2 * model.diffusion_px2_s * dt) * normal();
          state[axis + 1]! += dv;
        }
        const predicted = predict(model, belief, belief.t_s + dt);
        const x = state[0] + 0.3 * normal();
        const y = state[2] + 0.3 * normal();
        sum += ((x - predicted.x) ** 2 + (y - predicted.y) ** 2) / (predicted.pp + 0.09);
        n++;
        belief = update(predicted, x, y, 0.09);
      }
    }
    expect(Math.abs(sum / n - 2)).toBeLessThan(3 * Math.sqrt(4 / n));
  });

  it("is the same backwards in time", () => {
    const belief = { ...firstBelief(model, 5, 10, 20, 0.04), vx: 30, vy: -12, pv: 0.2 };
    const mirrored = { ...belief, vx: -30, vy: 12, pv: -0.2 };
    const back = predict(model, belief, 4.8);
    const forth = predict(model, mirrored, 5.2);
    expect(back.x).toBeCloseTo(forth.x, 10);
    expect(back.pp).toBeCloseTo(forth.pp, 10);
    expect(back.pv).toBeCloseTo(-forth.pv, 10);
  });

  it("after two sightings a frame apart has the velocity between them, less what little was known before", () => {
    const quick: MotionModel = { ...model, diffusion_px2_s: 0 };
    const first = firstBelief(quick, 0, 100, 50, 0.01);
    const second = update(predict(quick, first, 0.1), 104, 47, 0.01);
    // Weight of the new: (40² · 0.01 + …) / (… + 0.02), so within 1 % of 40 and −30 px/s.
    expect(Math.abs(second.vx - 40)).toBeLessThan(0.4);
    expect(Math.abs(second.vy + 30)).toBeLessThan(0.3);
    expect(Math.sqrt(second.vv)).toBeLessThan(3);
  });

  it("expects more of a fast cell's turning than of a slow one's", () => {
    const turning: MotionModel = { ...model, turning_per_s: 2 };
    const at = (vx: number) => predict(turning, { ...firstBelief(turning, 0, 0, 0, 0.01), vx, vv: 1 }, 0.1).vv;
    // 2/s · (60² − 0) · 0.1 s more than one at rest.
    expect(at(60) - at(0)).toBeCloseTo(720, 6);
  });
});

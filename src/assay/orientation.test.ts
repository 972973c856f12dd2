import { describe, expect, it } from "vitest";
import { seededRandom } from "../quantities/index.ts";
import { type Direction, equilibriumDirection, turnTowards, wobble } from "./orientation.ts";
import { normals } from "./variates.ts";

const langevin = (x: number) => 1 / Math.tanh(x) - 1 / x;

function meanOf(count: number, draw: () => number): { mean: number; standardError: number } {
  let sum = 0;
  let squares = 0;
  for (let i = 0; i < count; i++) {
    const v = draw();
    sum += v;
    squares += v * v;
  }
  const mean = sum / count;
  return { mean, standardError: Math.sqrt((squares / count - mean * mean) / count) };
}

describe("turning under the torque", () => {
  it("follows tan(θ/2) = tan(θ₀/2) exp(-rate t) in whatever plane", () => {
    const start = (170 * Math.PI) / 180;
    for (const azimuth of [0, 0.7, 2.1]) {
      const n: Direction = [Math.cos(start), Math.sin(start) * Math.cos(azimuth), Math.sin(start) * Math.sin(azimuth)];
      for (let k = 1; k <= 40; k++) {
        turnTowards(n, 1, 0, 0.1);
        const expected = 2 * Math.atan(Math.tan(start / 2) * Math.exp(-0.1 * k));
        expect(Math.acos(n[0])).toBeCloseTo(expected, 9);
        expect(Math.atan2(n[2], n[1])).toBeCloseTo(azimuth, 9);
      }
    }
  });

  it("takes ln 9 of the time constant from -0.8 to +0.8 of the swing", () => {
    const n: Direction = [-0.8, 0.6, 0];
    turnTowards(n, 1, 0, Math.log(9));
    expect(n[0]).toBeCloseTo(0.8, 12);
  });

  it("turns south-seekers away from the field", () => {
    const n: Direction = [0, 1, 0];
    turnTowards(n, 1, 0, -3);
    expect(n[0]).toBeCloseTo(-Math.tanh(3), 12);
  });
});

describe("rotational diffusion", () => {
  // Brownian motion on the sphere: ⟨n(0)·n(t)⟩ = exp(-2 D_r t) (Debye). In the plane it would be exp(-D_r t).
  it.each([0.2, 0.5, 1])("loses direction as exp(-2 D_r t) at D_r t = %d", (turned) => {
    const normal = normals(seededRandom(11));
    const steps = 100;
    const { mean, standardError } = meanOf(6000, () => {
      const n: Direction = [0, 1, 0];
      for (let k = 0; k < steps; k++) wobble(n, Math.sqrt((2 * turned) / steps), normal);
      return n[1];
    });
    expect(Math.abs(mean - Math.exp(-2 * turned))).toBeLessThan(4 * standardError + 0.005);
  });
});

describe("equilibrium in the field", () => {
  it.each([0.1, 1, 5, 40])("is drawn with mean cosine coth x - 1/x at x = %d", (x) => {
    const random = seededRandom(5);
    const { mean, standardError } = meanOf(20000, () => equilibriumDirection(0, 1, x, random)[1]);
    expect(Math.abs(mean - langevin(x))).toBeLessThan(4 * standardError);
  });

  it.each([1, 5, 20])("is kept by torque and diffusion together at x = %d", (x) => {
    const random = seededRandom(23);
    const normal = normals(random);
    const diffusion_per_s = 0.17;
    const dt = Math.min(0.02, 0.1 / (x * diffusion_per_s));
    const steps = Math.ceil(6 / dt);
    // Started far from equilibrium: all along the field.
    const { mean, standardError } = meanOf(1500, () => {
      const n: Direction = [1, 0, 0];
      for (let k = 0; k < steps; k++) {
        turnTowards(n, 1, 0, (x * diffusion_per_s * dt) / 2);
        wobble(n, Math.sqrt(2 * diffusion_per_s * dt), normal);
        turnTowards(n, 1, 0, (x * diffusion_per_s * dt) / 2);
      }
      return n[0];
    });
    // What is left of the start after 6 s decays at 2 D_r or faster.
    const left = (1 - langevin(x)) * Math.exp(-2 * diffusion_per_s * 6);
    expect(Math.abs(mean - langevin(x))).toBeLessThan(4 * standardError + left);
  });

  it("shows π/4 of the speed in the picture without a field, and by the closed forms with one", () => {
    const random = seededRandom(8);
    // Share of a direction that lies in the picture: mean π/4 when every direction is alike; mean square 1 - L(x)/x.
    const free = meanOf(20000, () =>
      Math.hypot(...(equilibriumDirection(1, 0, 0, random).slice(0, 2) as [number, number])),
    );
    expect(Math.abs(free.mean - Math.PI / 4)).toBeLessThan(4 * free.standardError);
    const x = 5;
    const bound = meanOf(20000, () => 1 - equilibriumDirection(1, 0, x, random)[2] ** 2);
    expect(Math.abs(bound.mean - (1 - langevin(x) / x))).toBeLessThan(4 * bound.standardError);
  });
});

import type { Random } from "../quantities/index.ts";
import type { Normal } from "./variates.ts";

/** A unit vector: x right, y up, z towards the viewer. Changed in place by the functions below. */
export type Direction = [x: number, y: number, z: number];

/**
 * Turns `n` under the torque towards the unit vector (bx, by, 0) for a span in which rate × time = `turn`.
 *
 * Exact for a constant field: dn/dt = rate (n × b) × n has cos θ = tanh(rate (t - t0)), so cos θ follows the addition
 * theorem of tanh (overdamped magnetic torque; from memory of Esquivel and Lins de Barros, J. Exp. Biol. 121, 153
 * (1986), and elementary to derive).
 */
export function turnTowards(n: Direction, bx: number, by: number, turn: number): void {
  const e = Math.tanh(turn);
  const c = n[0] * bx + n[1] * by;
  const shrink = Math.sqrt(1 - e * e) / (1 + c * e);
  const along = (c + e) / (1 + c * e);
  n[0] = (n[0] - c * bx) * shrink + along * bx;
  n[1] = (n[1] - c * by) * shrink + along * by;
  n[2] *= shrink;
  normalise(n);
}

/**
 * Rotational diffusion of `n` over a short span: a normal step of variance 2·D_r·dt along each of two tangents, pulled
 * back to the sphere. To first order in D_r·dt that is Brownian motion on the sphere (⟨n(0)·n(t)⟩ = exp(-2 D_r t)).
 */
export function wobble(n: Direction, step: number, normal: Normal): void {
  const gx = normal();
  const gy = normal();
  const gz = normal();
  const along = gx * n[0] + gy * n[1] + gz * n[2];
  n[0] += step * (gx - along * n[0]);
  n[1] += step * (gy - along * n[1]);
  n[2] += step * (gz - along * n[2]);
  normalise(n);
}

/**
 * Draws a direction from the equilibrium about the unit vector (bx, by, 0): density ∝ exp(x cos θ) on the sphere, by
 * inverting the closed-form distribution of cos θ (Fisher, Proc. R. Soc. A 217, 295 (1953), from memory). x = 0 is
 * every direction alike.
 */
export function equilibriumDirection(bx: number, by: number, x: number, random: Random): Direction {
  const u = random();
  const cos = x < 1e-6 ? 2 * u - 1 : Math.max(-1, 1 + Math.log(u + (1 - u) * Math.exp(-2 * x)) / x);
  const sin = Math.sqrt(1 - cos * cos);
  const azimuth = 2 * Math.PI * random();
  const across = sin * Math.cos(azimuth);
  return [cos * bx - across * by, cos * by + across * bx, sin * Math.sin(azimuth)];
}

function normalise(n: Direction): void {
  const f = 1 / Math.sqrt(n[0] * n[0] + n[1] * n[1] + n[2] * n[2]);
  n[0] *= f;
  n[1] *= f;
  n[2] *= f;
}

import type { FieldProgram } from "./field.ts";
import { sphereDrag } from "./medium.ts";
import type { AssaySettings } from "./options.ts";
import { type Direction, equilibriumDirection, turnTowards, wobble } from "./orientation.ts";
import { type Body, type Box, energyRatio } from "./population.ts";
import { normals, stream } from "./variates.ts";

/**
 * Where one body was in every frame, as columns. Positions are µm in the scene (x right, y up) at the capture time;
 * `dx, dy` is how far it went during the exposure; `n` its direction. `visit` counts how often it left the box and
 * came in on the other side: each visit is another cell to whoever watches.
 */
export interface Motion {
  readonly body: Body;
  readonly x_um: Float32Array;
  readonly y_um: Float32Array;
  readonly z_um: Float32Array;
  readonly dx_um: Float32Array;
  readonly dy_um: Float32Array;
  readonly nx: Float32Array;
  readonly ny: Float32Array;
  readonly visit: Uint16Array;
}

/** Largest turn by torque, by a rotating field and by diffusion (variance) in one sub-step, radians. */
const finestTurn_rad = 0.1;
const finestSpin_rad = 0.05;
const finestWobble_rad2 = 0.01;

/**
 * Moves one body through the capture times: torque (exact over a sub-step) and rotational diffusion in a symmetric
 * split, swimming along the mean of the directions before and after, translational diffusion, flow. Sub-steps end at
 * every jump of the field and never turn a cell by more than a tenth of a radian. Swimmers slide along floor and
 * lid; dead cells bounce off, so that they stay spread evenly.
 */
export function move(
  body: Body,
  box: Box,
  program: FieldProgram,
  times_s: Float64Array,
  exposure_s: number,
  settings: AssaySettings,
): Motion {
  const n = times_s.length;
  const motion: Motion = {
    body,
    x_um: new Float32Array(n),
    y_um: new Float32Array(n),
    z_um: new Float32Array(n),
    dx_um: new Float32Array(n),
    dy_um: new Float32Array(n),
    nx: new Float32Array(n),
    ny: new Float32Array(n),
    visit: new Uint16Array(n),
  };
  const walk = new Walk(body, box, program, settings, -exposure_s / 2);
  for (let i = 0; i < n; i++) {
    const t = times_s[i] as number;
    walk.until(t - exposure_s / 2);
    const openedX = walk.travelledX_um;
    const openedY = walk.travelledY_um;
    walk.until(t);
    motion.x_um[i] = walk.x_um;
    motion.y_um[i] = walk.y_um;
    motion.z_um[i] = walk.z_um;
    motion.nx[i] = walk.n[0];
    motion.ny[i] = walk.n[1];
    motion.visit[i] = walk.visit;
    walk.until(t + exposure_s / 2);
    motion.dx_um[i] = walk.travelledX_um - openedX;
    motion.dy_um[i] = walk.travelledY_um - openedY;
  }
  return motion;
}

class Walk {
  x_um: number;
  y_um: number;
  z_um: number;
  readonly n: Direction;
  visit = 0;
  /** Distance gone since the start with wrapping undone. */
  travelledX_um = 0;
  travelledY_um = 0;
  private t_s: number;
  private jump = 0;
  private readonly step_s: number;
  private readonly normal: () => number;
  private readonly diffusion_um2_s: number;
  private readonly rotational_per_s: number;

  constructor(
    private readonly body: Body,
    private readonly box: Box,
    private readonly program: FieldProgram,
    private readonly settings: AssaySettings,
    start_s: number,
  ) {
    this.x_um = body.x_um;
    this.y_um = body.y_um;
    this.z_um = body.z_um;
    this.t_s = start_s;
    const { sample, swimmers } = settings;
    const drag = sphereDrag(sample.cellRadius_um, sample.temperature_C, sample.relativeViscosity);
    this.diffusion_um2_s = drag.diffusion_um2_s;
    this.rotational_per_s = drag.rotationalDiffusion_per_s * (body.kind === "swimmer" ? swimmers.restlessness : 1);
    this.step_s = Math.min(
      finestTurn_rad / Math.max(1e-9, Math.abs(body.turn_per_s_mT) * program.strongest_mT),
      finestSpin_rad / Math.max(1e-9, 2 * Math.PI * Math.abs(program.rotation_hz)),
      finestWobble_rad2 / Math.max(1e-9, 2 * this.rotational_per_s),
    );
    const random = stream(settings.seed, "motion", body.name);
    const { x_mT, y_mT } = program.at(start_s);
    const b = Math.hypot(x_mT, y_mT);
    const sign = body.turn_per_s_mT < 0 ? -1 : 1;
    this.n = equilibriumDirection(
      b > 0 ? (sign * x_mT) / b : 1,
      b > 0 ? (sign * y_mT) / b : 0,
      energyRatio(body.moment_A_m2, b, settings),
      random,
    );
    this.normal = normals(random);
  }

  until(t_s: number): void {
    if (this.body.kind === "stuck") return;
    for (;;) {
      const jump = this.program.jumps_s[this.jump] ?? Number.POSITIVE_INFINITY;
      const stop = Math.min(t_s, jump);
      const steps = Math.ceil((stop - this.t_s) / this.step_s);
      if (steps > 0) {
        const from = this.t_s;
        const dt = (stop - from) / steps;
        for (let k = 0; k < steps; k++) this.step(from + k * dt, dt);
        this.t_s = stop;
      }
      if (jump > t_s) return;
      this.jump++;
    }
  }

  private step(t_s: number, dt: number): void {
    const n = this.n;
    const [wasX, wasY, wasZ] = n;
    const { x_mT, y_mT } = this.program.at(t_s + dt / 2);
    const b = Math.hypot(x_mT, y_mT);
    const turn = this.body.turn_per_s_mT * b * dt;
    const torque = b > 0 && turn !== 0;
    if (torque) turnTowards(n, x_mT / b, y_mT / b, turn / 2);
    wobble(n, Math.sqrt(2 * this.rotational_per_s * dt), this.normal);
    if (torque) turnTowards(n, x_mT / b, y_mT / b, turn / 2);
    const go = (this.body.speed_um_s * dt) / 2;
    const [flowX, flowY] = this.settings.sample.flow_um_s;
    const jolt = Math.sqrt(2 * this.diffusion_um2_s * dt);
    this.shift(
      go * (wasX + n[0]) + flowX * dt + jolt * this.normal(),
      go * (wasY + n[1]) + flowY * dt + jolt * this.normal(),
      go * (wasZ + n[2]) + jolt * this.normal(),
    );
  }

  private shift(dx: number, dy: number, dz: number): void {
    const { left_um, bottom_um, width_um, height_um, depth_um } = this.box;
    this.travelledX_um += dx;
    this.travelledY_um += dy;
    const x = wrap(this.x_um + dx, left_um, width_um);
    const y = wrap(this.y_um + dy, bottom_um, height_um);
    if (x !== this.x_um + dx || y !== this.y_um + dy) this.visit++;
    this.x_um = x;
    this.y_um = y;
    const z = this.z_um + dz;
    this.z_um = this.body.kind === "swimmer" ? Math.min(depth_um, Math.max(0, z)) : reflect(z, depth_um);
  }
}

function wrap(v: number, low: number, span: number): number {
  if (v < low) return v + span;
  return v >= low + span ? v - span : v;
}

function reflect(z: number, depth: number): number {
  const folded = Math.abs(z) % (2 * depth);
  return folded > depth ? 2 * depth - folded : folded;
}

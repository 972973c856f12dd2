/**
 * How cells of a clip move, as far as predicting them needs: a swimmer keeps its velocity but for a random turning and
 * change of pace that grow with its speed, and everything diffuses.
 */
export interface MotionModel {
  /** Standard deviation of a cell's velocity along one axis before anything is known of it, pixels per second. */
  readonly speedSd_px_s: number;
  /** Velocity variance gained per second over squared speed: twice the rotational diffusion, if it were only that. 1/s. */
  readonly turning_per_s: number;
  /** Translational diffusion of the body, pixels² per second. */
  readonly diffusion_px2_s: number;
  /** New sightings (cells coming in, false alarms) per frame and pixel². */
  readonly arrivals_per_px2: number;
  /** Chance of a cell being sighted in a frame. */
  readonly sighted: number;
}

/** Velocity variance gained per second whatever the speed, as a part of the clip's own velocity variance. */
const restlessness_per_s = 0.02;

/**
 * What is believed of one cell: position, velocity and their covariance, the same along both axes.
 *
 * A Kalman filter (Kalman 1960, J. Basic Eng. 82, 35) with a nearly constant velocity and real time steps (Bar-Shalom, Li
 * and Kirubarajan 2001, "Estimation with Applications to Tracking and Navigation", section 6.2), whose velocity noise
 * grows with the speed as that of a body turned about by rotational diffusion does.
 */
export interface Belief {
  t_s: number;
  x: number;
  y: number;
  vx: number;
  vy: number;
  /** Squared speed the cell is capable of: falls slowly, since in a turn a cell seems slow and soon is fast again. */
  pace2: number;
  /** Covariance of position and velocity along one axis: [position, both, velocity]. */
  pp: number;
  pv: number;
  vv: number;
}

/** No cell is faster than this many standard deviations of velocity. */
export const fastest = 3;
/** How fast a cell's pace is forgotten once it seems slower. */
const paceForgotten_s = 0.7;

/** The belief after a first sighting: where it is, nothing of where it goes. */
export function firstBelief(model: MotionModel, t_s: number, x: number, y: number, variance: number): Belief {
  return { t_s, x, y, vx: 0, vy: 0, pace2: 0, pp: variance, pv: 0, vv: model.speedSd_px_s ** 2 };
}

/** The belief carried to a later (or, for a path read backwards, earlier) time. */
export function predict(model: MotionModel, b: Belief, t_s: number): Belief {
  const h = t_s - b.t_s;
  const dt = Math.abs(h);
  const seen2 = Math.max(b.vx * b.vx + b.vy * b.vy, b.pace2 / (1 + dt / paceForgotten_s));
  // One wrong pairing must not make a cell so fast that anything can be it.
  const pace2 = Math.min(seen2, (fastest * model.speedSd_px_s) ** 2);
  const q = model.turning_per_s * pace2 + restlessness_per_s * model.speedSd_px_s ** 2;
  return {
    t_s,
    x: b.x + h * b.vx,
    y: b.y + h * b.vy,
    vx: b.vx,
    vy: b.vy,
    pace2,
    pp: b.pp + 2 * h * b.pv + h * h * b.vv + (q * dt * dt * dt) / 3 + 2 * model.diffusion_px2_s * dt,
    pv: b.pv + h * b.vv + (Math.sign(h) * q * dt * dt) / 2,
    vv: b.vv + q * dt,
  };
}

/** The belief after a sighting at (x, y) with the given variance along each axis. */
export function update(b: Belief, x: number, y: number, variance: number): Belief {
  const s = b.pp + variance;
  const k = b.pp / s;
  const kv = b.pv / s;
  return {
    t_s: b.t_s,
    x: b.x + k * (x - b.x),
    y: b.y + k * (y - b.y),
    vx: b.vx + kv * (x - b.x),
    vy: b.vy + kv * (y - b.y),
    pace2: b.pace2,
    pp: (1 - k) * b.pp,
    pv: (1 - k) * b.pv,
    vv: b.vv - kv * b.pv,
  };
}

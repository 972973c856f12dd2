import type { Camera } from "./camera.ts";
import type { Capture } from "./capture.ts";
import { sphereDrag } from "./medium.ts";
import type { Motion } from "./motion.ts";
import type { AssaySettings } from "./options.ts";
import { energyRatio, type Kind } from "./population.ts";
import type { Handling } from "./shake.ts";

/** One cell in one frame, as it truly was. */
export interface TruthRow {
  readonly cell: number;
  readonly kind: Kind;
  readonly frame: number;
  readonly t_s: number;
  /** Where the picture of this frame shows it: upright pixels, shake included. */
  readonly x_px: number;
  readonly y_px: number;
  /** The same place with shake removed, y up. */
  readonly x_um: number;
  readonly y_um: number;
  /** Swimming velocity in the image plane, relative to the fluid. */
  readonly vx_um_s: number;
  readonly vy_um_s: number;
  /** Peak contrast over the sensor's noise. */
  readonly signalToNoise: number;
  readonly visible: boolean;
}

/** A row before its cell has a number. */
type UnnamedRow = Omit<TruthRow, "cell">;

/** One cell over the time it was visible. */
export interface TruthCell {
  readonly cell: number;
  readonly kind: Kind;
  readonly first_frame: number;
  readonly last_frame: number;
  readonly visible_frames: number;
  readonly visible_s: number;
  /** Mean in-plane swimming speed over the frames in which it was visible; null when it never was. */
  readonly speed_um_s: number | null;
  /** Swimming speed in three dimensions, moment and what follows from it; null for what doesn't swim. */
  readonly speed3d_um_s: number | null;
  readonly moment_A_m2: number | null;
  readonly turn_rate_per_s: number | null;
  readonly south_seeking: boolean | null;
}

/** The trial's own truth. Null where there is nothing it could be taken from. */
export interface TrialTruth {
  /** Over swimmers visible for half a second or more, each once. */
  readonly mean_speed_um_s: number | null;
  readonly sd_speed_um_s: number | null;
  readonly n_cells: number;
  readonly motile_fraction: number | null;
  readonly flow_um_s: readonly [number, number];
  readonly mean_moment_A_m2: number | null;
  /** m B / f_r with the mean moment in the first step's net field. */
  readonly turn_rate_per_s: number | null;
  readonly energy_ratio: number | null;
  readonly rotational_diffusion_per_s: number;
  readonly diffusion_um2_s: number;
  readonly visible_at_noise: number;
}

export interface AssayTruth {
  /** A row for every cell and frame in which its centre lies in the lit view, by cell, then frame. Debris has its rows too. */
  readonly rows: readonly TruthRow[];
  readonly cells: readonly TruthCell[];
  readonly trial: TrialTruth;
  /** Frames that show the picture of an earlier one. */
  readonly repeatedFrames: readonly number[];
}

/** Shortest visible time for a cell's speed to count, as in the results. */
const countsFrom_s = 0.5;

/** Who comes back into view after longer than this is another cell to whoever watches. */
const sameCellFor_s = 0.5;

export function gatherTruth(
  settings: AssaySettings,
  capture: Capture,
  motions: readonly Motion[],
  camera: Camera,
  hand: Handling,
  netField_mT: number,
): AssayTruth {
  const rows: TruthRow[] = [];
  const cells: TruthCell[] = [];
  let cell = 0;
  for (const motion of motions) {
    const visits = (motion.visit[capture.frames - 1] ?? 0) + 1;
    for (let visit = 0; visit < visits; visit++) {
      for (const own of appearances(rowsOfVisit(visit, settings, capture, motion, camera))) {
        cell++;
        for (const row of own) rows.push({ ...row, cell });
        cells.push({ cell, ...cellTruth(own, motion, netField_mT, capture) });
      }
    }
  }
  for (const piece of camera.pieces) {
    cell++;
    for (const row of rowsOfPiece(cell, piece, settings, capture, hand)) rows.push(row);
  }
  return {
    rows,
    cells,
    trial: trialTruth(settings, cells, netField_mT),
    repeatedFrames: Array.from(capture.shows.keys()).filter((i) => capture.shows[i] !== i),
  };
}

/** Parts a visit's rows where the cell was out of view for long. */
function appearances(rows: readonly UnnamedRow[]): UnnamedRow[][] {
  const parts: UnnamedRow[][] = [];
  let last_s = Number.NEGATIVE_INFINITY;
  for (const row of rows) {
    if (row.t_s - last_s > sameCellFor_s) parts.push([]);
    parts.at(-1)?.push(row);
    last_s = row.t_s;
  }
  return parts;
}

function rowsOfVisit(
  visit: number,
  settings: AssaySettings,
  capture: Capture,
  motion: Motion,
  camera: Camera,
): UnnamedRow[] {
  const speed = motion.body.speed_um_s;
  const rows: UnnamedRow[] = [];
  for (let frame = 0; frame < capture.frames; frame++) {
    const shown = capture.shows[frame] as number;
    if (motion.visit[shown] !== visit) continue;
    const { x_px, y_px, signalToNoise, inView } = camera.look(motion, frame);
    if (!inView) continue;
    rows.push({
      kind: motion.body.kind,
      frame,
      t_s: capture.times_s[frame] as number,
      x_px,
      y_px,
      x_um: motion.x_um[shown] as number,
      y_um: motion.y_um[shown] as number,
      vx_um_s: speed * (motion.nx[shown] as number),
      vy_um_s: speed * (motion.ny[shown] as number),
      signalToNoise,
      visible: signalToNoise >= settings.visibleAt,
    });
  }
  return rows;
}

function rowsOfPiece(
  cell: number,
  piece: Camera["pieces"][number],
  settings: AssaySettings,
  capture: Capture,
  hand: Handling,
): TruthRow[] {
  const { width_px, height_px, um_per_px } = settings.picture;
  const rows: TruthRow[] = [];
  for (let frame = 0; frame < capture.frames; frame++) {
    const [sx, sy] = hand.shift_px(capture.times_s[capture.shows[frame] as number] as number);
    const x_px = piece.x_px + sx;
    const y_px = piece.y_px + sy;
    if (x_px < 0 || y_px < 0 || x_px > width_px - 1 || y_px > height_px - 1) continue;
    rows.push({
      cell,
      kind: "debris",
      frame,
      t_s: capture.times_s[frame] as number,
      x_px,
      y_px,
      x_um: piece.x_px * um_per_px,
      y_um: -piece.y_px * um_per_px,
      vx_um_s: 0,
      vy_um_s: 0,
      signalToNoise: 0,
      visible: false,
    });
  }
  return rows;
}

function cellTruth(
  rows: readonly UnnamedRow[],
  motion: Motion,
  netField_mT: number,
  capture: Capture,
): Omit<TruthCell, "cell"> {
  const { body } = motion;
  const seen = rows.filter((r) => r.visible);
  const first = seen[0];
  const last = seen.at(-1);
  const swims = body.kind === "swimmer";
  const sum = seen.reduce((total, r) => total + Math.hypot(r.vx_um_s, r.vy_um_s), 0);
  return {
    kind: body.kind,
    first_frame: rows[0]?.frame as number,
    last_frame: rows.at(-1)?.frame as number,
    visible_frames: seen.length,
    visible_s: first && last ? (capture.times_s[last.frame] as number) - (capture.times_s[first.frame] as number) : 0,
    speed_um_s: seen.length > 0 ? sum / seen.length : null,
    speed3d_um_s: swims ? body.speed_um_s : null,
    moment_A_m2: swims ? body.moment_A_m2 : null,
    turn_rate_per_s: swims ? Math.abs(body.turn_per_s_mT) * netField_mT : null,
    south_seeking: swims ? body.turn_per_s_mT < 0 : null,
  };
}

function trialTruth(settings: AssaySettings, cells: readonly TruthCell[], netField_mT: number): TrialTruth {
  const { sample, swimmers } = settings;
  const drag = sphereDrag(sample.cellRadius_um, sample.temperature_C, sample.relativeViscosity);
  const counted = cells.filter((c) => c.visible_s >= countsFrom_s && c.kind !== "stuck");
  const swam = counted.filter((c) => c.kind === "swimmer");
  const n = swam.length;
  const mean = n > 0 ? swam.reduce((sum, c) => sum + (c.speed_um_s as number), 0) / n : null;
  const squares = swam.reduce((sum, c) => sum + ((c.speed_um_s as number) - (mean as number)) ** 2, 0);
  const moment = n > 0 ? swam.reduce((sum, c) => sum + (c.moment_A_m2 as number), 0) / n : null;
  return {
    mean_speed_um_s: mean,
    sd_speed_um_s: n > 1 ? Math.sqrt(squares / (n - 1)) : null,
    n_cells: n,
    motile_fraction: counted.length > 0 ? n / counted.length : null,
    flow_um_s: sample.flow_um_s,
    mean_moment_A_m2: moment,
    turn_rate_per_s: moment === null ? null : (moment * netField_mT * 1e-3) / drag.rotational_N_m_s,
    energy_ratio: moment === null ? null : energyRatio(moment, netField_mT, settings),
    rotational_diffusion_per_s: drag.rotationalDiffusion_per_s * swimmers.restlessness,
    diffusion_um2_s: drag.diffusion_um2_s,
    visible_at_noise: settings.visibleAt,
  };
}

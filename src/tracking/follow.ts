import type { Sightings } from "../quantities/index.ts";
import { assign, type Pairing } from "./assignment.ts";
import type { FrameIndex } from "./frame-index.ts";
import { type Belief, firstBelief, type MotionModel, predict, update } from "./motion-model.ts";
import type { TrackingSettings } from "./settings.ts";
import { type TrackingView, toEdge } from "./view.ts";

/** A cell being followed: the sightings taken for it so far, and what is believed of it. */
export interface Piece {
  readonly rows: number[];
  belief: Belief;
  /** Squared distances of sightings to predictions over their covariance, from the fourth sighting on. */
  readonly surprises: number[];
}

/** Systematic part of a position's error that its standard error doesn't know of, pixels². */
const floorVariance_px2 = 0.05 ** 2;
/** Sightings after which a cell's velocity is known well enough to look for it after a sharp turn. */
const knownAfter = 5;
/** A cell sighted only once is given up after this many missed frames; its velocity could be anything. */
const newcomerFrames = 2.5;

/** Standard deviations of a spot along its axis that make a body, and sightings after which a cell's place is known. */
const bodyLengths = 2.2;
const bodyFrom = 3;
/** A sighting longer than this over the usual length is of two cells, or of one and part of another. */
const tooLong = 1.4;

/**
 * Variance of every sighting's position along one axis, pixels²: the mean of both axes. Where a sighting is much longer
 * than the clip's usually are, it shows cells that touch, and its middle may be anywhere between theirs.
 */
export function positionVariances(s: Sightings): Float64Array {
  const usual = usualMajor_px(s);
  return Float64Array.from({ length: s.count }, (_, i) => {
    const own = ((s.seX_px[i] as number) ** 2 + (s.seY_px[i] as number) ** 2) / 2;
    const excess = (s.major_px[i] as number) ** 2 - (tooLong * usual) ** 2;
    return own + floorVariance_px2 + Math.max(0, excess) / 2;
  });
}

/** Median standard deviation of sightings along their long axes, pixels. */
function usualMajor_px(s: Sightings): number {
  return s.count > 0 ? (s.major_px.slice().sort()[s.count >> 1] as number) : 0;
}

/**
 * Follows all cells through all frames: in each, every cell's position is predicted for the frame's own time, sightings
 * within the gate are paired with cells at greatest total likelihood, cells that are missed coast, and sightings that
 * nobody claims begin new pieces.
 */
export class Follower {
  private readonly sightings: Sightings;
  private readonly index: FrameIndex;
  private readonly model: MotionModel;
  private readonly variances: Float64Array;
  private readonly settings: TrackingSettings;
  private readonly frameInterval_s: number;
  private readonly usualMajor: number;
  private readonly view: TrackingView;
  private live: Piece[] = [];
  readonly pieces: Piece[] = [];

  constructor(
    sightings: Sightings,
    variances: Float64Array,
    index: FrameIndex,
    model: MotionModel,
    settings: TrackingSettings,
    frameInterval_s: number,
    view: TrackingView,
  ) {
    this.sightings = sightings;
    this.variances = variances;
    this.index = index;
    this.model = model;
    this.settings = settings;
    this.frameInterval_s = frameInterval_s;
    this.usualMajor = usualMajor_px(sightings);
    this.view = view;
  }

  /** Takes in one frame. Frames must come in order. */
  frame(frame: number, t_s: number): void {
    this.live = this.live.filter((p) => this.stillExpected(p, t_s));
    const [first, end] = this.index.rows(frame);
    const free = new Set<number>();
    for (let row = first; row < end; row++) free.add(row);
    const predicted = this.live.map((p) => predict(this.model, p.belief, t_s));
    const missed = this.pairByPrediction(frame, predicted, free);
    const stillMissed = this.pairWithinABody(frame, missed, predicted, free);
    this.pairAfterSharpTurns(frame, stillMissed, predicted, free);
    for (const row of free) this.begin(row, t_s);
  }

  private stillExpected(piece: Piece, t_s: number): boolean {
    const waited = t_s - piece.belief.t_s;
    const patience = Math.max(this.settings.coast_s, 3.5 * this.frameInterval_s);
    return waited <= (piece.rows.length === 1 ? newcomerFrames * this.frameInterval_s : patience);
  }

  /** Pairs what lies within the gates; removes claimed sightings from `free`; returns the cells left without. */
  private pairByPrediction(frame: number, predicted: readonly Belief[], free: Set<number>): number[] {
    const { sightings, model } = this;
    const pairings: Pairing[] = [];
    const logArrivals = 2 * Math.log(2 * Math.PI * model.arrivals_per_px2);
    predicted.forEach((b, cell) => {
      const reach = Math.sqrt(this.settings.gate * (b.pp + 4));
      this.index.near(frame, b.x, b.y, reach, (row) => {
        const s = b.pp + (this.variances[row] as number);
        const d2 = distance2(sightings, row, b) / s;
        // Minus twice the log of the likelihood that this is the cell, over the likelihood that it is a newcomer.
        if (d2 <= this.settings.gate)
          pairings.push({ row: cell, column: row, cost: d2 + 2 * Math.log(s) + logArrivals });
      });
    });
    const alone = -2 * Math.log(1 - model.sighted);
    const missed = new Set(predicted.keys());
    for (const { row: cell, column: row } of assign(pairings, alone + this.settings.gate)) {
      this.extend(cell, predicted[cell] as Belief, row);
      missed.delete(cell);
      free.delete(row);
    }
    return [...missed];
  }

  /**
   * A sighting that nobody else claims, within a body's length of where a cell should be, is that cell: encoders hold a
   * spot back for a frame and let it jump, and a cell that comes out from behind another isn't where it was thought.
   */
  private pairWithinABody(
    frame: number,
    missed: readonly number[],
    predicted: readonly Belief[],
    free: Set<number>,
  ): number[] {
    const { sightings } = this;
    const pairings: Pairing[] = [];
    for (const cell of missed) {
      if ((this.live[cell] as Piece).rows.length < bodyFrom) continue;
      const b = predicted[cell] as Belief;
      const reach = bodyLengths * this.usualMajor + 3 * Math.sqrt(b.pp);
      this.index.near(frame, b.x, b.y, reach, (row) => {
        const d2 = distance2(sightings, row, b);
        if (free.has(row) && d2 <= reach * reach) pairings.push({ row: cell, column: row, cost: d2 });
      });
    }
    const paired = new Set<number>();
    for (const { row: cell, column: row } of assign(pairings, Number.MAX_SAFE_INTEGER)) {
      const b = predicted[cell] as Belief;
      const surprise = distance2(sightings, row, b) / 4;
      this.extend(cell, { ...b, pp: b.pp + surprise }, row);
      paired.add(cell);
      free.delete(row);
    }
    return missed.filter((cell) => !paired.has(cell));
  }

  /**
   * A cell that turned sharply lies within a circle of what it can swim about where it was last seen. One that was about to
   * leave the view has left it: what comes in near there is another.
   */
  private pairAfterSharpTurns(
    frame: number,
    missed: readonly number[],
    predicted: readonly Belief[],
    free: Set<number>,
  ): void {
    const { sightings } = this;
    const pairings: Pairing[] = [];
    const wide = new Map<number, Belief>();
    for (const cell of missed) {
      const { rows, belief } = this.live[cell] as Piece;
      if (rows.length < knownAfter) continue;
      const { x, y } = predicted[cell] as Belief;
      if (toEdge(this.view, x, y) < 0) continue;
      const waited = (predicted[cell] as Belief).t_s - belief.t_s;
      const { pace2 } = predicted[cell] as Belief;
      const speed = Math.sqrt(pace2);
      const reach = 1.3 * speed * waited + 3 * Math.sqrt(belief.pp);
      const around = {
        ...belief,
        t_s: belief.t_s + waited,
        vx: 0,
        vy: 0,
        pp: (reach / 2) ** 2,
        pv: 0,
        vv: pace2,
      };
      wide.set(cell, around);
      this.index.near(frame, belief.x, belief.y, reach, (row) => {
        const d2 = distance2(sightings, row, belief);
        if (free.has(row) && d2 <= reach * reach) pairings.push({ row: cell, column: row, cost: d2 / around.pp });
      });
    }
    for (const { row: cell, column: row } of assign(pairings, Number.MAX_SAFE_INTEGER)) {
      const piece = this.live[cell] as Piece;
      const around = wide.get(cell) as Belief;
      const waited = around.t_s - piece.belief.t_s;
      const vx = ((sightings.x_px[row] as number) - piece.belief.x) / waited;
      const vy = ((sightings.y_px[row] as number) - piece.belief.y) / waited;
      piece.belief = {
        ...update(around, sightings.x_px[row] as number, sightings.y_px[row] as number, this.variances[row] as number),
        vx,
        vy,
      };
      piece.rows.push(row);
      free.delete(row);
    }
  }

  private extend(cell: number, predicted: Belief, row: number): void {
    const { sightings } = this;
    const piece = this.live[cell] as Piece;
    const variance = this.variances[row] as number;
    if (piece.rows.length >= 3) piece.surprises.push(distance2(sightings, row, predicted) / (predicted.pp + variance));
    piece.belief = update(predicted, sightings.x_px[row] as number, sightings.y_px[row] as number, variance);
    piece.rows.push(row);
  }

  private begin(row: number, t_s: number): void {
    const { sightings } = this;
    const x = sightings.x_px[row] as number;
    const y = sightings.y_px[row] as number;
    const belief = firstBelief(this.model, t_s, x, y, this.variances[row] as number);
    const piece: Piece = { rows: [row], belief, surprises: [] };
    this.live.push(piece);
    this.pieces.push(piece);
  }
}

function distance2(sightings: Sightings, row: number, at: { readonly x: number; readonly y: number }): number {
  const dx = (sightings.x_px[row] as number) - at.x;
  const dy = (sightings.y_px[row] as number) - at.y;
  return dx * dx + dy * dy;
}

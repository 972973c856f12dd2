/**
 * All sightings of a recording as columns, in frame order.
 *
 * A sighting is one cell-like spot in one frame. Positions are pixels in the *scene*: the upright picture with
 * camera shake removed (x right, y down, origin at the centre of the top-left pixel). What the camera saw in
 * frame f at scene position (x, y) lies in the picture at (x + shift.x[f], y + shift.y[f]).
 */
export interface Sightings {
  readonly count: number;
  /** Frame index of each sighting, never falling. */
  readonly frame: Uint32Array;
  readonly x_px: Float64Array;
  readonly y_px: Float64Array;
  /** Standard error of the position along x and y, pixels. */
  readonly seX_px: Float32Array;
  readonly seY_px: Float32Array;
  /** Matched-filter signal over noise at the peak. */
  readonly snr: Float32Array;
  /** Peak contrast against the background, grey levels, signed (negative: darker than the background). */
  readonly contrast: Float32Array;
  /** Standard deviations of the spot along and across its long axis, pixels. */
  readonly major_px: Float32Array;
  readonly minor_px: Float32Array;
  /** Direction of the long axis, radians counter-clockwise from image right, in [0, π). */
  readonly axis_rad: Float32Array;
}

type Column = Exclude<keyof Sightings, "count">;
const columns: readonly Column[] = [
  "frame",
  "x_px",
  "y_px",
  "seX_px",
  "seY_px",
  "snr",
  "contrast",
  "major_px",
  "minor_px",
  "axis_rad",
];

/** One sighting as an object, for building and for tests. */
export type Sighting = { readonly [K in Column]: number };

/** Grows a {@link Sightings} table: `add` in frame order, then `seal` once. */
export class SightingsBuilder {
  private capacity = 1024;
  private count = 0;
  private lastFrame = 0;
  private table = allocate(this.capacity);

  /** Adds one sighting. Throws when frames go backwards. */
  add(s: Sighting): void {
    if (s.frame < this.lastFrame) throw new Error(`sighting of frame ${s.frame} after frame ${this.lastFrame}`);
    if (this.count === this.capacity) this.grow();
    for (const name of columns) this.table[name][this.count] = s[name];
    this.lastFrame = s.frame;
    this.count++;
  }

  get size(): number {
    return this.count;
  }

  /** Returns the table, trimmed. The builder must not be used afterwards. */
  seal(): Sightings {
    const n = this.count;
    const t = this.table;
    return {
      count: n,
      frame: t.frame.slice(0, n),
      x_px: t.x_px.slice(0, n),
      y_px: t.y_px.slice(0, n),
      seX_px: t.seX_px.slice(0, n),
      seY_px: t.seY_px.slice(0, n),
      snr: t.snr.slice(0, n),
      contrast: t.contrast.slice(0, n),
      major_px: t.major_px.slice(0, n),
      minor_px: t.minor_px.slice(0, n),
      axis_rad: t.axis_rad.slice(0, n),
    };
  }

  private grow(): void {
    const bigger = allocate(this.capacity * 2);
    for (const name of columns) bigger[name].set(this.table[name] as never);
    this.table = bigger;
    this.capacity *= 2;
  }
}

function allocate(n: number) {
  return {
    frame: new Uint32Array(n),
    x_px: new Float64Array(n),
    y_px: new Float64Array(n),
    seX_px: new Float32Array(n),
    seY_px: new Float32Array(n),
    snr: new Float32Array(n),
    contrast: new Float32Array(n),
    major_px: new Float32Array(n),
    minor_px: new Float32Array(n),
    axis_rad: new Float32Array(n),
  };
}

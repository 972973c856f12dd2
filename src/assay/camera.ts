import type { Capture } from "./capture.ts";
import type { Motion } from "./motion.ts";
import type { AssaySettings } from "./options.ts";
import {
  type Circle,
  drawDebris,
  emptyLayer,
  eyepieceCircle,
  type Layer,
  lightLayer,
  type Piece,
  scatterDebris,
  shiftedInto,
} from "./scene.ts";
import { type Sensor, sensor } from "./sensor.ts";
import type { Handling } from "./shake.ts";
import { addGaussian, haloWidth, type Imaging, imaging, type Spot, type Window } from "./spot.ts";

/** What the camera sees of one cell in one frame. */
export interface Look {
  /** Picture pixels, shake included. */
  readonly x_px: number;
  readonly y_px: number;
  /** Signed peak contrast in grey levels (negative: darker than the light around it). */
  readonly contrast: number;
  /** Its size over the sensor's noise at that light. */
  readonly signalToNoise: number;
  /** Inside the picture and, where there is one, the eyepiece. */
  readonly inView: boolean;
}

/** Exposure is followed in pieces over which a cell moves by no more than this, pixels. */
const finestSmear_px = 0.7;
const mostPieces = 12;

/** Makes the pictures: the still scene, the cells of the moment, shake, exposure and noise. */
export class Camera {
  readonly circle: Circle | null;
  readonly pieces: readonly Piece[];
  private readonly light: Layer;
  /** Share of the light that debris lets through, or null where there is none. */
  private readonly clear: Layer | null;
  private readonly imaging: Imaging;
  private readonly sensor: Sensor;
  private readonly lit: Float32Array;
  private readonly through: Float32Array;
  private readonly density: Float32Array;
  private readonly still: boolean;
  private readonly focus_um: number;

  constructor(
    private readonly settings: AssaySettings,
    private readonly capture: Capture,
    private readonly motions: readonly Motion[],
    private readonly hand: Handling,
  ) {
    const pad = hand.reach_px + 2;
    const { width_px, height_px, um_per_px } = settings.picture;
    this.circle = eyepieceCircle(settings);
    this.light = lightLayer(settings, this.circle, pad);
    this.pieces = scatterDebris(settings, pad);
    this.clear = this.pieces.length > 0 ? debrisLayer(settings, this.pieces, pad) : null;
    this.imaging = imaging(settings.optics, um_per_px);
    this.sensor = sensor(settings);
    this.lit = new Float32Array(width_px * height_px);
    this.through = new Float32Array(this.clear ? width_px * height_px : 0);
    this.density = new Float32Array(width_px * height_px);
    this.still = hand.reach_px === 0;
    this.focus_um = settings.optics.focus_um ?? settings.sample.depth_um / 2;
    if (this.still) this.layScene(0, 0);
  }

  /** Writes the upright luma of a frame, row-major, one byte a pixel. */
  render(frame: number, out: Uint8Array): void {
    const { width_px, height_px } = this.settings.picture;
    if (out.length !== width_px * height_px) throw new Error(`a frame needs ${width_px * height_px} bytes`);
    const shown = this.capture.shows[frame];
    if (shown === undefined) throw new Error(`no frame ${frame} in a clip of ${this.capture.frames}`);
    const t_s = this.capture.times_s[shown] as number;
    const [sx, sy] = this.hand.shift_px(t_s);
    if (!this.still) this.layScene(sx, sy);
    const touched: Window[] = [];
    for (const motion of this.motions) this.drawCell(motion, shown, sx, sy, touched);
    this.sensor.expose(this.lit, this.density, this.hand.gain(t_s), shown, out);
    for (const { x0, x1, y0, y1 } of touched) {
      for (let y = y0; y < y1; y++) this.density.fill(0, y * width_px + x0, y * width_px + x1);
    }
  }

  /** What the picture of a frame holds of one cell. */
  look(motion: Motion, frame: number): Look {
    const { width_px, height_px } = this.settings.picture;
    const shown = this.capture.shows[frame] as number;
    const t_s = this.capture.times_s[shown] as number;
    const [sx, sy] = this.hand.shift_px(t_s);
    const [x_px, y_px] = this.place(motion, shown, sx, sy);
    const spot = this.spotOf(motion, shown);
    const [dx, dy] = this.smear(motion, shown);
    const det = spot.cxx * spot.cyy - spot.cxy ** 2;
    const smeared = (spot.cxx + (dx * dx) / 12) * (spot.cyy + (dy * dy) / 12) - (spot.cxy + (dx * dy) / 12) ** 2;
    const moves = this.settings.phone.shakes === "phone";
    const lx = Math.round(x_px - (moves ? sx : 0)) + this.light.pad;
    const ly = Math.round(y_px - (moves ? sy : 0)) + this.light.pad;
    const inside = x_px >= -0.5 && y_px >= -0.5 && x_px < width_px - 0.5 && y_px < height_px - 0.5;
    const light = (this.light.values[ly * this.light.width + lx] ?? 0) * this.hand.gain(t_s);
    const contrast = light * (Math.exp(-spot.peak * Math.sqrt(det / smeared)) - 1);
    return {
      x_px,
      y_px,
      contrast: inside ? contrast : 0,
      signalToNoise: inside ? Math.abs(contrast) / this.sensor.noiseAt(light) : 0,
      inView: inside && this.inCircle(x_px - (moves ? sx : 0), y_px - (moves ? sy : 0)),
    };
  }

  private inCircle(x: number, y: number): boolean {
    const c = this.circle;
    return c === null || Math.hypot(x - c.x, y - c.y) <= c.radius;
  }

  private layScene(sx: number, sy: number): void {
    const { width_px, height_px } = this.settings.picture;
    const moves = this.settings.phone.shakes === "phone";
    shiftedInto(this.light, moves ? sx : 0, moves ? sy : 0, width_px, height_px, this.lit);
    if (!this.clear) return;
    shiftedInto(this.clear, sx, sy, width_px, height_px, this.through);
    for (let i = 0; i < this.lit.length; i++) this.lit[i] = (this.lit[i] as number) * (this.through[i] as number);
  }

  private place(motion: Motion, frame: number, sx: number, sy: number): [x: number, y: number] {
    const scale = this.settings.picture.um_per_px;
    return [(motion.x_um[frame] as number) / scale + sx, -(motion.y_um[frame] as number) / scale + sy];
  }

  private smear(motion: Motion, frame: number): [dx: number, dy: number] {
    const scale = this.settings.picture.um_per_px;
    return [(motion.dx_um[frame] as number) / scale, -(motion.dy_um[frame] as number) / scale];
  }

  private spotOf(motion: Motion, frame: number): Spot {
    const height = (motion.z_um[frame] as number) - this.focus_um;
    return this.imaging.spot(motion.nx[frame] as number, -(motion.ny[frame] as number), height, motion.body.contrast);
  }

  private drawCell(motion: Motion, frame: number, sx: number, sy: number, touched: Window[]): void {
    const { width_px, height_px } = this.settings.picture;
    const [x, y] = this.place(motion, frame, sx, sy);
    if (x < -60 || y < -60 || x > width_px + 60 || y > height_px + 60) return;
    const spot = this.spotOf(motion, frame);
    const [dx, dy] = this.smear(motion, frame);
    const pieces = Math.min(mostPieces, Math.max(1, Math.ceil(Math.hypot(dx, dy) / finestSmear_px)));
    const core = spot.peak / pieces / (1 - spot.halo);
    for (let k = 0; k < pieces; k++) {
      const along = (k + 0.5) / pieces - 0.5;
      const px = x + along * dx;
      const py = y + along * dy;
      touched.push(addGaussian(this.density, width_px, height_px, px, py, spot, core));
      if (spot.halo > 0) {
        touched.push(addGaussian(this.density, width_px, height_px, px, py, spot, -core * spot.halo, haloWidth));
      }
    }
  }
}

function debrisLayer(settings: AssaySettings, pieces: readonly Piece[], pad: number): Layer {
  const layer = emptyLayer(settings, pad);
  drawDebris(layer, pieces);
  for (let i = 0; i < layer.values.length; i++) layer.values[i] = Math.exp(-(layer.values[i] as number));
  return layer;
}

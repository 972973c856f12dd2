import type { AssaySettings } from "./options.ts";
import { addGaussian } from "./spot.ts";
import { logNormal, normals, stream } from "./variates.ts";

/** A layer of the still scene, larger than the picture by `pad` on every side so that it can be shifted. */
export interface Layer {
  readonly values: Float32Array;
  readonly width: number;
  readonly height: number;
  readonly pad: number;
}

/** The lit circle of the eyepiece, picture pixels. */
export interface Circle {
  readonly x: number;
  readonly y: number;
  readonly radius: number;
}

/** One round grain of debris: scene pixels, y down. */
interface Grain {
  readonly x_px: number;
  readonly y_px: number;
  readonly sigma_px: number;
  readonly density: number;
}

/** One piece of debris, made of grains: scene pixels, y down. */
export interface Piece {
  readonly x_px: number;
  readonly y_px: number;
  readonly sigma_px: number;
  readonly grains: readonly Grain[];
}

/** Softness of the eyepiece's rim, pixels (scale of the logistic). */
const rim_px = 3;

/** Coefficient of variation of debris sizes. */
const debrisCv = 0.7;

/** The eyepiece's circle, a little off the middle as phones are held; null when the whole picture is lit. */
export function eyepieceCircle(settings: AssaySettings): Circle | null {
  const { width_px, height_px } = settings.picture;
  const eyepiece = settings.light.eyepiece;
  if (eyepiece === null) return null;
  const random = stream(settings.seed, "eyepiece");
  return {
    x: (width_px - 1) / 2 + (random() - 0.5) * 0.03 * height_px,
    y: (height_px - 1) / 2 + (random() - 0.5) * 0.03 * height_px,
    radius: (eyepiece * height_px) / 2,
  };
}

/** Empty-field light in grey levels: a vignette, a slant, a faint mottle, and black outside the eyepiece. */
export function lightLayer(settings: AssaySettings, circle: Circle | null, pad: number): Layer {
  const layer = emptyLayer(settings, pad);
  const { level, vignette, black } = settings.light;
  const { width_px, height_px } = settings.picture;
  const random = stream(settings.seed, "light");
  const slantX = 0.08 * (random() - 0.5);
  const slantY = 0.08 * (random() - 0.5);
  const mottle = Array.from({ length: 6 }, () => ({
    kx: ((random() - 0.5) * 24) / width_px,
    ky: ((random() - 0.5) * 24) / width_px,
    phase: 2 * Math.PI * random(),
  }));
  const cx = circle?.x ?? (width_px - 1) / 2;
  const cy = circle?.y ?? (height_px - 1) / 2;
  const corner = circle?.radius ?? Math.hypot(width_px, height_px) / 2;
  for (let j = 0, k = 0; j < layer.height; j++) {
    for (let i = 0; i < layer.width; i++, k++) {
      const u = (i - pad - cx) / corner;
      const v = (j - pad - cy) / corner;
      const r2 = Math.min(2, u * u + v * v);
      let light = 1 - vignette * r2 + slantX * u + slantY * v;
      for (const m of mottle) light += 0.004 * Math.sin(m.kx * (i - pad) + m.ky * (j - pad) + m.phase);
      let value = level * Math.max(0, light);
      if (circle) {
        const open = 1 / (1 + Math.exp((Math.sqrt(r2) * corner - circle.radius) / rim_px));
        value = black + (value - black) * open;
      }
      layer.values[k] = value;
    }
  }
  return layer;
}

/** Scatters debris over the scene: small pieces are one grain, larger ones an irregular clump of grains. */
export function scatterDebris(settings: AssaySettings, pad: number): Piece[] {
  const { pieces, size_um, contrast } = settings.debris;
  const { width_px, height_px, um_per_px } = settings.picture;
  return Array.from({ length: pieces }, (_, p) => {
    const random = stream(settings.seed, "debris", p);
    const normal = normals(random);
    const x_px = random() * (width_px + 2 * pad) - pad;
    const y_px = random() * (height_px + 2 * pad) - pad;
    const mean_um = size_um * Math.sqrt(1 + debrisCv ** 2);
    const sigma_px = Math.max(0.8, logNormal(mean_um, debrisCv, normal) / um_per_px);
    const density = -Math.log(1 - Math.min(0.9, contrast * (0.5 + random())));
    const count = Math.min(14, Math.max(1, Math.round(1.5 * sigma_px)));
    const grains = Array.from({ length: count }, (_, g) => ({
      x_px: x_px + (g === 0 ? 0 : 0.8 * sigma_px * normal()),
      y_px: y_px + (g === 0 ? 0 : 0.5 * sigma_px * normal()),
      sigma_px: count === 1 ? sigma_px : Math.max(0.8, sigma_px * (0.2 + 0.35 * random())),
      density: count === 1 ? density : density * (0.4 + 0.5 * random()),
    }));
    return { x_px, y_px, sigma_px, grains };
  });
}

/** Adds debris to a layer of optical density. */
export function drawDebris(layer: Layer, pieces: readonly Piece[]): void {
  for (const { grains } of pieces) {
    for (const { x_px, y_px, sigma_px, density } of grains) {
      const spot = { cxx: sigma_px ** 2, cxy: 0, cyy: sigma_px ** 2 };
      addGaussian(layer.values, layer.width, layer.height, x_px + layer.pad, y_px + layer.pad, spot, density);
    }
  }
}

export function emptyLayer(settings: AssaySettings, pad: number): Layer {
  const width = settings.picture.width_px + 2 * pad;
  const height = settings.picture.height_px + 2 * pad;
  return { values: new Float32Array(width * height), width, height, pad };
}

/** Writes to `out` what the layer shows when its content is moved by (dx, dy) pixels, linearly interpolated. */
export function shiftedInto(
  layer: Layer,
  dx: number,
  dy: number,
  width: number,
  height: number,
  out: Float32Array,
): void {
  const sx = layer.pad - dx;
  const sy = layer.pad - dy;
  const ix = Math.floor(sx);
  const iy = Math.floor(sy);
  const fx = sx - ix;
  const fy = sy - iy;
  const { values, width: stride } = layer;
  for (let j = 0, k = 0; j < height; j++) {
    let p = (j + iy) * stride + ix;
    for (let i = 0; i < width; i++, k++, p++) {
      const top = (values[p] as number) * (1 - fx) + (values[p + 1] as number) * fx;
      const low = (values[p + stride] as number) * (1 - fx) + (values[p + stride + 1] as number) * fx;
      out[k] = top * (1 - fy) + low * fy;
    }
  }
}

import type { AssaySettings } from "./options.ts";

/** A Gaussian on the picture: covariance in pixels. */
export interface Shape {
  readonly cxx: number;
  readonly cxy: number;
  readonly cyy: number;
}

/** A cell's spot: a Gaussian core, less a wider Gaussian of the same shape that makes the halo or ring. */
export interface Spot extends Shape {
  /** Optical density at the peak, natural logarithm; negative brightens. */
  readonly peak: number;
  /** Share of the core that the halo takes away at the centre. 0: no halo. */
  readonly halo: number;
}

/** How a cell's picture is made: a rod's own spread, the optics' blur, and the sign and halo of its contrast. */
export interface Imaging {
  /** The spot of a cell with direction (nx, ny) in the picture (y down), height over focus, and in-focus contrast. */
  spot(nx: number, ny: number, height_um: number, contrast: number): Spot;
}

/** Width of the halo over the core's. Shapes of halo and ring by eye: common practice, no source. */
export const haloWidth = 2;

/** Strength of the halo in phase contrast. */
const phaseHalo = 0.4;

/**
 * Spots of rods of uniform density: variance length²/12 along the axis (shortened by how far the rod points out of
 * the picture) and width²/12 across it, widened by the point spread and by a blur that grows with the distance from
 * focus. A wider spot is fainter: the core's absorbance adds up to the same whatever the focus. Phase contrast has a
 * halo of the other sign always; without it a ring of the other sign comes up as the blur outgrows the point spread.
 */
export function imaging(optics: AssaySettings["optics"], um_per_px: number): Imaging {
  const perPx2 = 1 / um_per_px ** 2;
  const long = (optics.bodyLength_um ** 2 / 12) * perPx2;
  const wide = (optics.bodyWidth_um ** 2 / 12) * perPx2;
  const psf = optics.psf_um ** 2 * perPx2;
  const sharpest = Math.sqrt((long + psf) * (wide + psf));
  const sign = optics.polarity === "bright" ? -1 : 1;
  return {
    spot(nx, ny, height_um, contrast) {
      const defocus = (optics.defocus * height_um) ** 2 * perPx2;
      const blur = psf + defocus;
      const cxx = wide + (long - wide) * nx * nx + blur;
      const cyy = wide + (long - wide) * ny * ny + blur;
      const cxy = (long - wide) * nx * ny;
      const density = sign > 0 ? -Math.log(1 - contrast) : -Math.log(1 + contrast);
      const halo = optics.polarity === "phase" ? phaseHalo : (optics.ring * defocus) / blur;
      return { peak: (density * sharpest) / Math.sqrt(cxx * cyy - cxy * cxy), halo, cxx, cxy, cyy };
    },
  };
}

/** Part of the picture touched by a drawing, pixels: columns x0 … x1 - 1, rows y0 … y1 - 1. */
export interface Window {
  readonly x0: number;
  readonly x1: number;
  readonly y0: number;
  readonly y1: number;
}

/** Spots are cut off at four standard deviations: 0.03 % of the peak. */
const reach = 4;

/** Adds one Gaussian with the given peak and covariance, times `scale²`, to a layer of optical density. */
export function addGaussian(
  layer: Float32Array,
  width: number,
  height: number,
  x: number,
  y: number,
  spot: Shape,
  peak: number,
  scale = 1,
): Window {
  const s2 = scale * scale;
  const cxx = spot.cxx * s2;
  const cyy = spot.cyy * s2;
  const cxy = spot.cxy * s2;
  const det = cxx * cyy - cxy * cxy;
  const rx = reach * Math.sqrt(cxx);
  const ry = reach * Math.sqrt(cyy);
  const x0 = Math.max(0, Math.ceil(x - rx));
  const x1 = Math.min(width, Math.floor(x + rx) + 1);
  const y0 = Math.max(0, Math.ceil(y - ry));
  const y1 = Math.min(height, Math.floor(y + ry) + 1);
  const a = -cyy / (2 * det);
  const b = cxy / det;
  const c = -cxx / (2 * det);
  for (let j = y0; j < y1; j++) {
    const v = j - y;
    const cvv = c * v * v;
    const bv = b * v;
    const row = j * width;
    for (let i = x0; i < x1; i++) {
      const u = i - x;
      const q = (a * u + bv) * u + cvv;
      if (q > -8) layer[row + i] = (layer[row + i] as number) + peak * Math.exp(q);
    }
  }
  return { x0, x1, y0, y1 };
}

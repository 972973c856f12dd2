import type { SpotShape, Whitened } from "../../src/vision/spot-shape.ts";
import { spotAt } from "../../src/vision/spot-shape.ts";

/** A spot as the vision code describes one. */
export function spot(x: number, y: number, peak: number, xx: number, yy = xx, xy = 0): SpotShape {
  return { x, y, peak, xx, xy, yy, good: true };
}

/** A whitened picture of the spots in white noise of standard deviation 1. */
export function spotPicture(spots: readonly SpotShape[], size: number, normal: () => number): Whitened {
  const z = new Float32Array(size * size);
  for (let y = 0; y < size; y++) {
    for (let x = 0; x < size; x++) {
      z[y * size + x] = spots.reduce((sum, s) => sum + spotAt(s, x, y), normal());
    }
  }
  return { z, width: size, height: size };
}

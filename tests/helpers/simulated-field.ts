import { type Random, type Sighting, type Sightings, SightingsBuilder } from "../../src/quantities/index.ts";
import type { TrackingView } from "../../src/tracking/index.ts";
import { normalFrom } from "./normal.ts";
import type { PlacesByFrame } from "./path-metrics.ts";

/** A whole picture lit. */
export function openView(width: number, height: number): TrackingView {
  return { width, height, circle: null, area_px2: width * height };
}

/** A sighting of an ordinary cell at a place. */
export function sightingAt(frame: number, x_px: number, y_px: number, changes: Partial<Sighting> = {}): Sighting {
  const usual = { seX_px: 0.2, seY_px: 0.2, snr: 20, contrast: -40, major_px: 2.5, minor_px: 1.5, axis_rad: 0 };
  return { frame, x_px, y_px, ...usual, ...changes };
}

/** Sightings as a table, whatever order they come in. */
export function tableOf(sightings: readonly Sighting[]): Sightings {
  const builder = new SightingsBuilder();
  for (const s of [...sightings].sort((a, b) => a.frame - b.frame)) builder.add(s);
  return builder.seal();
}

/** What a field of swimmers is to be like: pixels and seconds. */
export interface FieldOptions {
  readonly cells: number;
  readonly width: number;
  readonly height: number;
  readonly speed: number;
  readonly rotation_rad2_s: number;
  readonly diffusion: number;
  readonly noise: number;
  /** Share of sightings missed, and false ones a frame. */
  readonly misses: number;
  readonly falsePerFrame: number;
}

/** Swimmers in a field that they leave and enter: what was seen, and the true places by cell. */
export function simulateField(o: FieldOptions, times_s: Float64Array, random: Random) {
  const normal = normalFrom(random);
  const sightings: Sighting[] = [];
  const truth: PlacesByFrame[] = [];
  const margin = 60;
  // Cells come from a box wider than the view and wrap round beyond its edge, each time as another cell.
  const [w, h] = [o.width + 2 * margin, o.height + 2 * margin];
  const crowd = Math.round((o.cells * w * h) / (o.width * o.height));
  for (let c = 0; c < crowd; c++) {
    let x = random() * w - margin;
    let y = random() * h - margin;
    let heading = 2 * Math.PI * random();
    const speed = o.speed * (0.6 + 0.8 * random());
    let seen = new Map<number, readonly [number, number]>();
    times_s.forEach((t, frame) => {
      if (frame > 0) {
        const dt = t - (times_s[frame - 1] as number);
        heading += Math.sqrt(2 * o.rotation_rad2_s * dt) * normal();
        x += speed * Math.cos(heading) * dt + Math.sqrt(2 * o.diffusion * dt) * normal();
        y += speed * Math.sin(heading) * dt + Math.sqrt(2 * o.diffusion * dt) * normal();
        x = ((((x + margin) % w) + w) % w) - margin;
        y = ((((y + margin) % h) + h) % h) - margin;
      }
      const inside = x >= 0 && y >= 0 && x <= o.width - 1 && y <= o.height - 1;
      if (!inside) {
        if (seen.size > 0) truth.push(seen);
        seen = new Map();
        return;
      }
      seen.set(frame, [x, y]);
      if (random() >= o.misses) sightings.push(sightingAt(frame, x + o.noise * normal(), y + o.noise * normal()));
    });
    if (seen.size > 0) truth.push(seen);
  }
  times_s.forEach((_, frame) => {
    for (let left = o.falsePerFrame; left > 0; left--) {
      if (random() < left) sightings.push(sightingAt(frame, random() * (o.width - 1), random() * (o.height - 1)));
    }
  });
  return { sightings, truth };
}

import type { Sightings } from "../quantities/index.ts";

/** Finds the sightings of one frame near a place, without looking at all of them. */
export class FrameIndex {
  private readonly sightings: Sightings;
  /** First sighting of each frame, and one past the last. */
  private readonly first: Uint32Array;
  /** Rows of each frame in order of x. */
  private readonly byX: Uint32Array;

  constructor(sightings: Sightings, frames: number) {
    this.sightings = sightings;
    this.first = new Uint32Array(frames + 1);
    let row = 0;
    for (let f = 0; f <= frames; f++) {
      while (row < sightings.count && (sightings.frame[row] as number) < f) row++;
      this.first[f] = row;
    }
    const { x_px } = sightings;
    this.byX = Uint32Array.from({ length: sightings.count }, (_, i) => i);
    for (let f = 0; f < frames; f++) {
      const part = this.byX.subarray(this.first[f], this.first[f + 1]);
      part.sort((a, b) => (x_px[a] as number) - (x_px[b] as number) || a - b);
    }
  }

  /** First row of a frame, and one past its last. */
  rows(frame: number): [first: number, end: number] {
    return [this.first[frame] as number, this.first[frame + 1] as number];
  }

  /** Calls `found` for every sighting of the frame within `reach` of (x, y) along both axes. */
  near(frame: number, x: number, y: number, reach: number, found: (row: number) => void): void {
    const { x_px, y_px } = this.sightings;
    const [start, end] = this.rows(frame);
    let low = start;
    let high = end;
    while (low < high) {
      const middle = (low + high) >> 1;
      if ((x_px[this.byX[middle] as number] as number) < x - reach) low = middle + 1;
      else high = middle;
    }
    for (let i = low; i < end; i++) {
      const row = this.byX[i] as number;
      if ((x_px[row] as number) > x + reach) return;
      if (Math.abs((y_px[row] as number) - y) <= reach) found(row);
    }
  }

  /** Median distance from a sighting to its nearest neighbour in the same frame, pixels; null when none has one. */
  medianNeighbourDistance(): number | null {
    const { count, frame, x_px, y_px } = this.sightings;
    const distances: number[] = [];
    const step = Math.max(1, Math.floor(count / 2000));
    for (let i = 0; i < count; i += step) {
      const [start, end] = this.rows(frame[i] as number);
      let least = Number.POSITIVE_INFINITY;
      for (let j = start; j < end; j++) {
        if (j === i) continue;
        const dx = (x_px[j] as number) - (x_px[i] as number);
        const dy = (y_px[j] as number) - (y_px[i] as number);
        least = Math.min(least, dx * dx + dy * dy);
      }
      if (Number.isFinite(least)) distances.push(Math.sqrt(least));
    }
    distances.sort((a, b) => a - b);
    return distances.length > 0 ? (distances[distances.length >> 1] as number) : null;
  }
}

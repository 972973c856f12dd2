import { describe, expect, it } from "vitest";
import { normalFrom } from "../../tests/helpers/normal.ts";
import { spot, spotPicture } from "../../tests/helpers/spot-picture.ts";
import { seededRandom } from "../quantities/index.ts";
import { fitTogether } from "./joint-fit.ts";
import { measureSpot } from "./spot-shape.ts";

describe("spots that touch", () => {
  it.each([10, 20, 40])("2.5 standard deviations apart are told apart at a signal over noise of %d", (snr) => {
    const random = seededRandom(51);
    const normal = normalFrom(random);
    const sigma = 2;
    // Bound of a lone spot; two that overlap share information, and three times that is asked of the program.
    const bound = Math.sqrt(2 / Math.PI) / snr;
    let squares = 0;
    let oneByOne = 0;
    const runs = 100;
    for (let k = 0; k < runs; k++) {
      const angle = 2 * Math.PI * random();
      const half = (2.5 * sigma) / 2;
      const [cx, cy] = [24 + random() - 0.5, 24 + random() - 0.5];
      const pair = [1, -1].map((s) =>
        spot(cx + s * half * Math.cos(angle), cy + s * half * Math.sin(angle), snr, sigma ** 2),
      );
      const picture = spotPicture(pair, 49, normal);
      const start = pair.map((p) => ({ x: Math.round(p.x), y: Math.round(p.y), peak: snr }));
      const found = fitTogether(picture, 1, start, sigma, []);
      found.forEach((f, i) => {
        const truth = pair[i] as (typeof pair)[number];
        expect(f.good).toBe(true);
        squares += (f.x - truth.x) ** 2 + (f.y - truth.y) ** 2;
        const alone = measureSpot(picture, 1, Math.round(truth.x), Math.round(truth.y), sigma, 0, []);
        oneByOne += (alone.x - truth.x) ** 2 + (alone.y - truth.y) ** 2;
      });
    }
    const error = Math.sqrt(squares / (4 * runs));
    expect(error).toBeLessThan(3 * bound);
    expect(error).toBeGreaterThan(0.8 * bound);
    expect(Math.sqrt(oneByOne / (4 * runs))).toBeGreaterThan(2 * error);
  });

  it("of different strength and shape are both kept, each nearer its place than measured alone", () => {
    const pair = [spot(22, 24, 60, 5, 4), spot(27.4, 25.1, 25, 3.6, 4.4)];
    const picture = spotPicture(pair, 49, () => 0);
    const start = [
      { x: 22, y: 24, peak: 50 },
      { x: 27, y: 25, peak: 30 },
    ];
    const found = fitTogether(picture, 1, start, 2, []);
    found.forEach((f, i) => {
      const truth = pair[i] as (typeof pair)[number];
      const from = start[i] as (typeof start)[number];
      const alone = measureSpot(picture, 1, from.x, from.y, 2, 1, []);
      expect(f.good).toBe(true);
      expect(Math.hypot(f.x - truth.x, f.y - truth.y)).toBeLessThan(
        0.7 * Math.hypot(alone.x - truth.x, alone.y - truth.y),
      );
      expect(Math.abs(f.peak / truth.peak - 1)).toBeLessThan(0.1);
    });
  });
});

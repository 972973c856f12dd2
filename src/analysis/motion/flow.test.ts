import { describe, expect, it } from "vitest";
import { normalFrom } from "../../../tests/helpers/normal.ts";
import { evenTimes, type Walker, walk } from "../../../tests/helpers/simulated-tracks.ts";
import { seededRandom } from "../../quantities/index.ts";
import { mean, standardDeviation } from "../../statistics/index.ts";
import { agree, type Flow, flowOfDrifters, flowOfTurners } from "./flow.ts";
import type { Track } from "./track.ts";

const D = 0.245;
const sigma = 0.1;
const flow: [number, number] = [4, -2.5];

/** A clip of `cells` walkers that start out in random directions. */
function clip(cells: number, walker: Partial<Walker>, seconds: number, seed: number): Track[] {
  const random = seededRandom(seed);
  const normal = normalFrom(random);
  return Array.from({ length: cells }, () =>
    walk(
      { speed: 0, diffusion: D, sigma, flow, heading_rad: 2 * Math.PI * random(), ...walker },
      evenTimes(seconds, 30),
      normal,
    ),
  );
}

/** Share of intervals that hold the true flow, either component. */
function coverage(found: readonly Flow[]): number {
  const held = found.flatMap(({ finding: { ci95_px_s } }) =>
    ([0, 1] as const).map((axis) => ci95_px_s[axis][0] <= flow[axis] && flow[axis] <= ci95_px_s[axis][1]),
  );
  return held.filter(Boolean).length / held.length;
}

function unbiased(found: readonly Flow[]): void {
  for (const [values, truth] of [
    [found.map((f) => f.vx), flow[0]],
    [found.map((f) => f.vy), flow[1]],
  ] as const) {
    const error = standardDeviation(values) / Math.sqrt(values.length);
    expect(Math.abs(mean(values) - truth)).toBeLessThan(3 * error);
  }
}

describe("flow from cells that only diffuse", () => {
  it.each([4, 12, 40])("of %d cells is unbiased and within its interval as often as stated", (cells) => {
    const clips = 400;
    const found = Array.from({ length: clips }, (_, k) => flowOfDrifters(clip(cells, {}, 2, 100 * cells + k)));
    const known = found.filter((f) => f !== null);
    expect(known.length).toBeGreaterThanOrEqual(0.95 * clips);
    unbiased(known);
    // Binomial standard error of 800 components: 0.8 %; 3 % is more than 3 of them.
    expect(coverage(known)).toBeGreaterThan(0.92);
    expect(coverage(known)).toBeLessThan(0.98);
    for (const f of known) expect(f.finding.from).toBe("diffusing cells");
  });

  it("isn't misled by swimmers among them", () => {
    const found = Array.from({ length: 100 }, (_, k) => {
      const drifters = clip(12, {}, 2, 7000 + k);
      const swimmers = clip(20, { speed: 30, rotation_rad2_s: 0.3 }, 2, 8000 + k);
      return flowOfDrifters([...swimmers, ...drifters]);
    });
    const known = found.filter((f) => f !== null);
    expect(known.length).toBeGreaterThanOrEqual(95);
    // 200 components: a binomial standard error of 1.5 %.
    expect(coverage(known)).toBeGreaterThan(0.9);
  });

  it("refuses straight swimmers that happen to go alike", () => {
    let taken = 0;
    for (let k = 0; k < 100; k++) {
      const random = seededRandom(300 + k);
      const normal = normalFrom(random);
      // As magnetotactic bacteria in a field: one direction within ten degrees or so, speeds that vary by a quarter.
      const swimmers = Array.from({ length: 30 }, () =>
        walk(
          {
            speed: 40 * (1 + 0.25 * normal()),
            heading_rad: 0.15 * normal(),
            rotation_rad2_s: 0.02,
            diffusion: D,
            sigma,
          },
          evenTimes(2, 30),
          normal,
        ),
      );
      if (flowOfDrifters(swimmers)) taken++;
    }
    expect(taken).toBeLessThanOrEqual(5);
  });

  it("needs three cells that agree", () => {
    expect(flowOfDrifters(clip(2, {}, 3, 1))).toBeNull();
    expect(flowOfDrifters([])).toBeNull();
  });
});

describe("flow from swimmers that turn", () => {
  const noise = { variance: sigma ** 2, coefficient: D };

  it.each([
    { how: "steadily", walker: { speed: 40, turning_rad_s: 2.5 } },
    { how: "at random", walker: { speed: 40, rotation_rad2_s: 1 } },
    { how: "steadily, seen through much noise", walker: { speed: 20, turning_rad_s: 2.5, sigma: 0.4 } },
  ])("$how is unbiased and near its interval", ({ walker }) => {
    const of = { variance: (("sigma" in walker ? walker.sigma : sigma) as number) ** 2, coefficient: D };
    const found = Array.from({ length: 150 }, (_, k) => flowOfTurners(clip(20, walker, 3, 400 + k), of));
    const known = found.filter((f) => f !== null);
    expect(known.length).toBeGreaterThanOrEqual(140);
    unbiased(known);
    // 300 components: a binomial standard error of 1.3 %. The jackknife of twenty cells is known to err by a little more.
    expect(coverage(known)).toBeGreaterThan(0.9);
    for (const f of known) expect(f.finding.from).toBe("turning swimmers");
  });

  it("can't be told from fewer than six, or from such as don't turn", () => {
    expect(flowOfTurners(clip(5, { speed: 40, turning_rad_s: 2 }, 3, 2), noise)).toBeNull();
    const straight = flowOfTurners(clip(20, { speed: 40, sigma: 0.02, diffusion: 0.001 }, 3, 3), {
      variance: 0.0004,
      coefficient: 0.001,
    });
    // Nothing, or an interval so wide that it says so.
    if (straight) expect(Math.max(straight.seX, straight.seY)).toBeGreaterThan(2);
  });

  it("agrees or not within four errors of the difference", () => {
    const at = (vx: number): Flow => ({ vx, vy: 0, seX: 0.3, seY: 0.3, finding: {} as Flow["finding"] });
    const error = Math.sqrt(2) * 0.3;
    expect(agree(at(0), at(3.9 * error))).toBe(true);
    expect(agree(at(0), at(4.1 * error))).toBe(false);
  });
});

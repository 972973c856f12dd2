import { describe, expect, it } from "vitest";
import { normalFrom } from "../../../tests/helpers/normal.ts";
import { evenTimes, pathsOf, type Walker, walk } from "../../../tests/helpers/simulated-tracks.ts";
import { seededRandom } from "../../quantities/index.ts";
import { analyseMotion, defaultMotionSettings } from "./index.ts";

// A body of 1 µm radius in water at 25 °C diffuses by about 0.245 µm²/s (Stokes–Einstein); lengths in µm throughout.
const D = 0.245;
const sigma = 0.1;
const fps = 30;

/** Which of a simulated clip's cells are called motile. */
function judgeClip(walkers: readonly Walker[], seconds: readonly number[], seed: number): (boolean | null)[] {
  const random = seededRandom(seed);
  const normal = normalFrom(random);
  const tracks = walkers.map((walker, i) =>
    walk(
      { ...walker, heading_rad: 2 * Math.PI * random() },
      evenTimes(seconds[i % seconds.length] as number, fps),
      normal,
    ),
  );
  return analyseMotion(pathsOf(tracks), 1 / fps, null, defaultMotionSettings).cells.map((c) => c.motile);
}

const dead: Walker = { speed: 0, diffusion: D, sigma };

describe("motile or diffusing", () => {
  it.each([
    { cells: 25, seconds: [2], flow: [0, 0] as const },
    { cells: 24, seconds: [0.6, 1, 2], flow: [0, 0] as const },
    { cells: 24, seconds: [0.6, 1, 4], flow: [6, -4] as const },
    { cells: 4, seconds: [1, 2], flow: [0, 0] as const },
  ])(
    "calls hardly a diffusing cell motile: $cells cells for $seconds s in a flow of $flow",
    ({ cells, seconds, flow }) => {
      const clips = 300;
      let clipsWrong = 0;
      for (let k = 0; k < clips; k++) {
        const motile = judgeClip(Array(cells).fill({ ...dead, flow }), seconds, 1000 + k);
        if (motile.includes(true)) clipsWrong++;
      }
      // Stated: 1 % of clips, so 3 of 300. Above 8 lies less than 0.4 % of the binomial distribution.
      expect(clipsWrong).toBeLessThanOrEqual(8);
    },
  );

  it.each([
    // A displacement over T is told from diffusion when its square over 2 (2 D T + 2 σ²) passes the point of Fisher's F
    // that α = 0.01 leaves after 30 cells and 7 or 26 stretches. In 1 s that is at 3.9 µm, 1.5 standard deviations short of
    // 5 µm: 94 % were found if diffusion and flow were known. That they are measured costs some. In 2 s it lies more than
    // 4 short. By hand.
    [1, 0.75],
    [2, 0.99],
  ])("finds swimmers of 5 µm/s in %d s", (seconds, power) => {
    let found = 0;
    let all = 0;
    let wrong = 0;
    for (let k = 0; k < 40; k++) {
      const swimmers = Array<Walker>(10).fill({ ...dead, speed: 5 });
      const motile = judgeClip([...swimmers, ...Array<Walker>(20).fill(dead)], [seconds], 5000 + k);
      found += motile.slice(0, 10).filter((m) => m === true).length;
      wrong += motile.slice(10).filter((m) => m === true).length;
      all += 10;
    }
    expect(found / all).toBeGreaterThanOrEqual(power);
    expect(wrong).toBeLessThanOrEqual(3);
  });

  it("says nothing of cells followed for less than half a second that don't swim fast", () => {
    const motile = judgeClip([...Array<Walker>(10).fill(dead)], [0.4, 2], 9000);
    expect(motile.filter((_, i) => i % 2 === 0)).toEqual(Array(5).fill(null));
    expect(motile.filter((_, i) => i % 2 === 1)).toEqual(Array(5).fill(false));
  });

  it("isn't moved by where the flow goes", () => {
    const walkers = (flow: readonly [number, number]) => [
      ...Array<Walker>(10).fill({ ...dead, speed: 30, rotation_rad2_s: 0.2, flow }),
      ...Array<Walker>(12).fill({ ...dead, flow }),
    ];
    const expected = [...Array(10).fill(true), ...Array(12).fill(false)];
    for (const flow of [
      [0, 0],
      [9, 0],
      [0, -25],
    ] as const) {
      expect(judgeClip(walkers(flow), [3], 77)).toEqual(expected);
    }
  });
});

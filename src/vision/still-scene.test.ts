import { describe, expect, it } from "vitest";
import { normalFrom } from "../../tests/helpers/normal.ts";
import { seededRandom } from "../quantities/index.ts";
import { exposurePoints, fitExposure } from "./exposure.ts";
import { findLitCircle, viewMask } from "./lit-view.ts";
import { findTexture, measureShift } from "./steady.ts";

const [width, height] = [320, 240];

type Level = (x: number, y: number) => number;

function picture(level: Level): Float32Array {
  return Float32Array.from({ length: width * height }, (_, i) => level(i % width, Math.floor(i / width)));
}

/** What a camera makes of the levels: noise of one grey level, whole numbers. */
function photograph(level: Level, normal: () => number, noise = 1): Uint8Array {
  return Uint8Array.from(picture(level), (v) => Math.max(0, Math.min(255, Math.round(v + noise * normal()))));
}

/** Light that falls off towards the corners, with soft specks. */
function specks(seed: number): Level {
  const random = seededRandom(seed);
  const list = Array.from({ length: 30 }, () => [
    width * random(),
    height * random(),
    2 + 2 * random(),
    20 + 40 * random(),
  ]);
  return (x, y) => {
    const fall = 1 - 0.3 * (((x - 160) / 200) ** 2 + ((y - 120) / 200) ** 2);
    return list.reduce(
      (v, [cx, cy, s, depth]) =>
        v -
        (depth as number) *
          Math.exp(-((x - (cx as number)) ** 2 + (y - (cy as number)) ** 2) / (2 * (s as number) ** 2)),
      170 * fall,
    );
  };
}

describe("eyepiece circle", () => {
  const random = seededRandom(71);

  it.each([
    [160, 120, 110],
    [150.4, 126.7, 95],
    [170, 118, 140],
    [60, 120, 90],
  ])("round (%d, %d) with a radius of %d px is found within a pixel", (cx, cy, radius) => {
    const soft: Level = (x, y) => 6 + 150 / (1 + Math.exp((Math.hypot(x - cx, y - cy) - radius) / 1.5)) + 2 * random();
    const circle = findLitCircle(picture(soft), width, height);
    expect(circle).not.toBeNull();
    expect(Math.hypot((circle?.x as number) - cx, (circle?.y as number) - cy)).toBeLessThan(1);
    expect(Math.abs((circle?.radius as number) - radius)).toBeLessThan(1);
  });

  it("isn't seen in a picture lit all over, dark all over, or dark on one side", () => {
    expect(findLitCircle(picture(specks(1)), width, height)).toBeNull();
    expect(
      findLitCircle(
        picture(() => 12),
        width,
        height,
      ),
    ).toBeNull();
    expect(
      findLitCircle(
        picture((x) => (x < 160 ? 5 : 150)),
        width,
        height,
      ),
    ).toBeNull();
  });

  it("masks what lies outside", () => {
    const mask = viewMask(width, height, { x: 160, y: 120, radius: 100 }, 10);
    const lit = mask.reduce((sum, v) => sum + v, 0);
    // Pixels inside a circle number its area but for the rim: (Gauss) within 2√2 π r.
    expect(Math.abs(lit - Math.PI * 90 ** 2)).toBeLessThan(2 * Math.SQRT2 * Math.PI * 90);
    expect(viewMask(width, height, null, 10).every((v) => v === 1)).toBe(true);
  });
});

describe("camera shake", () => {
  const scene = specks(2);
  const lit = viewMask(width, height, null, 0);
  const texture = findTexture(picture(scene), width, height, lit, 1);

  it.each([
    [0, 0],
    [0.37, -0.62],
    [-3.4, 2.25],
    [14.6, -9.3],
    [-31.2, 24.8],
  ])("of (%d, %d) px is measured within 0.05 px, from no idea of it", (dx, dy) => {
    const normal = normalFrom(seededRandom(72));
    const moved = photograph((x, y) => 0.93 * scene(x - dx, y - dy) + 4, normal);
    const found = measureShift(texture, moved, { x: 0, y: 0 }, 0.93, 4);
    expect(Math.abs(found.x - dx)).toBeLessThan(0.05);
    expect(Math.abs(found.y - dy)).toBeLessThan(0.05);
    expect(found.agreement).toBeGreaterThan(0.5);
    expect(texture.sd_px).toBeLessThan(0.05);
  });

  it("isn't misled by cells that swim across", () => {
    const normal = normalFrom(seededRandom(73));
    const random = seededRandom(74);
    const cells = Array.from({ length: 40 }, () => [width * random(), height * random()] as const);
    const withCells: Level = (x, y) =>
      cells.reduce((v, [cx, cy]) => v - 50 * Math.exp(-((x - cx) ** 2 + (y - cy) ** 2) / 6), scene(x - 1.3, y + 0.8));
    const found = measureShift(texture, photograph(withCells, normal), { x: 0, y: 0 }, 1, 0);
    expect(Math.abs(found.x - 1.3)).toBeLessThan(0.05);
    expect(Math.abs(found.y + 0.8)).toBeLessThan(0.05);
  });

  it("can't be told where nothing has an edge", () => {
    expect(
      findTexture(
        picture(() => 150),
        width,
        height,
        lit,
        1,
      ).sd_px,
    ).toBe(Number.POSITIVE_INFINITY);
  });
});

describe("exposure", () => {
  const scene: Level = (x, y) => 60 + 0.4 * x + 15 * Math.sin(y / 20);
  const lit = viewMask(width, height, null, 0);
  const points = exposurePoints(picture(scene), lit);

  it.each([
    [1, 0],
    [0.9, 6],
    [1.12, -9],
    [0.55, 0],
  ])("of gain %d and offset %d is found within half a percent", (gain, offset) => {
    const normal = normalFrom(seededRandom(75));
    const random = seededRandom(76);
    // A tenth of the view is covered by what wasn't there before.
    const frame = photograph((x, y) => (random() < 0.1 ? 20 : gain * scene(x, y) + offset), normal);
    // 2000 points of noise 1 over levels that spread by 37 give the slope to 0.0006: 0.11 % at the least gain.
    for (const start of [null, { gain: 1, offset: 0 }]) {
      const found = fitExposure(points, frame, 0, start);
      expect(Math.abs(found.gain / gain - 1)).toBeLessThan(0.005);
      // Half a percent of the usual level.
      expect(Math.abs(found.offset - offset)).toBeLessThan(0.005 * 124);
    }
  });

  it("on an even field is a gain alone", () => {
    const even = exposurePoints(
      picture(() => 150),
      lit,
    );
    const frame = photograph(() => 150 * 0.8, normalFrom(seededRandom(77)));
    const found = fitExposure(even, frame, 0);
    expect(Math.abs(found.gain / 0.8 - 1)).toBeLessThan(0.005);
    expect(found.offset).toBe(0);
  });

  it("of nothing is none", () => {
    const nothing = exposurePoints(
      picture(() => 150),
      new Uint8Array(width * height),
    );
    expect(
      fitExposure(
        nothing,
        photograph(
          () => 90,
          () => 0,
        ),
        0,
      ),
    ).toEqual({ gain: 1, offset: 0 });
  });
});

import { describe, expect, it } from "vitest";
import { exampleTrial, withoutScale } from "../../../tests/helpers/example-trial.ts";
import { seededRandom } from "../../quantities/index.ts";
import { fittingSwarm, swarm } from "./beeswarm.ts";
import { durationChart, pathsChart, speedChart } from "./index.ts";
import { roundLength } from "./paths-chart.ts";

const count = (text: string, part: string) => text.split(part).length - 1;

describe("swarm", () => {
  const random = seededRandom(3);
  const along = Array.from({ length: 300 }, () => 400 * random() ** 2);

  it("keeps every dot's place, and no two overlap", () => {
    const dots = swarm(along, 3)!;
    for (const dot of dots) expect(dot.along).toBe(along[dot.index]);
    for (const [i, a] of dots.entries()) {
      for (const b of dots.slice(i + 1)) {
        expect(Math.hypot(a.along - b.along, a.aside - b.aside)).toBeGreaterThan(6 - 1e-6);
      }
    }
  });

  it("takes the largest dots that fit, and the smallest pressed to the edge when none do", () => {
    const fit = fittingSwarm(along, [5, 4, 3, 2, 1], 40);
    expect(fit.dots.every((dot) => Math.abs(dot.aside) + fit.radius <= 40)).toBe(true);
    expect(swarm(along, fit.radius + 1, 40)).toBeNull();
    const crowded = fittingSwarm(Array(500).fill(7), [3, 1], 20);
    expect(crowded.radius).toBe(1);
    expect(crowded.dots).toHaveLength(500);
    expect(Math.max(...crowded.dots.map((dot) => Math.abs(dot.aside)))).toBe(19);
  });
});

describe("charts", () => {
  it("draws every cell, the mean and its interval", () => {
    const chart = speedChart({ speeds: [10, 20, 30], mean: 20, ci95: [12, 28], unit: "µm/s" }).text;
    expect(count(chart, 'class="lw-dot"')).toBe(3);
    expect(chart).toContain("mean 20.0 µm/s");
    expect(chart).toContain("lw-interval");
  });

  it("draws axes alone when there is nothing on them", () => {
    expect(speedChart({ speeds: [], mean: null, ci95: null, unit: "px/s" }).text).not.toContain("NaN");
    const empty = durationChart({ points: [], mean: null, ci95: null, unit: "px/s" }).text;
    expect(empty).not.toContain("NaN");
    expect(empty).toContain("speed (px/s)");
  });

  it("refuses a speed that is no number", () => {
    expect(() => speedChart({ speeds: [1, Number.NaN], mean: null, ci95: null, unit: "px/s" })).toThrow(
      "a chart was given",
    );
  });

  it("draws motile and other paths apart, thins long tables, and has a scale bar only with a scale", () => {
    const whole = pathsChart(exampleTrial());
    expect([whole.shown, whole.of]).toEqual([96, 96]);
    const { paths: drawn } = exampleTrial();
    const seen = Array.from({ length: drawn.count }, (_, p) => p).filter((p) => drawn.start[p] !== drawn.start[p + 1]);
    expect(count(whole.chart.text, "lw-path lw-casing")).toBe(seen.length);
    expect(count(whole.chart.text, "lw-path lw-still")).toBe(
      exampleTrial().cells.filter((cell) => cell.motile === false).length,
    );
    expect(whole.chart.text).toContain("100 µm</text>");
    expect(pathsChart(withoutScale()).chart.text).not.toContain("µm");

    const { paths } = exampleTrial();
    const many = { ...paths, count: 960, start: Uint32Array.from({ length: 961 }, (_, i) => i * 2) };
    const thinned = pathsChart(exampleTrial({ paths: many, cells: [] }));
    expect([thinned.shown, thinned.of]).toEqual([300, 960]);
  });

  it.each([
    [0.49, 0.2],
    [0.5, 0.5],
    [1, 1],
    [73, 50],
    [499, 200],
    [2.5e-3, 2e-3],
  ])("rounds a bar of %f down to %f", (length, round) => {
    expect(roundLength(length)).toBe(round);
  });
});

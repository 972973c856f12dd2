import { describe, expect, it } from "vitest";
import { emptyScene, exampleTrial, nothingSwims, withoutScale } from "../../../tests/helpers/example-trial.ts";
import type { MeasuredTrial } from "../../quantities/index.ts";
import { type Finding, findingsOf, towards } from "./findings.ts";

const sentence = (it: Finding) => `${it.before}${it.figure}${it.after}, ${it.behind}`;
const finding = (measured: MeasuredTrial, name: Finding["name"]) =>
  findingsOf(measured).find((it) => it.name === name)!;
const measured = exampleTrial({
  speed: {
    ...exampleTrial().speed!,
    mean_um_s: { value: 38.214, standardError: 1.15, ci95: [35.9, 40.5], n: 46 },
    n_cells: 46,
    n_judged: 85,
    motile_fraction: 0.71,
    ci95_motile_fraction: [0.61, 0.79],
  },
});

describe("findingsOf", () => {
  it("says a figure with its interval and n in plain words", () => {
    expect(sentence(finding(measured, "speed"))).toBe(
      "Cells swim at 38.2 µm/s (95 % between 35.9 and 40.5), 46 motile cells",
    );
    expect(sentence(finding(measured, "share"))).toBe(
      "71\u00a0% of cells swim (95 % between 61 and 79\u00a0%), 85 cells that could be judged",
    );
  });

  it("rests each on the cells behind it", () => {
    const { cells } = measured;
    expect(finding(measured, "speed").evidence.every((p) => cells[p]!.kept)).toBe(true);
    expect(finding(measured, "speed").evidence).toHaveLength(cells.filter((cell) => cell.kept).length);
    expect(finding(measured, "flow").evidence.every((p) => cells[p]!.motile === false)).toBe(true);
    expect(finding(measured, "share").evidence).toHaveLength(cells.filter((cell) => cell.motile !== null).length);
  });

  it("speaks of pixels without a scale", () => {
    expect(finding(withoutScale(), "speed").figure).toMatch(/ px\/s$/);
    expect(finding(withoutScale(), "flow").figure).toMatch(/ px\/s$/);
  });

  it("says where the fluid flows", () => {
    expect(sentence(finding(measured, "flow"))).toMatch(
      /^The fluid flows at 1\.68 µm\/s down to the right: rightwards 1\.53/,
    );
  });

  it("doesn't name a direction when the flow can't be told from none", () => {
    const drift = {
      ...measured.drift!,
      velocity_px_s: [0.1, -0.2] as const,
      ci95_px_s: [[-0.5, 0.7] as const, [-0.9, 0.5] as const] as const,
    };
    expect(sentence(finding({ ...measured, drift }, "flow"))).toMatch(
      /^No flow is seen: rightwards 0\.05 µm\/s \(95 % between −0\.25 and 0\.35\), upwards/,
    );
  });

  it("says plainly that nothing swims", () => {
    const still = nothingSwims();
    expect(sentence(finding(still, "speed"))).toMatch(/^No cell swims: none moves more/);
    expect(findingsOf(still).map((it) => it.name)).toEqual(["speed", "share", "flow"]);
  });

  it("says why there is no mean speed", () => {
    const speed = {
      ...measured.speed!,
      mean_um_s: null,
      mean_px_s: null,
      n_cells: 0,
      median_px_s: null,
      sd_px_s: null,
    };
    expect(sentence(finding({ ...measured, speed }, "speed"))).toMatch(
      /^The mean speed can’t be had: no motile cell was/,
    );
    const none = { ...speed, n_judged: 0, motile_fraction: null };
    expect(finding({ ...measured, speed: none }, "speed").figure).toBe("No cell could be judged");
  });

  it("has no interval with one cell", () => {
    const mean_um_s = { value: 38.2, standardError: 0, ci95: [38.2, 38.2] as const, n: 1 };
    const one = { ...measured, speed: { ...measured.speed!, mean_um_s, n_cells: 1 } };
    expect(sentence(finding(one, "speed"))).toBe(
      "Cells swim at 38.2 µm/s; an interval needs more cells, 1 motile cell",
    );
  });

  it("finds nothing in an empty scene", () => {
    expect(findingsOf(emptyScene())).toEqual([]);
  });
});

describe("towards", () => {
  it("is the nearest of eight directions, counter-clockwise from the right", () => {
    expect([0, 22, 23, 90, 180, -180, -90, -44].map(towards)).toEqual([
      "to the right",
      "to the right",
      "up to the right",
      "upwards",
      "to the left",
      "to the left",
      "downwards",
      "down to the right",
    ]);
  });
});

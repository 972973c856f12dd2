import { describe, expect, it } from "vitest";
import { seededRandom } from "../quantities/index.ts";
import { assign, type Pairing } from "./assignment.ts";

const pairingsOf = (cost: readonly (readonly number[])[]): Pairing[] =>
  cost.flatMap((line, row) => line.flatMap((c, column) => (Number.isFinite(c) ? [{ row, column, cost: c }] : [])));
const total = (chosen: readonly Pairing[]) => chosen.reduce((sum, p) => sum + p.cost, 0);
const X = Number.POSITIVE_INFINITY;

describe("assignment at least total cost", () => {
  it.each([
    // The worked example of the SciPy documentation of linear_sum_assignment.
    [
      5,
      [1, 0, 2],
      [
        [4, 1, 3],
        [2, 0, 5],
        [3, 2, 2],
      ],
    ],
    // The next four: SciPy's own test file of linear_sum_assignment (scipy/optimize/tests).
    [
      850,
      [1, 0, 2],
      [
        [400, 150, 400],
        [400, 450, 600],
        [300, 225, 300],
      ],
    ],
    [
      452,
      null,
      [
        [400, 150, 400, 1],
        [400, 450, 600, 2],
        [300, 225, 300, 3],
      ],
    ],
    [
      18,
      [0, 2, 1],
      [
        [10, 10, 8],
        [9, 8, 1],
        [9, 7, 4],
      ],
    ],
    [
      15,
      null,
      [
        [10, 10, 8, 11],
        [9, 8, 1, 1],
        [9, 7, 4, 10],
      ],
    ],
    [
      18,
      [0, 2, 1],
      [
        [10, X, X],
        [X, X, 1],
        [X, 7, X],
      ],
    ],
    // A textbook example of the Hungarian method, from memory; the optimum confirmed by trying every permutation.
    [
      140,
      [2, 1, 0, 3],
      [
        [82, 83, 69, 92],
        [77, 37, 49, 92],
        [11, 69, 5, 86],
        [8, 9, 98, 23],
      ],
    ],
  ])("finds the known optimum %d", (best, columns, cost) => {
    const chosen = assign(pairingsOf(cost), 1e6);
    expect(total(chosen)).toBe(best);
    // Where optima tie only the total is known.
    if (columns) expect(chosen.map((p) => p.column)).toEqual(columns);
  });

  it("leaves rows alone where pairing would cost more, and columns alone for nothing", () => {
    expect(
      assign(
        pairingsOf([
          [1, 9, 25],
          [16, 2, 30],
        ]),
        5,
      ),
    ).toEqual([
      { row: 0, column: 0, cost: 1 },
      { row: 1, column: 1, cost: 2 },
    ]);
    expect(assign(pairingsOf([[7]]), 5)).toEqual([]);
    expect(assign([], 5)).toEqual([]);
  });

  it("is never beaten by any other pairing of small random problems", () => {
    const random = seededRandom(7);
    for (let trial = 0; trial < 200; trial++) {
      const n = 2 + Math.floor(random() * 3);
      const m = 2 + Math.floor(random() * 3);
      const cost = Array.from({ length: n }, () =>
        Array.from({ length: m }, () => (random() < 0.2 ? X : random() * 12 - 6)),
      );
      const alone = 3;
      const chosen = assign(pairingsOf(cost), alone);
      const value = total(chosen) + alone * (n - chosen.length);
      expect(value).toBeCloseTo(leastByTryingAll(cost, alone), 9);
    }
  });
});

function leastByTryingAll(
  cost: readonly (readonly number[])[],
  alone: number,
  row = 0,
  used = new Set<number>(),
): number {
  const line = cost[row];
  if (!line) return 0;
  let least = alone + leastByTryingAll(cost, alone, row + 1, used);
  line.forEach((c, column) => {
    if (!Number.isFinite(c) || used.has(column)) return;
    used.add(column);
    least = Math.min(least, c + leastByTryingAll(cost, alone, row + 1, used));
    used.delete(column);
  });
  return least;
}

import type { Cell } from "../quantities/index.ts";

/** How many cells there are of each kind. `setAside` counts those not kept by their reason, most frequent first. */
export interface CellCounts {
  readonly paths: number;
  readonly motile: number;
  readonly notMotile: number;
  readonly undecided: number;
  readonly kept: number;
  readonly setAside: readonly { readonly reason: string; readonly count: number }[];
}

/** Counts cells by motility and by why they are not kept. */
export function countCells(cells: readonly Cell[]): CellCounts {
  const reasons = new Map<string, number>();
  for (const cell of cells) {
    if (!cell.kept) reasons.set(cell.reason, (reasons.get(cell.reason) ?? 0) + 1);
  }
  const count = (motile: boolean | null) => cells.filter((cell) => cell.motile === motile).length;
  return {
    paths: cells.length,
    motile: count(true),
    notMotile: count(false),
    undecided: count(null),
    kept: cells.filter((cell) => cell.kept).length,
    setAside: [...reasons]
      .map(([reason, n]) => ({ reason, count: n }))
      .sort((a, b) => b.count - a.count || (a.reason < b.reason ? -1 : 1)),
  };
}

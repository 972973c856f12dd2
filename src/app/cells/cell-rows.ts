import type { Cell } from "../../quantities/index.ts";
import type { CellColumn, Viewing } from "../state/viewing.ts";

/** Time from a cell's first sighting to its last, seconds. */
export const followed_s = (cell: Cell): number => cell.last_t_s - cell.first_t_s;

const keys: Readonly<Record<CellColumn, (cell: Cell) => number | null>> = {
  cell: (cell) => cell.cell,
  from: (cell) => cell.first_t_s,
  followed: followed_s,
  speed: (cell) => cell.speed_px_s,
  straightness: (cell) => cell.straightness,
  motile: (cell) => (cell.motile === null ? null : Number(cell.motile)),
  counted: (cell) => Number(cell.kept),
};

/**
 * Indices of the cells to be listed, in order. What isn't known comes last in either direction; equals stay in order of
 * their numbers.
 * @param only indices to list; null for all
 */
export function cellRows(cells: readonly Cell[], sort: Viewing["sort"], only: readonly number[] | null): number[] {
  const key = keys[sort.by];
  const sign = sort.falling ? -1 : 1;
  return [...(only ?? cells.keys())].sort((a, b) => {
    const [ka, kb] = [key(cells[a]!), key(cells[b]!)];
    if (ka === null || kb === null) return Number(ka === null) - Number(kb === null) || a - b;
    return sign * (ka - kb) || a - b;
  });
}

import { linearSumAssignment } from "linear-sum-assignment";

/** A possible pairing of row and column, and what it costs. Pairs not listed are forbidden. */
export interface Pairing {
  readonly row: number;
  readonly column: number;
  readonly cost: number;
}

/**
 * Pairs rows with columns at least total cost, where leaving a row alone costs `alone` and leaving a column alone costs
 * nothing. Each row and column is paired at most once; pairings that cost `alone` or more are never made.
 *
 * Solved exactly: pairings that have no row or column in common fall into groups, and each group is a linear assignment
 * problem (Jonker and Volgenant 1987, Computing 38, 325; Crouse 2016, IEEE Trans. Aerosp. Electron. Syst. 52, 1679).
 *
 * @returns the chosen pairings, by row
 */
export function assign(pairings: readonly Pairing[], alone: number): Pairing[] {
  const worth = pairings.filter((p) => p.cost < alone);
  const chosen: Pairing[] = [];
  for (const group of groupsOf(worth)) chosen.push(...solve(group, alone));
  return chosen.sort((a, b) => a.row - b.row);
}

/** Splits pairings into groups that share no row and no column (union of rows through columns). */
function groupsOf(pairings: readonly Pairing[]): Pairing[][] {
  const parent = new Map<number, number>();
  const find = (a: number): number => {
    let root = a;
    while (parent.get(root) !== root) root = parent.get(root) as number;
    for (let next = a; next !== root; ) {
      const after = parent.get(next) as number;
      parent.set(next, root);
      next = after;
    }
    return root;
  };
  // Columns are told from rows by sign: row r is r, column c is -1 - c.
  for (const { row, column } of pairings) {
    for (const node of [row, -1 - column]) if (!parent.has(node)) parent.set(node, node);
    parent.set(find(row), find(-1 - column));
  }
  const groups = new Map<number, Pairing[]>();
  for (const pairing of pairings) {
    const root = find(pairing.row);
    const group = groups.get(root);
    if (group) group.push(pairing);
    else groups.set(root, [pairing]);
  }
  return [...groups.values()];
}

function solve(group: readonly Pairing[], alone: number): Pairing[] {
  const rows = [...new Set(group.map((p) => p.row))];
  const columns = [...new Set(group.map((p) => p.column))];
  if (rows.length === 1 || columns.length === 1) {
    return [group.reduce((best, p) => (p.cost < best.cost ? p : best))];
  }
  // A column of its own for every row to be left alone in; what is forbidden costs more than leaving everything alone.
  let least = 0;
  for (const p of group) least = Math.min(least, p.cost);
  const forbidden = (Math.abs(alone) + Math.abs(least) + 1) * (rows.length + 1);
  const cost = rows.map((_, r) => {
    const line = new Float64Array(columns.length + rows.length).fill(forbidden);
    line[columns.length + r] = alone;
    return line;
  });
  const byPlace = new Map<number, Pairing>();
  for (const p of group) {
    const r = rows.indexOf(p.row);
    const c = columns.indexOf(p.column);
    (cost[r] as Float64Array)[c] = p.cost;
    byPlace.set(r * columns.length + c, p);
  }
  const { rowAssignments } = linearSumAssignment(cost, { maximaze: false });
  return rows.flatMap((_, r) => {
    const c = rowAssignments[r] as number;
    const pairing = c < columns.length ? byPlace.get(r * columns.length + c) : undefined;
    return pairing ? [pairing] : [];
  });
}

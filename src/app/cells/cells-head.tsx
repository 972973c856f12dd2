import type { Dispatch } from "react";
import { Icon } from "../chrome/icon.tsx";
import type { CellColumn, Viewing, ViewingAction } from "../state/viewing.ts";

interface CellsHeadProps {
  readonly sort: Viewing["sort"];
  readonly unit: string;
  readonly dispatch: Dispatch<ViewingAction>;
}

/** Column heads; each sorts, and turns the order around when it sorts already. */
export function CellsHead({ sort, unit, dispatch }: CellsHeadProps) {
  const columns: readonly [by: CellColumn, title: string, unit: string][] = [
    ["cell", "Cell", ""],
    ["from", "From", "s"],
    ["followed", "For", "s"],
    ["speed", "Speed", unit],
    ["straightness", "Straight", ""],
    ["motile", "Swims", ""],
    ["counted", "Counted", ""],
  ];
  return (
    <thead>
      <tr>
        {columns.map(([by, title, unit]) => (
          <th key={by} scope="col" aria-sort={sort.by === by ? (sort.falling ? "descending" : "ascending") : undefined}>
            <button type="button" onClick={() => dispatch({ type: "sorted", by })}>
              {title}
              {unit && <small>{unit}</small>}
              {sort.by === by && <Icon name={sort.falling ? "falling" : "rising"} />}
            </button>
          </th>
        ))}
      </tr>
    </thead>
  );
}

import { type Dispatch, type KeyboardEvent, memo, useEffect, useMemo, useRef, useState } from "react";
import type { MeasuredTrial } from "../../quantities/index.ts";
import { speedUnit } from "../findings/findings.ts";
import type { Viewing, ViewingAction } from "../state/viewing.ts";
import { cellRows } from "./cell-rows.ts";
import { CellsHead } from "./cells-head.tsx";
import { CellsRow, rowId } from "./cells-row.tsx";
import "./cells-table.css";

interface CellsTableProps {
  readonly measured: MeasuredTrial;
  readonly sort: Viewing["sort"];
  readonly cell: number | null;
  /** Only these paths are listed; null for all. */
  readonly only: readonly number[] | null;
  readonly dispatch: Dispatch<ViewingAction>;
}

const rowHeight = 26;
/** Rows kept above and below those in sight. */
const spare = 12;

/** Every cell as a row. Choosing one lights up its path and goes to its first frame. */
export const CellsTable = memo(function CellsTable({ measured, sort, cell, only, dispatch }: CellsTableProps) {
  const { cells, paths } = measured;
  const rows = useMemo(() => cellRows(cells, sort, only), [cells, sort, only]);
  const scroller = useRef<HTMLDivElement>(null);
  const [top, setTop] = useState(0);
  const [height, setHeight] = useState(400);
  const first = Math.max(0, Math.floor(top / rowHeight) - spare);
  const end = Math.min(rows.length, Math.ceil((top + height) / rowHeight) + spare);
  const chosenAt = cell === null ? -1 : rows.indexOf(cell);

  useEffect(() => {
    const box = scroller.current;
    if (!box) return;
    const observer = new ResizeObserver(() => setHeight(box.clientHeight));
    observer.observe(box);
    return () => observer.disconnect();
  }, []);
  useEffect(() => {
    const box = scroller.current;
    if (!box || chosenAt < 0) return;
    const at = chosenAt * rowHeight;
    const inSight = at >= box.scrollTop && at + 2 * rowHeight <= box.scrollTop + box.clientHeight;
    if (!inSight) box.scrollTop = at - box.clientHeight / 2;
  }, [chosenAt]);

  const choose = (p: number) => dispatch({ type: "cell chosen", cell: p, frame: paths.frame[paths.start[p]!] ?? 0 });
  const press = (event: KeyboardEvent) => {
    const by = { ArrowDown: 1, ArrowUp: -1 }[event.key];
    if (by === undefined) return;
    event.preventDefault();
    const next = rows[Math.max(0, Math.min(rows.length - 1, chosenAt + by))];
    if (next !== undefined) choose(next);
  };
  const { unit, factor } = speedUnit(measured);
  return (
    <section
      className="cells"
      aria-label="Cells"
      ref={scroller}
      onScroll={(event) => setTop(event.currentTarget.scrollTop)}
    >
      <table
        // biome-ignore lint/a11y/noNoninteractiveElementToInteractiveRole: rows of this table are chosen as in a grid
        role="grid"
        aria-label="Cells"
        aria-rowcount={rows.length + 1}
        aria-activedescendant={chosenAt < first || chosenAt >= end ? undefined : rowId(cell!)}
        tabIndex={0}
        onKeyDown={press}
      >
        <CellsHead sort={sort} unit={unit} dispatch={dispatch} />
        <tbody>
          {first > 0 && <Gap height={first * rowHeight} />}
          {rows.slice(first, end).map((p, i) => (
            <CellsRow
              key={p}
              cell={cells[p]!}
              factor={factor}
              position={first + i + 2}
              chosen={p === cell}
              choose={() => choose(p)}
            />
          ))}
          {end < rows.length && <Gap height={(rows.length - end) * rowHeight} />}
        </tbody>
      </table>
    </section>
  );
});

/** Stands for rows out of sight. */
function Gap({ height }: { height: number }) {
  return (
    <tr className="gap" style={{ height }}>
      <td colSpan={7} />
    </tr>
  );
}

import type { Cell } from "../../quantities/index.ts";
import { followed_s } from "./cell-rows.ts";

interface CellsRowProps {
  readonly cell: Cell;
  /** Length of a pixel in the unit of the speeds. */
  readonly factor: number;
  /** Which row of the whole table this is, from 1. */
  readonly position: number;
  readonly chosen: boolean;
  readonly choose: () => void;
}

/** Name of the row of path `p`, for assistive technology. */
export const rowId = (p: number): string => `cell-row-${p}`;

/** One cell: when it was followed, how fast it swims with its standard error, and why it doesn't count if so. */
export function CellsRow({ cell, factor, position, chosen, choose }: CellsRowProps) {
  const motile = cell.motile === null ? "?" : cell.motile ? "yes" : "no";
  return (
    // The table as a whole takes the arrow keys.
    <tr
      id={rowId(cell.cell - 1)}
      aria-rowindex={position}
      aria-selected={chosen}
      data-cell={cell.cell}
      onClick={choose}
    >
      <th scope="row">{cell.cell}</th>
      <td>{cell.first_t_s.toFixed(2)}</td>
      <td>{followed_s(cell).toFixed(2)}</td>
      <td className="speed">{speedText(cell, factor)}</td>
      <td>{cell.straightness === null ? "" : cell.straightness.toFixed(2)}</td>
      <td className={motile === "yes" ? "word" : "word quiet"}>{motile}</td>
      <td className={cell.kept ? "word" : "word quiet"} title={cell.reason}>
        {cell.kept ? "yes" : cell.reason}
      </td>
    </tr>
  );
}

/** Speed and its standard error to one decimal, so that the column can be read down. */
export function speedText({ speed_px_s, speedSe_px_s }: Cell, factor: number): string {
  if (speed_px_s === null) return "";
  const speed = (speed_px_s * factor).toFixed(1);
  return speedSe_px_s === null ? speed : `${speed} ± ${(speedSe_px_s * factor).toFixed(1)}`;
}

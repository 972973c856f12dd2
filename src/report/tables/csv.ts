import { csvFormatRow } from "d3";
import { strToU8 } from "fflate";
import type { MeasuredTrial } from "../../quantities/index.ts";
import { finite, fixed } from "../numbers.ts";
import type { Column, Table, Value } from "./table.ts";

/** Rows joined before they become bytes: keeps the text of a long table from existing twice. */
const rowsPerPiece = 4096;

/**
 * The table as CSV (RFC 4180, but for LF as line end): UTF-8, a header, `.` as decimal mark, empty cells for null.
 * @throws Error when a number is not finite.
 */
export function csvOf(table: Table, measured: MeasuredTrial): Uint8Array {
  const pieces: Uint8Array[] = [];
  let lines = [csvFormatRow(table.columns.map((column) => column.name))];
  const flush = () => {
    if (lines.length > 0) pieces.push(strToU8(`${lines.join("\n")}\n`));
    lines = [];
  };
  for (const row of table.rows(measured)) {
    if (row.length !== table.columns.length) throw new Error(`a row of ${table.name} has ${row.length} values`);
    lines.push(csvFormatRow(table.columns.map((column, i) => written(row[i]!, column))));
    if (lines.length >= rowsPerPiece) flush();
  }
  flush();
  return joined(pieces);
}

function written(value: Value, column: Column): string {
  if (value === null) return "";
  if (typeof value === "number") {
    if (column.type === "integer") return String(finite(value));
    return fixed(value, column.decimals ?? 4);
  }
  return typeof value === "boolean" ? String(value) : harmless(value);
}

/** Text that a spreadsheet would run as a formula, led by an apostrophe so that it is shown instead. */
export function harmless(text: string): string {
  return /^[=+\-@\t\r]/.test(text) ? `'${text}` : text;
}

function joined(pieces: readonly Uint8Array[]): Uint8Array {
  const whole = new Uint8Array(pieces.reduce((length, piece) => length + piece.length, 0));
  let at = 0;
  for (const piece of pieces) {
    whole.set(piece, at);
    at += piece.length;
  }
  return whole;
}

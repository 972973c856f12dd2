import type { MeasuredTrial } from "../../quantities/index.ts";

/** One value of a table. Null is an empty cell. */
export type Value = number | string | boolean | null;

/** One column of a result table: what it is called and means, and how its numbers are written. */
export interface Column {
  readonly name: string;
  readonly title: string;
  readonly description: string;
  readonly type: "integer" | "number" | "string" | "boolean";
  /** Unit of the numbers; empty when they have none. */
  readonly unit: string;
  /** Decimals of a `number` column, always all written. */
  readonly decimals?: number;
  /** Never empty. */
  readonly required?: boolean;
  /** The only texts a `string` column holds. */
  readonly values?: readonly string[];
}

/** One CSV file of a result. `rows` gives values in column order. */
export interface Table {
  readonly name: string;
  readonly title: string;
  readonly description: string;
  readonly columns: readonly Column[];
  readonly primaryKey: readonly string[];
  /** Columns that point at a row of another table. */
  readonly refersTo?: { readonly column: string; readonly table: string; readonly theirColumn: string };
  readonly rows: (measured: MeasuredTrial) => Iterable<readonly Value[]>;
}

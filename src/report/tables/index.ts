export { cellsTable } from "./cells-table.ts";
export { csvOf } from "./csv.ts";
export { frontTable } from "./front-table.ts";
export { pathsTable } from "./paths-table.ts";
export type { Column, Table } from "./table.ts";
export { turnsTable } from "./turns-table.ts";

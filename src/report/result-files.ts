import { strToU8 } from "fflate";
import type { MeasuredTrial } from "../quantities/index.ts";
import { checkDataPackage, checkSummary } from "./contract-check.ts";
import { dataPackageOf } from "./data-package.ts";
import { jsonBytes } from "./json.ts";
import { reportPage } from "./page/report-page.ts";
import { summaryOf } from "./summary.ts";
import { cellsTable, csvOf, frontTable, pathsTable, turnsTable } from "./tables/index.ts";

/** One file of a result folder. */
export interface ResultFile {
  readonly name: string;
  readonly bytes: Uint8Array;
}

const tables = [pathsTable, cellsTable, turnsTable, frontTable];

/**
 * Everything that goes into a result folder. The same measurement gives the same bytes.
 * @throws Error when the measurement holds NaN or infinity, or breaks the contract: a failure of the tool itself.
 */
export function resultFiles(measured: MeasuredTrial): readonly ResultFile[] {
  const written = tables.map((table) => ({ table, bytes: csvOf(table, measured) }));
  const summary = summaryOf(measured);
  checkSummary(summary);
  const description = dataPackageOf(measured, written);
  checkDataPackage(description);
  return [
    ...written.map(({ table, bytes }) => ({ name: `${table.name}.csv`, bytes })),
    { name: "summary.json", bytes: jsonBytes(summary) },
    { name: "report.html", bytes: strToU8(reportPage(measured)) },
    { name: "datapackage.json", bytes: jsonBytes(description) },
  ];
}

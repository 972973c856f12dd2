import type { MeasuredTrial } from "../../src/quantities/index.ts";
import type { ResultFile } from "../../src/report/index.ts";
import type { Failure } from "./failure.ts";
import type { Ready } from "./port.ts";

/** Make the result folder's files: one by one, or together in one zip. */
export interface ResultsOrder {
  readonly measured: MeasuredTrial;
  readonly as: "files" | "zip";
}

/** What a results worker says. */
export type ResultsNews =
  | Ready
  | { readonly type: "made"; readonly files: readonly ResultFile[] }
  | { readonly type: "failed"; readonly failure: Failure };

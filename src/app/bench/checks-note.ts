import type { QualityCheck } from "../../quantities/index.ts";

/** What the checks of the footage come to, when it is worth saying: `1 poor`, `2 fair`. */
export function checksNote(quality: readonly QualityCheck[]): string | undefined {
  for (const verdict of ["poor", "fair"] as const) {
    const count = quality.filter((check) => check.verdict === verdict).length;
    if (count > 0) return `${count} ${verdict}`;
  }
  return undefined;
}

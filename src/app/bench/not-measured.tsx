import type { Warning } from "../../quantities/index.ts";
import { WarningList } from "../findings/warning-list.tsx";

/** What stands in place of the findings before there are any. */
export function NotMeasured({ warnings }: { warnings: readonly Warning[] }) {
  return (
    <>
      <p>
        Not measured yet. Look through the footage, check scale and field, then measure. The recording stays on this
        machine.
      </p>
      <WarningList warnings={warnings} />
    </>
  );
}

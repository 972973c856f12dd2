import { type Dispatch, memo } from "react";
import type { MeasuredTrial } from "../../quantities/index.ts";
import type { ViewingAction } from "../state/viewing.ts";
import { Evidence } from "./evidence.tsx";
import type { Finding } from "./findings.ts";
import "./findings-panel.css";
import { WarningList } from "./warning-list.tsx";

interface FindingsPanelProps {
  readonly measured: MeasuredTrial;
  readonly findings: readonly Finding[];
  /** Name of the finding whose evidence is shown. */
  readonly chosen: string | null;
  readonly cell: number | null;
  readonly dispatch: Dispatch<ViewingAction>;
}

/** What was found, each figure a sentence with its interval and n; choosing one shows what it rests on. */
export const FindingsPanel = memo(function FindingsPanel(props: FindingsPanelProps) {
  const { measured, findings, chosen, dispatch } = props;
  return (
    <>
      {findings.length === 0 && (
        <p className="finding-sentence">
          <b>No cells were found</b> in this recording.
        </p>
      )}
      <ol className="findings">
        {findings.map((finding) => (
          <li key={finding.name}>
            <button
              type="button"
              className="finding"
              aria-expanded={finding.name === chosen}
              onClick={() => dispatch({ type: "evidence toggled", finding: finding.name })}
            >
              <span className="finding-sentence">
                {finding.before}
                <b>{finding.figure}</b>
                {finding.after}
              </span>
              <span className="behind">
                {finding.behind}
                <i>{finding.name === chosen ? "shown on the footage" : "show them"}</i>
              </span>
            </button>
            {finding.name === chosen && (
              <Evidence finding={finding} measured={measured} cell={props.cell} dispatch={dispatch} />
            )}
          </li>
        ))}
      </ol>
      <WarningList warnings={measured.warnings} />
      <p className="small-print">
        Speeds are in the image plane. Intervals hold for the cells of this one recording; to compare strains, compare
        independent cultures.
      </p>
    </>
  );
});

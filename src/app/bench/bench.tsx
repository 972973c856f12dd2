import { useEffect, useMemo, useReducer } from "react";
import type { TrialDescription } from "../../trial/index.ts";
import { CellsTable } from "../cells/cells-table.tsx";
import { Tabs } from "../chrome/tabs.tsx";
import { findingsOf } from "../findings/findings.ts";
import { FindingsPanel } from "../findings/findings-panel.tsx";
import { FootageStage } from "../footage/footage-stage.tsx";
import { sightingCounts } from "../footage/rows-at.ts";
import { Transport } from "../footage/transport.tsx";
import { useFilmKeys } from "../footage/use-film-keys.ts";
import { usePictures } from "../footage/use-pictures.ts";
import { usePlayback } from "../footage/use-playback.ts";
import { TimeRibbon } from "../ribbon/time-ribbon.tsx";
import { FieldPanel } from "../sides/field-panel.tsx";
import { FootagePanel } from "../sides/footage-panel.tsx";
import { ScalePanel } from "../sides/scale-panel.tsx";
import { TrialHead, type TrialHeadProps } from "../sides/trial-head.tsx";
import { firstLook, viewingReducer } from "../state/viewing.ts";
import "./bench.css";
import { CellsBar } from "./cells-bar.tsx";
import { checksNote } from "./checks-note.ts";
import { NotMeasured } from "./not-measured.tsx";

interface BenchProps extends TrialHeadProps {
  readonly describe: (description: TrialDescription) => void;
}

const noTimes = new Float64Array(0);

/** One trial on the bench: its footage with the ribbon of time below, and what was found beside it. */
export function Bench({ describe, ...head }: BenchProps) {
  const { description, recording, measured } = head.trial;
  const [view, dispatch] = useReducer(viewingReducer, firstLook);
  const pictures = usePictures(recording, description.captureFps, view.frame, measured?.frameTimes_s ?? null);
  const times_s = measured?.frameTimes_s ?? pictures.opened?.times_s ?? noTimes;
  const frames = times_s.length;
  useEffect(() => dispatch({ type: "counted", frames }), [frames]);
  usePlayback(view, times_s, dispatch);
  useFilmKeys(frames, dispatch);

  const findings = useMemo(() => (measured ? findingsOf(measured) : []), [measured]);
  const counts = useMemo(() => (measured ? sightingCounts(measured.sightings, frames) : null), [measured, frames]);
  const evidence = findings.find((finding) => finding.name === view.evidence)?.evidence ?? null;
  const lit = useMemo(() => (evidence ? new Set(evidence) : null), [evidence]);

  return (
    <div className="bench">
      <main className="stage-column" aria-label="Footage">
        <FootageStage pictures={pictures} measured={measured} view={view} lit={lit} dispatch={dispatch} />
        <Transport view={view} t_s={times_s[view.frame] ?? 0} hasFindings={measured !== null} dispatch={dispatch} />
        <TimeRibbon
          times_s={times_s}
          frame={view.frame}
          field={description.field}
          counts={counts}
          dispatch={dispatch}
        />
      </main>
      <aside className="side" aria-label="Trial">
        <TrialHead {...head} />
        <Tabs
          label="About the trial"
          tabs={[
            {
              name: "Findings",
              content: measured ? (
                <FindingsPanel
                  measured={measured}
                  findings={findings}
                  chosen={view.evidence}
                  cell={view.cell}
                  dispatch={dispatch}
                />
              ) : (
                <NotMeasured warnings={head.trial.warnings} />
              ),
              below: measured && measured.paths.count > 0 && (
                <section className="cells-section" aria-label="Cells">
                  <CellsBar
                    all={measured.paths.count}
                    shown={evidence?.length ?? null}
                    showAll={() => dispatch({ type: "evidence put away" })}
                  />
                  <CellsTable
                    measured={measured}
                    sort={view.sort}
                    cell={view.cell}
                    only={evidence}
                    dispatch={dispatch}
                  />
                </section>
              ),
            },
            {
              name: "Footage",
              note: measured ? checksNote(measured.quality) : undefined,
              content: measured ? <FootagePanel measured={measured} /> : <p>Measuring checks the footage too.</p>,
            },
            {
              name: "Scale",
              content: <ScalePanel description={description} measured={measured} describe={describe} />,
            },
            { name: "Field", content: <FieldPanel field={description.field} /> },
          ]}
        />
      </aside>
    </div>
  );
}

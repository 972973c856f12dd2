import { type OpenTrial, titleOf } from "../state/workbench-state.ts";

/** Tells screen readers what the measuring has come to: each stage once, and how it ended. */
export function Announcer({ trials }: { trials: readonly OpenTrial[] }) {
  return (
    <div className="hidden" aria-live="polite" role="status">
      {trials.map((trial) => {
        const said = saying(trial);
        return said && <p key={trial.id}>{said}</p>;
      })}
    </div>
  );
}

function saying(trial: OpenTrial): string {
  const { work, measured } = trial;
  if (work.state === "running") return `${titleOf(trial)}: ${work.progress.stage}.`;
  if (work.state === "idle" && measured) return `${titleOf(trial)}: measured, ${measured.paths.count} paths.`;
  return "";
}

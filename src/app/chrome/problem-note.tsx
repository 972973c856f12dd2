import type { Problem } from "../state/problem.ts";
import { Icon } from "./icon.tsx";
import "./problem-note.css";

/** A problem: what went wrong, where, and what to do about it. */
export function ProblemNote({ problem, dismiss }: { problem: Problem; dismiss?: () => void }) {
  return (
    <div className="problem" role="alert">
      <h3>{problem.title}</h3>
      {problem.what.split("\n").map((sentence) => (
        <p key={sentence}>{sentence}</p>
      ))}
      {problem.where && <p className="place">{problem.where}</p>}
      <p className="remedy">{problem.remedy}</p>
      {problem.detail && (
        <details>
          <summary>For the report</summary>
          <pre>{problem.detail}</pre>
        </details>
      )}
      {dismiss && (
        <button type="button" className="quiet square" aria-label={`Dismiss: ${problem.title}`} onClick={dismiss}>
          <Icon name="close" />
        </button>
      )}
    </div>
  );
}

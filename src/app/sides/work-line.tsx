import type { Work } from "../state/workbench-state.ts";
import { leftWords, progressWords } from "./progress-words.ts";

/** What is being done, how far it is, how long it takes yet, and a way to stop it. */
export function WorkLine({ work, stop }: { work: Work; stop: () => void }) {
  if (work.state === "idle") return null;
  const running = work.state === "running" ? work : null;
  const { done, total } = running?.progress ?? { done: 0, total: null };
  return (
    <div className="work-line">
      <div>
        <p>{running ? progressWords(running.progress) : "Waiting for its turn"}</p>
        <progress aria-label="Progress of this stage" {...(total ? { value: done, max: total } : {})} />
        <p className="left">{running ? leftWords(running.left_s) : ""}</p>
      </div>
      <button type="button" onClick={stop}>
        Stop
      </button>
    </div>
  );
}

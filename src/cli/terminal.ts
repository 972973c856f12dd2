import { InputError, type Progress, timeLeft } from "../quantities/index.ts";
import type { Io } from "./io.ts";

/** Progress is shown this often at most, seconds. */
const often_s = 0.1;

/** Writes for a person: progress in one line that is written over, if standard error is a terminal. */
export function personIo(stdout: NodeJS.WriteStream, stderr: NodeJS.WriteStream, now_s: () => number): Io {
  const left = timeLeft();
  let shown = "";
  let last_s = Number.NEGATIVE_INFINITY;
  const clear = () => {
    if (shown) stderr.write(`\r${" ".repeat(shown.length)}\r`);
    shown = "";
  };
  return {
    out(text) {
      clear();
      stdout.write(`${text}\n`);
    },
    note(text) {
      clear();
      stderr.write(`${text}\n`);
    },
    progress(progress) {
      if (!stderr.isTTY) return;
      const now = now_s();
      const seconds = left.after(progress, now);
      if (now - last_s < often_s) return;
      last_s = now;
      const line = lineOf(progress, seconds);
      stderr.write(`\r${line.padEnd(shown.length)}`);
      shown = line;
    },
  };
}

/** Writes for a machine: every progress report and note a JSON object on a line of standard error. */
export function machineIo(stdout: NodeJS.WriteStream, stderr: NodeJS.WriteStream, now_s: () => number): Io {
  const left = timeLeft();
  let last_s = Number.NEGATIVE_INFINITY;
  let lastStage = "";
  return {
    out: (text) => void stdout.write(`${text}\n`),
    note: (text) => void stderr.write(`${JSON.stringify({ note: text })}\n`),
    progress(progress) {
      const now = now_s();
      const time_left_s = left.after(progress, now);
      if (now - last_s < often_s && progress.stage === lastStage) return;
      last_s = now;
      lastStage = progress.stage;
      stderr.write(`${JSON.stringify({ progress: { ...progress, time_left_s } })}\n`);
    },
  };
}

function lineOf({ stage, done, total }: Progress, seconds: number | null): string {
  if (total === null || total === 0) return `${stage} …`;
  const part = `${Math.min(100, Math.floor((100 * done) / total))} %`;
  return `${stage}: ${part}${seconds === null ? "" : `, ${readableTime(seconds)} left`}`;
}

function readableTime(seconds: number): string {
  const s = Math.ceil(seconds);
  if (s < 60) return `${s} s`;
  const m = Math.ceil(s / 60);
  return m < 60 ? `${m} min` : `${Math.floor(m / 60)} h ${m % 60} min`;
}

/** What went wrong, for a person: what, where, what to do. */
export function errorText(error: unknown): string {
  if (error instanceof InputError) return `${error.message}\n  where: ${error.where}\n  what to do: ${error.remedy}`;
  const detail = error instanceof Error ? (error.stack ?? error.message) : String(error);
  return `Lodewake itself failed; please report this.\n${detail}`;
}

/** What went wrong, as JSON. */
export function errorJson(error: unknown): string {
  if (error instanceof InputError) {
    const { code, message, where, remedy } = error;
    return JSON.stringify({ error: { code, what: message, where, remedy } });
  }
  const what = error instanceof Error ? error.message : String(error);
  return JSON.stringify({ error: { code: "failed", what, where: "Lodewake", remedy: "Please report this." } });
}

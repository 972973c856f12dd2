import { InputError } from "../quantities/index.ts";
import { nearNames } from "./nearest-name.ts";

const extensions = ["mp4", "m4v", "mov", "webm", "mkv", "avi"];
const extensionList = "mp4, m4v, mov, webm, mkv or avi";

/** True for names of recordings by their ending. Hidden files and the `._` shadows some file systems leave are not. */
export function isRecordingName(fileName: string): boolean {
  const name = fileName.split("/").at(-1)!;
  const dot = name.lastIndexOf(".");
  return !name.startsWith(".") && dot > 0 && extensions.includes(name.slice(dot + 1).toLowerCase());
}

/**
 * The recording to measure, spelled as in `fileNames`.
 *
 * @param fileNames Files of the trial folder, relative to it, `/` between folders.
 * @param named The recording that `trial.json` names; null when the folder has no `trial.json`, and its one recording
 *   is the trial.
 * @param where The folder, for messages.
 * @throws InputError `recording-missing` (with similar names) or `recording-ambiguous` (with all of them).
 */
export function chooseRecording(fileNames: readonly string[], named: string | null, where: string): string {
  return named === null ? onlyRecording(fileNames, where) : namedRecording(fileNames, named, where);
}

function namedRecording(fileNames: readonly string[], named: string, where: string): string {
  // Some file systems store accented letters composed, others apart: the same name to its reader.
  const found = fileNames.includes(named)
    ? named
    : fileNames.find((name) => name.normalize("NFC") === named.normalize("NFC"));
  if (found !== undefined) return found;
  const near = nearNames(named, fileNames).slice(0, 3);
  const others = fileNames.filter(isRecordingName).sort();
  const here =
    near.length > 0
      ? ` Similar there: ${near.join(", ")}.`
      : others.length > 0
        ? ` Recordings there: ${others.slice(0, 10).join(", ")}.`
        : " There is no recording in it.";
  throw new InputError(
    "recording-missing",
    `trial.json names the recording ${JSON.stringify(named)}, which is not in the folder.${here}`,
    `${where}: ${named}`,
    "Put the recording into the trial folder, or mend its name in trial.json (letter case counts).",
  );
}

function onlyRecording(fileNames: readonly string[], where: string): string {
  const found = fileNames.filter((name) => !name.includes("/") && isRecordingName(name)).sort();
  if (found.length === 1) return found[0]!;
  if (found.length === 0) {
    throw new InputError(
      "recording-missing",
      "The folder holds neither a trial.json nor a recording.",
      where,
      `Give a folder that holds one recording (${extensionList}), or describe the trial in a trial.json.`,
    );
  }
  const listed =
    found.length > 10 ? `${found.slice(0, 10).join(", ")} and ${found.length - 10} more` : found.join(", ");
  throw new InputError(
    "recording-ambiguous",
    `The folder holds ${found.length} recordings and no trial.json that says which one to measure: ${listed}.`,
    where,
    `Add a trial.json with { "schema": "lodewake/trial@1", "recording": ${JSON.stringify(found[0])} }, or give each recording its own folder.`,
  );
}

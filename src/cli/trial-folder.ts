import { readdir, readFile, stat } from "node:fs/promises";
import { join } from "node:path";
import { InputError, type Warning } from "../quantities/index.ts";
import { bareTrial, chooseRecording, readTrial, type TrialDescription } from "../trial/index.ts";

/** A trial read from disk. */
export interface TrialFolder {
  readonly trial: TrialDescription;
  /** Path of the recording. */
  readonly recording: string;
  readonly warnings: readonly Warning[];
}

/**
 * Reads a trial folder: its `trial.json`, or without one its only recording.
 * @throws InputError when the folder isn't there, its description is wrong, or it has no recording or more than one
 */
export async function readTrialFolder(folder: string): Promise<TrialFolder> {
  const top = await namesIn(folder, false);
  const description = top.includes("trial.json") ? await readDescription(join(folder, "trial.json")) : null;
  // Only a description can name a file farther down; without one a whole disk given by mistake isn't walked through.
  const names = description ? await namesIn(folder, true) : top;
  const recording = chooseRecording(names, description?.trial.recording ?? null, folder);
  return {
    trial: description?.trial ?? bareTrial(recording),
    recording: join(folder, ...recording.split("/")),
    warnings: description?.warnings ?? [],
  };
}

async function namesIn(folder: string, recursive: boolean): Promise<string[]> {
  const there = await stat(folder).catch(() => null);
  if (!there) {
    throw new InputError("trial-missing", "There is no such folder.", folder, "Give the folder of the trial.");
  }
  if (!there.isDirectory()) {
    throw new InputError(
      "trial-not-a-folder",
      "This is a file, not a trial folder.",
      folder,
      "Put the recording into a folder of its own and give the folder.",
    );
  }
  const found = await readdir(folder, { recursive, withFileTypes: true }).catch((error: Error) => {
    throw new InputError(
      "trial-unreadable",
      `The folder can't be read (${error.message}).`,
      folder,
      "Check who may read it.",
    );
  });
  return found
    .filter((entry) => !entry.isDirectory())
    .map((entry) =>
      join(entry.parentPath, entry.name)
        .slice(join(folder, "x").length - 1)
        .replaceAll("\\", "/"),
    )
    .sort();
}

async function readDescription(path: string) {
  const text = await readFile(path, "utf8").catch((error: Error) => {
    throw new InputError(
      "trial-unreadable",
      `The file can't be read (${error.message}).`,
      path,
      "Check who may read it.",
    );
  });
  const { trial, warnings } = readTrial(text, path);
  // Warnings go into the result, which must not depend on where the folder lies.
  return { trial, warnings: warnings.map((w) => ({ ...w, message: w.message.replaceAll(path, "trial.json") })) };
}

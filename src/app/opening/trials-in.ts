import { bareTrial, chooseRecording, isRecordingName, readTrial } from "../../trial/index.ts";
import { type Problem, problemOf } from "../state/problem.ts";
import type { TrialSource } from "../state/workbench-state.ts";
import type { FolderFile } from "./folder-file.ts";

/** What was found in files that were opened. */
export interface Found {
  readonly sources: readonly TrialSource[];
  readonly problems: readonly Problem[];
}

/**
 * The trials in what was opened: each folder with a `trial.json` or a recording is one (folders above them are only
 * looked through), and so is each file opened by itself. What can't be read is a problem and doesn't keep the others.
 */
export async function trialsIn(files: readonly FolderFile[]): Promise<Found> {
  const loose = files.filter(({ path }) => !path.includes("/"));
  const inFolders = files.filter(({ path }) => path.includes("/"));
  const sources: TrialSource[] = [];
  const problems: Problem[] = [];
  const attempt = async (name: string, open: () => Promise<TrialSource>) => {
    try {
      sources.push(await open());
    } catch (error) {
      problems.push(problemOf(`${name} could not be opened`, error));
    }
  };
  if (loose.some(({ path }) => path === "trial.json")) {
    await attempt("trial.json", () => trialOfFolder("trial.json", loose));
  } else {
    for (const { path, file } of loose) await attempt(path, async () => trialOfFile(path, file));
  }
  const tops = new Set(inFolders.map(({ path }) => path.slice(0, path.indexOf("/"))));
  for (const top of [...tops].sort(inReadingOrder)) {
    const folders = trialFolders(top, inFolders);
    for (const folder of folders.length > 0 ? folders : [top]) {
      await attempt(folder, () => trialOfFolder(folder, within(folder, inFolders)));
    }
  }
  return { sources, problems };
}

function trialOfFile(path: string, recording: File): TrialSource {
  return { name: path, description: bareTrial(path), recording, warnings: [] };
}

/** @param files with paths from the folder */
async function trialOfFolder(folder: string, files: readonly FolderFile[]): Promise<TrialSource> {
  const described = files.find(({ path }) => path === "trial.json");
  // Warnings go into the result, which must not depend on what the folder is called.
  const read = described ? readTrial(await described.file.text(), "trial.json") : null;
  const names = files.map(({ path }) => path);
  const recording = chooseRecording(names, read?.trial.recording ?? null, folder);
  return {
    name: folder.slice(folder.lastIndexOf("/") + 1),
    description: read?.trial ?? bareTrial(recording),
    recording: files.find(({ path }) => path === recording)!.file,
    warnings: read?.warnings ?? [],
  };
}

function trialFolders(folder: string, files: readonly FolderFile[]): string[] {
  const inside = within(folder, files);
  const direct = inside.filter(({ path }) => !path.includes("/"));
  if (direct.some(({ path }) => path === "trial.json" || isRecordingName(path))) return [folder];
  const steps = inside.filter(({ path }) => path.includes("/")).map(({ path }) => path.slice(0, path.indexOf("/")));
  return [...new Set(steps)].sort(inReadingOrder).flatMap((step) => trialFolders(`${folder}/${step}`, files));
}

function within(folder: string, files: readonly FolderFile[]): FolderFile[] {
  const start = `${folder}/`;
  return files
    .filter(({ path }) => path.startsWith(start))
    .map(({ path, file }) => ({ path: path.slice(start.length), file }));
}

/** T9 before T10. */
function inReadingOrder(a: string, b: string): number {
  return a.localeCompare(b, "en", { numeric: true });
}

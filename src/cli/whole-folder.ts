import { rmSync } from "node:fs";
import { mkdir, readdir, readFile, rename, rm, rmdir, stat } from "node:fs/promises";
import { basename, dirname, join, resolve } from "node:path";
import { InputError } from "../quantities/index.ts";

/** What a folder that Lodewake writes holds. */
export interface FolderKind {
  /** What it is called in messages: "result". */
  readonly name: string;
  /** The file by which an older one is known. */
  readonly mark: string;
  /** How the `schema` in that file begins. */
  readonly schema: string;
}

/**
 * Refuses a folder that can't be written to, before any work is done. Leaves nothing behind.
 *
 * @param replace an older folder of the same kind may be replaced
 * @throws InputError when something is in the way or the folder can't be made
 */
export async function checkFolder(path: string, kind: FolderKind, replace: boolean): Promise<void> {
  const target = resolve(path);
  await refuseWhatIsThere(target, path, kind, replace);
  const made = await makeBeside(target, path, kind);
  await unmake(made);
}

/**
 * Writes a folder all at once: `fill` writes into a folder beside it, which then takes its name. Whatever stops this,
 * there is either the whole of it or nothing new.
 *
 * @throws InputError as {@link checkFolder}; what `fill` throws goes through as it is
 */
export async function writeFolder(
  path: string,
  kind: FolderKind,
  replace: boolean,
  fill: (folder: string) => Promise<void>,
): Promise<void> {
  const target = resolve(path);
  const exists = await refuseWhatIsThere(target, path, kind, replace);
  const made = await makeBeside(target, path, kind);
  try {
    await fill(made.folder);
    await moveIntoPlace(made.folder, target, exists).catch((error) => {
      throw cantWrite(path, kind, error);
    });
  } catch (error) {
    await unmake(made);
    throw error;
  }
}

async function moveIntoPlace(folder: string, target: string, exists: boolean): Promise<void> {
  const old = `${folder}-old`;
  if (exists) await rename(target, old);
  try {
    await rename(folder, target);
  } catch (error) {
    if (exists) await rename(old, target);
    throw error;
  }
  if (exists) await rm(old, { recursive: true, force: true });
}

/** Is there something at the target already that may be replaced? Throws when there is something that may not. */
async function refuseWhatIsThere(target: string, shown: string, kind: FolderKind, replace: boolean): Promise<boolean> {
  const there = await stat(target).catch(() => null);
  if (!there) return false;
  if (!there.isDirectory()) {
    throw new InputError(
      "output-is-file",
      `There is a file where the ${kind.name} folder should go.`,
      shown,
      "Give the name of a folder that isn't there yet.",
    );
  }
  const content = await readdir(target).catch((error) => {
    throw cantWrite(shown, kind, error);
  });
  if (content.length === 0) return true;
  if (!content.includes(kind.mark) || !(await isMarked(join(target, kind.mark), kind.schema))) {
    throw new InputError(
      `output-not-a-${kind.name.replaceAll(" ", "-")}`,
      `The folder holds something that is no ${kind.name} of Lodewake, and will not be touched.`,
      shown,
      `Give the name of a folder that isn't there yet, or of an older ${kind.name}.`,
    );
  }
  if (!replace) {
    throw new InputError(
      "output-exists",
      `The folder holds an older ${kind.name} already.`,
      shown,
      `Give another folder, or add --replace to replace the older ${kind.name}.`,
    );
  }
  return true;
}

/** Is this JSON file of ours? Other programs write files of the same name. */
async function isMarked(file: string, schema: string): Promise<boolean> {
  try {
    const found = JSON.parse(await readFile(file, "utf8"))?.schema;
    return typeof found === "string" && found.startsWith(schema);
  } catch {
    return false;
  }
}

interface Made {
  readonly folder: string;
  /** Folders above that had to be made too, topmost first. */
  readonly parents: readonly string[];
}

async function makeBeside(target: string, shown: string, kind: FolderKind): Promise<Made> {
  const parent = dirname(target);
  const parents: string[] = [];
  try {
    const top = await mkdir(parent, { recursive: true });
    for (let p = parent; top && p.length >= top.length; p = dirname(p)) parents.unshift(p);
    const folder = join(parent, `.${basename(target)}.unfinished-${process.pid}`);
    await mkdir(folder);
    return { folder, parents };
  } catch (error) {
    for (const p of [...parents].reverse()) await rmdir(p).catch(() => {});
    throw cantWrite(shown, kind, error);
  }
}

async function unmake({ folder, parents }: Made): Promise<void> {
  await rm(folder, { recursive: true, force: true });
  for (const p of [...parents].reverse()) await rmdir(p).catch(() => {});
}

const stops = ["SIGINT", "SIGTERM", "SIGHUP"] as const;

/**
 * Works in an unfinished folder, which goes when the program is told to stop meanwhile. Only for work that lets the
 * program breathe: a signal waits until it does.
 */
export async function removedWhenStopped(folder: string, work: () => Promise<void>): Promise<void> {
  const stop = (signal: NodeJS.Signals) => {
    rmSync(folder, { recursive: true, force: true });
    unwatch();
    process.kill(process.pid, signal);
  };
  const unwatch = () => {
    for (const signal of stops) process.off(signal, stop);
  };
  for (const signal of stops) process.on(signal, stop);
  try {
    await work();
  } finally {
    unwatch();
  }
}

/** What to say when the disk refuses a {@link FolderKind} at the path shown. */
export function cantWrite(shown: string, kind: FolderKind, error: unknown): InputError {
  const reason = error instanceof Error ? error.message.replace(/,.*$/, "") : String(error);
  return new InputError(
    "output-not-writable",
    `The ${kind.name} folder can't be written (${reason}).`,
    shown,
    "Choose a place you may write to, with room left on the disk.",
  );
}

import { mkdir, readdir, rename, rm, rmdir, stat, writeFile } from "node:fs/promises";
import { basename, dirname, join, resolve } from "node:path";
import { InputError } from "../quantities/index.ts";

/** A file to be written into a result folder. */
interface NamedBytes {
  readonly name: string;
  readonly bytes: Uint8Array;
}

/**
 * Refuses a folder that results can't be written to, before any work is done. Leaves nothing behind.
 *
 * @param replace an existing result may be replaced
 * @throws InputError when something is in the way or the folder can't be made
 */
export async function checkResultFolder(path: string, replace: boolean): Promise<void> {
  const target = resolve(path);
  await refuseWhatIsThere(target, path, replace);
  const made = await makeBeside(target, path);
  await unmake(made);
}

/**
 * Writes a result folder all at once: the files go into a folder beside it, which then takes its name. Whatever stops
 * this, there is either the whole result or none.
 *
 * @throws InputError as {@link checkResultFolder}
 */
export async function writeResultFolder(path: string, files: readonly NamedBytes[], replace: boolean): Promise<void> {
  const target = resolve(path);
  const exists = await refuseWhatIsThere(target, path, replace);
  const made = await makeBeside(target, path);
  try {
    for (const { name, bytes } of files) await writeFile(join(made.folder, name), bytes);
    const old = `${made.folder}-old`;
    if (exists) await rename(target, old);
    try {
      await rename(made.folder, target);
    } catch (error) {
      if (exists) await rename(old, target);
      throw error;
    }
    if (exists) await rm(old, { recursive: true, force: true });
  } catch (error) {
    await unmake(made);
    throw cantWrite(path, error);
  }
}

/** Is there something at the target already that may be replaced? Throws when there is something that may not. */
async function refuseWhatIsThere(target: string, shown: string, replace: boolean): Promise<boolean> {
  const there = await stat(target).catch(() => null);
  if (!there) return false;
  if (!there.isDirectory()) {
    throw new InputError(
      "output-is-file",
      "There is a file where the result folder should go.",
      shown,
      "Give the name of a folder that isn't there yet.",
    );
  }
  const content = await readdir(target).catch((error) => {
    throw cantWrite(shown, error);
  });
  if (content.length === 0) return true;
  if (!content.includes("summary.json")) {
    throw new InputError(
      "output-not-a-result",
      "The folder holds something that is no result of Lodewake, and will not be touched.",
      shown,
      "Give the name of a folder that isn't there yet, or of an older result.",
    );
  }
  if (!replace) {
    throw new InputError(
      "output-exists",
      "There is a result in this folder already.",
      shown,
      "Give another folder, or add --replace to replace the old result.",
    );
  }
  return true;
}

interface Made {
  readonly folder: string;
  /** Folders above that had to be made too, topmost first. */
  readonly parents: readonly string[];
}

async function makeBeside(target: string, shown: string): Promise<Made> {
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
    throw cantWrite(shown, error);
  }
}

async function unmake({ folder, parents }: Made): Promise<void> {
  await rm(folder, { recursive: true, force: true });
  for (const p of [...parents].reverse()) await rmdir(p).catch(() => {});
}

function cantWrite(shown: string, error: unknown): InputError {
  const reason = error instanceof Error ? error.message.replace(/,.*$/, "") : String(error);
  return new InputError(
    "output-not-writable",
    `The result folder can't be written (${reason}).`,
    shown,
    "Choose a place you may write to, with room left on the disk.",
  );
}

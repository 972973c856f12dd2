import { writeFile } from "node:fs/promises";
import { join } from "node:path";
import { cantWrite, checkFolder, type FolderKind, removedWhenStopped, writeFolder } from "./whole-folder.ts";

/** A file to be written into a result folder. */
interface NamedBytes {
  readonly name: string;
  readonly bytes: Uint8Array;
}

const kind: FolderKind = { name: "result", mark: "summary.json", schema: "lodewake/summary@" };

/**
 * Refuses a folder that results can't be written to, before any work is done. Leaves nothing behind.
 *
 * @param replace an existing result may be replaced
 * @throws InputError when something is in the way or the folder can't be made
 */
export function checkResultFolder(path: string, replace: boolean): Promise<void> {
  return checkFolder(path, kind, replace);
}

/**
 * Writes a result folder all at once: there is either the whole result or none.
 * @throws InputError as {@link checkResultFolder}
 */
export function writeResultFolder(path: string, files: readonly NamedBytes[], replace: boolean): Promise<void> {
  return writeFolder(path, kind, replace, (folder) =>
    removedWhenStopped(folder, async () => {
      for (const { name, bytes } of files) await writeFile(join(folder, name), bytes);
    }).catch((error) => {
      throw cantWrite(path, kind, error);
    }),
  );
}

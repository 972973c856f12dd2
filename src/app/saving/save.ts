import { startMakingResults } from "../../../workers/index.ts";
import type { MeasuredTrial } from "../../quantities/index.ts";

/** A name that every file system takes, for the results of a trial. */
export function resultName(title: string): string {
  const safe = title
    .normalize("NFC")
    .replace(/\.[a-z0-9]{2,4}$/i, "")
    .replace(/[^\p{L}\p{N}._-]+/gu, "-")
    .replace(/^[.-]+|[.-]+$/g, "");
  return `${safe || "trial"}-result`;
}

/** Downloads all result files in one zip. */
export async function saveZip(measured: MeasuredTrial, name: string): Promise<void> {
  const [zip] = await startMakingResults({ measured, as: "zip" }).answer;
  const address = URL.createObjectURL(new Blob([zip!.bytes as BlobPart], { type: "application/zip" }));
  const link = document.createElement("a");
  link.href = address;
  link.download = `${name}.zip`;
  link.click();
  // The download has begun by then and keeps the bytes itself.
  setTimeout(() => URL.revokeObjectURL(address), 60_000);
}

/**
 * Writes the result files into a new folder inside `parent`; when there is one of that name, a number is added: nothing
 * is ever replaced. The files are made before the first is written.
 * @returns the name of the new folder
 */
export async function saveInto(
  parent: FileSystemDirectoryHandle,
  measured: MeasuredTrial,
  name: string,
): Promise<string> {
  const files = await startMakingResults({ measured, as: "files" }).answer;
  const taken = new Set<string>();
  for await (const entry of parent.keys()) taken.add(entry.toLowerCase());
  const free = freeName(name, taken);
  const folder = await parent.getDirectoryHandle(free, { create: true });
  try {
    for (const { name, bytes } of files) {
      const writable = await (await folder.getFileHandle(name, { create: true })).createWritable();
      await writable.write(bytes as BlobPart as Blob);
      await writable.close();
    }
  } catch (error) {
    await parent.removeEntry(free, { recursive: true });
    throw error;
  }
  return free;
}

/** `name`, or `name-2` and so on when it is taken. `taken` is in lower case. */
export function freeName(name: string, taken: ReadonlySet<string>): string {
  let free = name;
  for (let i = 2; taken.has(free.toLowerCase()); i++) free = `${name}-${i}`;
  return free;
}

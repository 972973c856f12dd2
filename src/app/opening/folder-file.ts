/** A file and its path from what was opened: `T07/trial.json` in a folder, `swim.mp4` alone. `/` between folders. */
export interface FolderFile {
  readonly path: string;
  readonly file: File;
}

/** Files that a picker gave. Those of a folder carry their path; others have none. */
export function pickedFiles(list: Iterable<File>): FolderFile[] {
  return [...list].map((file) => ({ path: file.webkitRelativePath || file.name, file }));
}

/**
 * Files and folders that were dropped, folders searched to the bottom. Must be called while the drop is being handled:
 * the browser forgets the entries afterwards.
 */
export async function droppedFiles(transfer: DataTransfer): Promise<FolderFile[]> {
  const entries = [...transfer.items].flatMap((item) => item.webkitGetAsEntry() ?? []);
  const lists = await Promise.all(entries.map(filesOf));
  return lists.flat();
}

async function filesOf(entry: FileSystemEntry): Promise<FolderFile[]> {
  if (entry.isFile) {
    const file = await new Promise<File>((yes, no) => (entry as FileSystemFileEntry).file(yes, no));
    return [{ path: entry.fullPath.replace(/^\//, ""), file }];
  }
  const inside = await entriesOf(entry as FileSystemDirectoryEntry);
  return (await Promise.all(inside.map(filesOf))).flat();
}

/** All entries of a folder: the browser hands them out a hundred at a time. */
async function entriesOf(folder: FileSystemDirectoryEntry): Promise<FileSystemEntry[]> {
  const reader = folder.createReader();
  const all: FileSystemEntry[] = [];
  for (;;) {
    const some = await new Promise<FileSystemEntry[]>((yes, no) => reader.readEntries(yes, no));
    if (some.length === 0) return all;
    all.push(...some);
  }
}

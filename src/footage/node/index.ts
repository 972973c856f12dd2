import { type FileHandle, open } from "node:fs/promises";
import { basename } from "node:path";
import { FilePathSource } from "mediabunny";
import type { Footage, FootageSettings } from "../footage.ts";
import { footageOf } from "../footage-of.ts";
import { openSource } from "../open-source.ts";
import { noSuchFile, unreadableFile } from "../refusals.ts";
import { loadCoreInNode } from "./core-in-node.ts";
import { bytesOfFile } from "./file-bytes.ts";
import { nativeDecoder } from "./native.ts";
import { pathAsBlob } from "./path-as-blob.ts";

/**
 * Opens a recording for measuring in Node: with the optional native decoder where it is installed and can read the
 * recording, else with ffmpeg compiled to WebAssembly, which blocks the thread while it reads.
 *
 * @throws InputError when there is no such file, it is no video, or nothing in it can be decoded
 */
export async function openInNode(path: string, settings: FootageSettings): Promise<Footage> {
  const name = basename(path);
  const handle = await openFile(path, name);
  const { size } = await handle.stat();
  const opened = openSource(
    {
      name,
      bytes: bytesOfFile(handle, size),
      source: new FilePathSource(path),
      fast: nativeDecoder,
      mountable: pathAsBlob(path, size),
      loadCore: loadCoreInNode,
    },
    settings,
  );
  return footageOf(await opened.finally(() => handle.close()));
}

async function openFile(path: string, name: string): Promise<FileHandle> {
  try {
    const handle = await open(path, "r");
    if ((await handle.stat()).isFile()) return handle;
    await handle.close();
  } catch (error) {
    const { code, message } = error as NodeJS.ErrnoException;
    throw code === "ENOENT" || code === "ENOTDIR" ? noSuchFile(name) : unreadableFile(name, message);
  }
  throw unreadableFile(name, "it is no file");
}

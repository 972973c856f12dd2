import type { Footage, FootageSettings } from "../footage.ts";
import { footageOf } from "../footage-of.ts";
import { openSource } from "../open-source.ts";
import { sourceOfFile } from "./source-of-file.ts";

export type { Footage, FootageFacts, FootageSettings, ReadReport } from "../footage.ts";
export type { Picture, Pictures } from "../pictures.ts";
export { openPictures } from "./pictures.ts";

/**
 * Opens a recording for measuring in a browser's worker: with WebCodecs where the browser can decode the recording to
 * pictures with a luma plane, else with ffmpeg compiled to WebAssembly, which blocks the worker while it reads (and
 * only works in a worker).
 *
 * @throws InputError when the file is no video, or nothing in it can be decoded
 */
export async function openInBrowser(file: File, settings: FootageSettings): Promise<Footage> {
  return footageOf(await openSource(sourceOfFile(file), settings));
}

import type { FootageSettings } from "../footage.ts";
import { openSource } from "../open-source.ts";
import { type Pictures, picturesOf } from "../pictures.ts";
import { sourceOfFile } from "./source-of-file.ts";

/**
 * Opens a recording for looking at single frames in a browser's worker, with the decoder that measuring would take. See
 * {@link Pictures} for what a frame costs.
 *
 * @throws InputError when the file is no video, or nothing in it can be decoded
 */
export async function openPictures(file: File, settings: FootageSettings): Promise<Pictures> {
  return picturesOf(await openSource(sourceOfFile(file), settings));
}

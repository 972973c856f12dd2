import type { Decoder } from "../decoder.ts";
import { pulledDecoder } from "../samples/pulled-decoder.ts";
import type { SampleSource } from "../samples/sample-source.ts";
import { type CodecLibrary, nativePictures } from "./native-pictures.ts";

let loading: Promise<CodecLibrary | null> | undefined;

/** The native codec library, an optional dependency; null when it isn't installed or doesn't load here. */
function loadLibrary(): Promise<CodecLibrary | null> {
  loading ??= import("node-av").catch(() => null);
  return loading;
}

/** The native decoder for a track, or null when the library is not there or doesn't know the codec. */
export async function nativeDecoder(source: SampleSource): Promise<Decoder | null> {
  const library = await loadLibrary();
  const pictures = library && (await nativePictures(library, source));
  if (!library || !pictures) return null;
  return pulledDecoder(`libavcodec ${library.getFFmpegInfo().libraries.avcodec} (native)`, pictures);
}

import type { Decoder } from "../decoder.ts";
import { type SampleSource, samplesDecoder } from "../samples/samples-decoder.ts";

/** The browser and its version as it introduces itself. */
const browser = (): string => /(?:Firefox|Edg|Chrome|Version)\/[\d.]+/.exec(navigator.userAgent)?.[0] ?? "browser";

/** The browser's own decoder for a track, or null when the browser has none or doesn't know the codec. */
export async function webCodecsDecoder(source: SampleSource): Promise<Decoder | null> {
  if (typeof VideoDecoder === "undefined" || !(await source.track.canDecode())) return null;
  return samplesDecoder(`WebCodecs (${browser()})`, source);
}

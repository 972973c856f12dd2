import { type Decoder, DecoderFailure, type PictureTaker } from "../decoder.ts";
import { pulledDecoder } from "../samples/pulled-decoder.ts";
import type { SampleSource } from "../samples/sample-source.ts";
import { webCodecsPictures } from "./webcodecs-pictures.ts";

/** The browser and its version as it introduces itself. */
const browser = (): string => /(?:Firefox|Edg|Chrome|Version)\/[\d.]+/.exec(navigator.userAgent)?.[0] ?? "browser";

/**
 * The browser's own decoder for a track, or null when the browser has none or can't be trusted with it.
 *
 * Around WebCodecs the demuxing library gives the n-th picture the n-th time. That is wrong as soon as a packet yields
 * no picture: tracks that hide pictures are left to another decoder, and a loss along the way is a failure.
 */
export async function webCodecsDecoder(source: SampleSource): Promise<Decoder | null> {
  if (typeof VideoDecoder === "undefined" || source.hidesPictures || !(await source.track.canDecode())) return null;
  const decoder = pulledDecoder(`WebCodecs (${browser()})`, webCodecsPictures(source));
  return {
    ...decoder,
    async decode(recording, taker, signal) {
      let seen = 0;
      let enough = false;
      const counting: PictureTaker = {
        wants(ticks) {
          seen++;
          return taker.wants(ticks);
        },
        take(picture) {
          const appetite = taker.take(picture);
          enough = appetite === "enough";
          return appetite;
        },
      };
      await decoder.decode(recording, counting, signal);
      if (!enough && seen < source.packets && !recording.cutShort)
        throw new DecoderFailure(`${source.packets - seen} of ${source.packets} packets gave no picture`);
    },
  };
}

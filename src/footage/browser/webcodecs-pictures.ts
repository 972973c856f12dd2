import { type VideoSample, VideoSampleSink } from "mediabunny";
import { type DecodedPicture, DecoderFailure } from "../decoder.ts";
import { LumaTightener } from "../picture/tight-luma.ts";
import { attempt, type PictureStream } from "../samples/pulled-decoder.ts";
import type { SampleSource } from "../samples/sample-source.ts";

/** Formats whose first plane is luma, and the depth of their samples. */
const lumaDepth: Readonly<Record<string, number>> = Object.fromEntries(
  ["I420", "I422", "I444", "NV12"].flatMap((format) => [
    [format, 8],
    [`${format}A`, 8],
    [`${format}P10`, 10],
    [`${format}AP10`, 10],
    [`${format}P12`, 12],
    [`${format}AP12`, 12],
  ]),
);

/**
 * Pictures through the demuxing library's own iterator of samples, which keeps WebCodecs some frames ahead while the
 * taker works. Only pictures with a luma plane are accepted: rebuilding luma from RGB would change the numbers.
 */
export function webCodecsPictures(source: SampleSource): PictureStream {
  const tightener = new LumaTightener();
  let memory = new Uint8Array(0);

  /** Copies the sample's planes and gives the first one. */
  async function picture(sample: VideoSample, ticks: number): Promise<DecodedPicture> {
    const bitDepth = sample.format === null ? undefined : lumaDepth[sample.format];
    if (bitDepth === undefined) throw new DecoderFailure(`the decoder gives ${sample.format ?? "no readable"} pixels`);
    const { width, height } = sample.visibleRect;
    const size = sample.allocationSize();
    if (memory.length < size) memory = new Uint8Array(size);
    const [plane] = await sample.copyTo(memory);
    if (plane === undefined) throw new DecoderFailure("the decoder gives no luma");
    const luma = tightener.tighten({ bytes: memory, ...plane, width, height, bitDepth });
    return { ticks, width, height, bitDepth, luma };
  }

  return async function* pictures(fromTicks, wants) {
    const from_s = fromTicks === null ? undefined : source.timestampOf(fromTicks);
    const samples = new VideoSampleSink(source.track, { hardwareAcceleration: "prefer-software" }).samples(from_s);
    try {
      for (;;) {
        const next = await attempt(samples.next());
        if (next.done) return;
        const sample = next.value;
        try {
          const ticks = source.ticksOf(sample.timestamp);
          if (wants(ticks)) yield await attempt(picture(sample, ticks));
        } finally {
          sample.close();
        }
      }
    } finally {
      await samples.return();
    }
  };
}

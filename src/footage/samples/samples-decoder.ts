import { type InputVideoTrack, type VideoSample, VideoSampleSink } from "mediabunny";
import { Stopped } from "../../quantities/index.ts";
import { type DecodedPicture, type Decoder, DecoderFailure } from "../decoder.ts";
import { LumaTightener } from "../picture/tight-luma.ts";

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

/** What a decoder behind the demuxing library needs to know of its track. */
export interface SampleSource {
  readonly track: InputVideoTrack;
  readonly packets: number;
  /** Whether some packets hold pictures that are never shown. */
  readonly hidesPictures: boolean;
  /** Ticks of the track's own clock, before any edit list, of the library's time; and back. */
  ticksOf(timestamp_s: number): number;
  timestampOf(ticks: number): number;
}

/**
 * Decodes through the demuxing library's own iterator of samples, which keeps the decoder some frames ahead while the
 * taker works. Only pictures with a luma plane are accepted: rebuilding luma from RGB would change the numbers.
 *
 * @param name as results name the decoder
 */
export function samplesDecoder(name: string, source: SampleSource): Decoder {
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

  async function* pictures(from_s: number | undefined, wants: (ticks: number) => boolean) {
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
  }

  return {
    name,
    async decode(_recording, taker, signal) {
      const wants = (ticks: number) => {
        if (signal?.aborted) throw new Stopped();
        return taker.wants(ticks);
      };
      for await (const picture of pictures(undefined, wants)) if (taker.take(picture) === "enough") break;
    },
    walk: ({ keeps }, fromTicks) =>
      pictures(source.timestampOf(fromTicks), (ticks) => ticks >= fromTicks && keeps(ticks)),
    close() {},
  };
}

/** Awaits what the decoder does; its errors become failures of the decoder, never of the taker. */
async function attempt<T>(work: Promise<T>): Promise<T> {
  try {
    return await work;
  } catch (error) {
    throw error instanceof DecoderFailure ? error : new DecoderFailure(String(error), { cause: error });
  }
}

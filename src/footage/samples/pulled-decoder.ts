import { Stopped } from "../../quantities/index.ts";
import { type DecodedPicture, type Decoder, DecoderFailure } from "../decoder.ts";

/**
 * Pictures in order of time from the key picture at or before `fromTicks` on (null: from the first); those that
 * `wants` refuses are decoded but not given. Each is borrowed until the next is asked for.
 */
export type PictureStream = (
  fromTicks: number | null,
  wants: (ticks: number) => boolean,
) => AsyncGenerator<DecodedPicture, void, undefined>;

/** A decoder of which pictures are pulled one by one. */
export function pulledDecoder(name: string, stream: PictureStream): Decoder {
  return {
    name,
    async decode(_recording, taker, signal) {
      const wants = (ticks: number) => {
        if (signal?.aborted) throw new Stopped();
        return taker.wants(ticks);
      };
      for await (const picture of stream(null, wants)) if (taker.take(picture) === "enough") break;
    },
    walk: ({ keeps }, fromTicks) => stream(fromTicks, (ticks) => ticks >= fromTicks && keeps(ticks)),
  };
}

/** Awaits what a decoder does; its errors become failures of the decoder, never of the taker. */
export async function attempt<T>(work: Promise<T>): Promise<T> {
  try {
    return await work;
  } catch (error) {
    throw error instanceof DecoderFailure ? error : new DecoderFailure(String(error), { cause: error });
  }
}

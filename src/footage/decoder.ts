import type { AbortSignalLike, Appetite } from "../quantities/index.ts";
import type { Recording } from "./recording.ts";

/** A decoded picture as coded (not yet turned upright): tight luma, one byte a pixel, borrowed until `take` returns. */
export interface DecodedPicture {
  readonly ticks: number;
  readonly width: number;
  readonly height: number;
  /** Depth of the samples before they were brought to 8 bits. */
  readonly bitDepth: number;
  readonly luma: Uint8Array;
}

/** Takes the pictures of one reading, in order of time. */
export interface PictureTaker {
  /** Asked first, so that the pixels of a picture nobody wants need not be copied. */
  wants(ticks: number): boolean;
  take(picture: DecodedPicture): Appetite;
}

/** One way of decoding one recording, from the first picture each time. */
export interface Decoder {
  /** With its version, as results name it. */
  readonly name: string;
  /**
   * Decodes until the end or until the taker has had enough.
   * @throws DecoderFailure when the decoder itself fails; whatever the taker throws; Stopped
   */
  decode(recording: Recording, taker: PictureTaker, signal?: AbortSignalLike): Promise<void>;
  /**
   * Gives the pictures from the first one at or after a time on, as they are asked for; each is borrowed until the next
   * is asked for. Meant for looking around, not for measuring: the way there costs up to one key frame interval.
   * @throws DecoderFailure when the decoder itself fails
   */
  walk(recording: Recording, fromTicks: number): AsyncGenerator<DecodedPicture, void, undefined>;
}

/** The decoder can't do it, or not any more; another one may. */
export class DecoderFailure extends Error {
  override readonly name = "DecoderFailure";
}

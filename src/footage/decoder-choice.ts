import { type DecodedPicture, type Decoder, DecoderFailure } from "./decoder.ts";
import type { Recording } from "./recording.ts";
import { codecUnknown, decoderAbsent, nothingToRead } from "./refusals.ts";

/** Makes a decoder when it is its turn; null when there is none of this kind here. */
export type DecoderMaker = () => Promise<Decoder | null>;

/** What the first picture tells of all. */
export type FirstPicture = Pick<DecodedPicture, "width" | "height" | "bitDepth">;

/** Codecs that every decoder here reads: failing then means damage. */
const wellKnown = /^(avc|hev1|hvc1|vp0?[89]|mjpeg|mpeg4|h264|hevc|rawvideo)/i;

/** The decoder in use for a recording, and those in reserve. */
export class DecoderChoice {
  #decoder: Decoder;
  #takenAway = false;

  private constructor(
    readonly recording: Recording,
    readonly reserve: DecoderMaker[],
    readonly first: FirstPicture,
    decoder: Decoder,
  ) {
    this.#decoder = decoder;
  }

  /**
   * Takes the first decoder that gives the recording's first picture.
   * @param makers ways of decoding, best first
   * @param only the name of the one way that was asked for, when others were left out
   * @throws InputError when none gives a picture
   */
  static async among(
    recording: Recording,
    makers: readonly DecoderMaker[],
    only: string | undefined,
  ): Promise<DecoderChoice> {
    const reserve = [...makers];
    const works = await firstThatWorks(recording, reserve);
    if (works !== null) return new DecoderChoice(recording, reserve, works.first, works.decoder);
    const { name, codec, cutShort } = recording;
    if (cutShort) throw nothingToRead(name, true);
    if (only !== undefined) throw decoderAbsent(name, only, codec);
    throw wellKnown.test(codec) ? nothingToRead(name, false) : codecUnknown(name, codec);
  }

  get decoder(): Decoder {
    return this.#decoder;
  }

  /**
   * Changes to the next decoder that works after the present one failed; false when there is none. A browser may take
   * a decoder away from a page that is hidden: then the same one is tried once more.
   */
  async another(failure: DecoderFailure): Promise<boolean> {
    if (!this.#takenAway && failure.cause instanceof Error && failure.cause.name === "QuotaExceededError") {
      this.#takenAway = true;
      return true;
    }
    const works = await firstThatWorks(this.recording, this.reserve);
    if (works === null) return false;
    this.#decoder = works.decoder;
    return true;
  }
}

async function firstThatWorks(recording: Recording, makers: DecoderMaker[]) {
  for (let make = makers.shift(); make !== undefined; make = makers.shift()) {
    const decoder = await make();
    const first = decoder && (await firstPicture(decoder, recording));
    if (decoder && first) return { decoder, first };
  }
  return null;
}

/** Decodes the first picture, the only proof that a decoder can read a recording; null when it can't. */
async function firstPicture(decoder: Decoder, recording: Recording): Promise<FirstPicture | null> {
  let first: FirstPicture | null = null;
  try {
    await decoder.decode(recording, {
      wants: (ticks) => recording.keeps(ticks),
      take({ width, height, bitDepth }) {
        first = { width, height, bitDepth };
        return "enough";
      },
    });
  } catch (error) {
    if (!(error instanceof DecoderFailure)) throw error;
  }
  return first;
}

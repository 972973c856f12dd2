import { Stopped, type Warning } from "../quantities/index.ts";
import { type DecodedPicture, type Decoder, DecoderFailure } from "./decoder.ts";
import type { Footage, FootageFacts, FootageSettings } from "./footage.ts";
import { Reading } from "./reading.ts";
import { type Recording, seconds } from "./recording.ts";
import { codecUnknown, nothingToRead } from "./refusals.ts";
import { captureClock } from "./time/capture-clock.ts";
import { rateChanges } from "./time/intervals.ts";
import { decoderGaveUp } from "./warnings.ts";

/** Makes a decoder when it is its turn; null when there is none of this kind here. */
export type DecoderMaker = () => Promise<Decoder | null>;

/** Codecs that every decoder here reads: failing then means damage. */
const wellKnown = /^(avc|hev1|hvc1|vp0?[89]|mjpeg|mpeg4|h264|hevc|rawvideo)/i;

/**
 * Opens a described recording with the first decoder that gives its first picture, and keeps the others in reserve.
 * @param makers ways of decoding it, best first
 * @throws InputError when none gives a picture
 */
export async function openRecording(
  recording: Recording,
  makers: readonly DecoderMaker[],
  settings: FootageSettings,
  close: () => void,
): Promise<Footage> {
  const waiting = [...makers];
  const next = async (): Promise<{ decoder: Decoder; first: FirstPicture } | null> => {
    for (let make = waiting.shift(); make !== undefined; make = waiting.shift()) {
      const decoder = await make();
      const first = decoder && (await firstPicture(decoder, recording));
      if (decoder && first) return { decoder, first };
      decoder?.close();
    }
    return null;
  };
  const opened = await next();
  if (opened === null)
    throw recording.cutShort || wellKnown.test(recording.codec)
      ? nothingToRead(recording.name, recording.cutShort)
      : codecUnknown(recording.name, recording.codec);
  let { decoder } = opened;

  const clock = captureClock(recording.containerRate_hz, settings.captureFps, recording.captureRateTag_hz);
  const standing: Warning[] = [...recording.warnings, ...clock.warnings, ...rateChanges(recording.ticks)];

  return {
    get facts() {
      return factsOf(recording, opened.first, clock, decoder.name);
    },
    async read(receive, signal) {
      const reading = new Reading(recording, clock.factor, receive);
      const warnings = [...standing];
      try {
        await decoder.decode(recording, reading, signal);
      } catch (error) {
        if (!(error instanceof DecoderFailure)) throw error;
        const failed = decoder.name;
        const other = await next();
        if (other !== null) {
          decoder.close();
          decoder = other.decoder;
          warnings.push(decoderGaveUp(failed, reading.framesRead, decoder.name));
          reading.again();
          await decoder.decode(recording, reading, signal);
          if (!reading.sameAgain)
            throw new Error(`${failed} gave up, and ${decoder.name} gives other pictures of ${recording.name}`);
        } else if (reading.framesRead === 0) throw nothingToRead(recording.name, recording.cutShort);
      }
      if (signal?.aborted) throw new Stopped();
      if (reading.framesRead === 0) throw nothingToRead(recording.name, recording.cutShort);
      return {
        framesRead: reading.framesRead,
        stoppedEarly: reading.stoppedEarly,
        repeatedFrames: reading.repeatedFrames,
        warnings: [...warnings, ...reading.warnings()],
      };
    },
    close() {
      decoder.close();
      close();
    },
  };
}

type FirstPicture = Pick<DecodedPicture, "width" | "height" | "bitDepth">;

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

function factsOf(
  recording: Recording,
  { width, height, bitDepth }: FirstPicture,
  clock: ReturnType<typeof captureClock>,
  decoder: string,
): FootageFacts {
  const lies = recording.rotation_deg === 90 || recording.rotation_deg === 270;
  return {
    width: lies ? height : width,
    height: lies ? width : height,
    rotation_deg: recording.rotation_deg,
    container: recording.container,
    codec: recording.codec,
    framesExpected: recording.ticks.length || null,
    durationExpected_s: recording.promised_s === null ? null : recording.promised_s * clock.factor,
    timeResolution_s: seconds(recording, 1) * clock.factor,
    timeFactor: clock.factor,
    timeFactorFrom: clock.from,
    decoder,
    bitDepth,
  };
}

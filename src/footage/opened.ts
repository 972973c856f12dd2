import type { DecoderChoice } from "./decoder-choice.ts";
import type { FootageFacts, FootageSettings } from "./footage.ts";
import { type Recording, seconds } from "./recording.ts";
import { type CaptureClock, captureClock } from "./time/capture-clock.ts";

/** A recording that is described and can be decoded, before it is known what for. */
export interface Opened {
  readonly recording: Recording;
  readonly choice: DecoderChoice;
  readonly settings: FootageSettings;
  close(): void;
}

/** By what factor the recording's seconds become capture seconds. */
export const clockOf = ({ recording, settings }: Opened): CaptureClock =>
  captureClock(recording.containerRate_hz, settings.captureFps, recording.captureRateTag_hz);

/** What is known of an opened recording, in capture time and upright. */
export function factsOf(opened: Opened): FootageFacts {
  const { recording, choice } = opened;
  const { width, height, bitDepth } = choice.first;
  const clock = clockOf(opened);
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
    decoder: choice.decoder.name,
    bitDepth,
  };
}

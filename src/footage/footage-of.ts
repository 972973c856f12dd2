import { Stopped, type Warning } from "../quantities/index.ts";
import { DecoderFailure } from "./decoder.ts";
import type { Footage } from "./footage.ts";
import { clockOf, factsOf, type Opened } from "./opened.ts";
import { Reading } from "./reading.ts";
import { nothingToRead } from "./refusals.ts";
import { rateChanges } from "./time/intervals.ts";
import { decoderGaveUp, decodersDiffer } from "./warnings.ts";

/** Makes an opened recording readable from its first frame to its last. */
export function footageOf(opened: Opened): Footage {
  const { recording, choice } = opened;
  const clock = clockOf(opened);
  const standing: Warning[] = [...recording.warnings, ...clock.warnings, ...rateChanges(recording.ticks)];
  return {
    get facts() {
      return factsOf(opened);
    },
    async read(receive, signal) {
      const reading = new Reading(recording, clock.factor, receive);
      const failures: { decoder: string; frame: number }[] = [];
      for (;;) {
        try {
          await choice.decoder.decode(recording, reading, signal);
          break;
        } catch (error) {
          if (!(error instanceof DecoderFailure)) throw error;
          failures.push({ decoder: choice.decoder.name, frame: reading.framesRead });
          if (!(await choice.another(error))) break;
          reading.again();
        }
      }
      if (signal?.aborted) throw new Stopped();
      if (reading.framesRead === 0) throw nothingToRead(recording.name, recording.cutShort);
      const told = reading.sameAgain ? decoderGaveUp : decodersDiffer;
      return {
        framesRead: reading.framesRead,
        stoppedEarly: reading.stoppedEarly,
        repeatedFrames: reading.repeatedFrames,
        warnings: [
          ...standing,
          ...failures.map(({ decoder, frame }) => told(decoder, frame, choice.decoder.name)),
          ...reading.warnings(),
        ],
      };
    },
    close: opened.close,
  };
}

import { type DecodedPicture, type Decoder, DecoderFailure } from "../../src/footage/decoder.ts";
import type { Recording } from "../../src/footage/recording.ts";
import { pulledDecoder } from "../../src/footage/samples/pulled-decoder.ts";

/** A recording of so many frames, 100 ticks a second and 10 ticks apart, for decoders that only pretend. */
export function pretendRecording(frames: number, changes: Partial<Recording> = {}): Recording {
  return {
    name: "pretend.mp4",
    kind: "iso-bmff",
    container: "mp4",
    codec: "avc1.64001f",
    track: 0,
    rotation_deg: 0,
    tick: { numerator: 1, denominator: 100 },
    ticks: Float64Array.from({ length: frames }, (_, i) => 40 + 10 * i),
    firstPacketTicks: 40,
    keeps: () => true,
    containerRate_hz: 10,
    captureRateTag_hz: null,
    cutShort: false,
    promised_s: frames / 10,
    warnings: [],
    ...changes,
  };
}

/** How a pretending decoder behaves. */
export interface Pretence {
  /** Grey level of frame i; i by default. */
  readonly level?: (frame: number) => number;
  /** Frames after which it fails, the first time or each time. */
  readonly fails?: { readonly after: number; readonly once?: boolean; readonly cause?: Error };
  /** Frames it skips. */
  readonly lacks?: readonly number[];
  /** Told where each pass begins. */
  readonly began?: (frame: number) => void;
}

/** A decoder whose pictures are 4 × 2 pixels of one grey level. */
export function pretendDecoder(name: string, recording: Recording, pretence: Pretence = {}): Decoder {
  const { level = (frame: number) => frame, lacks = [], began } = pretence;
  let { fails } = pretence;
  const luma = new Uint8Array(8);
  return pulledDecoder(name, async function* (fromTicks, wants): AsyncGenerator<DecodedPicture, void, undefined> {
    const start = fromTicks === null ? 0 : recording.ticks.findIndex((ticks) => ticks >= fromTicks);
    began?.(start);
    for (let i = start; i < recording.ticks.length; i++) {
      const ticks = recording.ticks[i]!;
      if (fails && i >= fails.after) {
        const { cause, once } = fails;
        if (once) fails = undefined;
        throw new DecoderFailure("pretended", { cause });
      }
      if (lacks.includes(i) || !wants(ticks)) continue;
      luma.fill(level(i));
      yield { ticks, width: 4, height: 2, bitDepth: 8, luma };
    }
  });
}

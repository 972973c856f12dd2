import type { Warning } from "../quantities/index.ts";
import type { ContainerKind } from "./container/sniff.ts";
import type { QuarterTurn } from "./picture/upright.ts";

/** What the container says of the recording, before any picture is decoded. Times are whole ticks of one clock. */
export interface Recording {
  /** File name, for messages. */
  readonly name: string;
  readonly kind: ContainerKind;
  /** As standards name them: `mp4`, `avc1.64001f`. */
  readonly container: string;
  readonly codec: string;
  /** Which of the video tracks is read, counted from 0 in the file's order. */
  readonly track: number;
  /** Clockwise turn that stands the picture upright. */
  readonly rotation_deg: QuarterTurn;
  /** Seconds of container time a tick lasts, as the fraction the container keeps. */
  readonly tick: { readonly numerator: number; readonly denominator: number };
  /** Rising times in ticks of every frame that belongs to the recording, as the container lists them. */
  readonly ticks: Float64Array;
  /** Time of the first packet as stored (decode order), before any edit list: where another demuxer's clock is tied to. */
  readonly firstPacketTicks: number;
  /** Whether a frame of this time belongs to the recording (edit lists). */
  keeps(ticks: number): boolean;
  /** Frames per container second, from the middle frame interval; null when there is one frame. */
  readonly containerRate_hz: number | null;
  /** Capture rate by the recording's own tag, frames per second. */
  readonly captureRateTag_hz: number | null;
  /** Whether bytes are missing at the end of the file. */
  readonly cutShort: boolean;
  /** Container seconds from the first frame to the end, by the container's word; null where it doesn't say. */
  readonly promised_s: number | null;
  readonly warnings: readonly Warning[];
}

/** Container seconds between two times of a recording. */
export const seconds = (recording: Pick<Recording, "tick">, ticks: number): number =>
  (ticks * recording.tick.numerator) / recording.tick.denominator;

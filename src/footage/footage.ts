import type { AbortSignalLike, Appetite, Frame, Warning } from "../quantities/index.ts";

/** What is known of a recording before (and, where marked, after) its frames are read. */
export interface FootageFacts {
  /** Size of the upright picture, pixels. */
  readonly width: number;
  readonly height: number;
  /** Degrees clockwise by which the coded picture was turned to stand upright: 0, 90, 180, 270. */
  readonly rotation_deg: 0 | 90 | 180 | 270;
  /** Container and codec as their standards name them: `mp4`, `avc1.64001f`. */
  readonly container: string;
  readonly codec: string;
  /** Frames the container promises; null where it doesn't say. */
  readonly framesExpected: number | null;
  /** Capture duration the container promises, seconds; null where it doesn't say. */
  readonly durationExpected_s: number | null;
  /** Smallest step of the container's clock, seconds of capture time. */
  readonly timeResolution_s: number | null;
  /** Container seconds are multiplied by this to give capture seconds: 1, or recorded rate over capture rate. */
  readonly timeFactor: number;
  /** Who said so: the trial, the recording's own tag, or nobody. */
  readonly timeFactorFrom: "trial" | "recording tag" | "none";
  /** The decoder that reads it, with version: `webcodecs`, `libavcodec native`, `ffmpeg core 0.12.10 (wasm)`. */
  readonly decoder: string;
  readonly bitDepth: number;
}

/** What reading told: how many frames came, and what was odd about them. */
export interface ReadReport {
  readonly framesRead: number;
  /** True when the receiver said "enough" before the end. */
  readonly stoppedEarly: boolean;
  /**
   * Index of every frame whose picture is, to the last bit, the one before: filled in by a converter or by a camera that
   * missed its time. Nothing was seen at its time; it is no sign of rest.
   */
  readonly repeatedFrames: readonly number[];
  readonly warnings: readonly Warning[];
}

/**
 * An opened recording. Every way of decoding obeys this one interface and gives the same bytes: luma as it is stored,
 * in the recording's own range (16 … 235 in most, 0 … 255 in Motion JPEG), deeper samples rounded to 8 bits. Only
 * recordings that store red, green and blue have their luma computed (ITU-R BT.601).
 *
 * `read` delivers every frame from the first, in order of capture time, each upright and with its own capture time,
 * and waits for the receiver before the next: memory doesn't grow with length. The receiver works synchronously,
 * since one decoder (the WebAssembly one) runs to its end without letting go of the thread; the others decode
 * ahead on their own threads meanwhile. `read` may be called again: it starts from the first frame anew.
 */
export interface Footage {
  readonly facts: FootageFacts;
  /**
   * Reads frames until the end or until the receiver has had enough.
   * @throws InputError when nothing can be decoded; Stopped when the signal is raised.
   */
  read(receive: (frame: Frame) => Appetite, signal?: AbortSignalLike): Promise<ReadReport>;
  /** Closes what was opened. Safe to call twice. */
  close(): void;
}

/** Settings that can change the numbers. */
export interface FootageSettings {
  /** True capture rate of slow-motion footage, frames per second, as the trial states it. */
  readonly captureFps?: number;
  /** Which decoder to use: the best that works, or one by name. */
  readonly decoder?: "auto" | "native" | "wasm";
}

/**
 * One picture of the recording: its luma only, upright, one byte a pixel.
 *
 * `luma` is row-major with no padding (`luma[y * width + x]`, y down). It is *borrowed*: the reader that
 * delivered the frame reuses the memory as soon as the receiver returns, so keep a copy or keep nothing.
 */
export interface Frame {
  /** Decoded frames counted from 0. */
  readonly index: number;
  /** Capture time in seconds since the first frame, from container timestamps (and the capture rate of slow motion). */
  readonly t_s: number;
  readonly width: number;
  readonly height: number;
  readonly luma: Uint8Array;
}

/** What a receiver of frames answers: go on, or stop reading here. */
export type Appetite = "more" | "enough";

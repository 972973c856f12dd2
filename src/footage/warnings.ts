import type { Warning } from "../quantities/index.ts";

export const severalTracks = (count: number, used: number): Warning => ({
  code: "several-video-tracks",
  message: `The recording has ${count} video tracks; number ${used} was measured.`,
});

export const pixelsNotSquare = (wide: number, high: number): Warning => ({
  code: "pixels-not-square",
  message: `The recording says that its pixels are ${wide}:${high} as wide as high. Positions are in stored pixels: the scale holds along one direction only. Record with square pixels.`,
});

export const slowMotionMarks: Warning = {
  code: "slow-motion-marks",
  message:
    "The phone marked parts of the recording to be played slowly. Its stored times are taken as capture times; if the recording was exported or shared first, state clock.capture_fps.",
};

export const outOfOrder = (count: number): Warning => ({
  code: "frames-out-of-order",
  message: `${count} ${count === 1 ? "frame has" : "frames have"} a time no later than the frame before and ${count === 1 ? "was" : "were"} left out.`,
});

export const framesMissing = (missing: number, expected: number): Warning => ({
  code: "frames-undecoded",
  message: `${missing} of ${expected} frames could not be decoded; the others keep their own times.`,
});

export const framesRepeated = (repeated: number, read: number): Warning => ({
  code: "frames-repeated",
  message: `${repeated} of ${read} frames are exact copies of the frame before: a converter or messenger put them in to even out the rate, or its compression saw no change. They show nothing new; measure the untouched original if you have it.`,
});

/** @param lost_s capture seconds lost at the end, null when the file doesn't tell */
export const cutOff = (decoded: number, expected: number | null, lost_s: number | null): Warning => ({
  code: "recording-cut-off",
  message: `The recording is cut off: ${decoded}${expected === null || expected <= decoded ? "" : ` of ${expected}`} frames could be decoded, and ${
    lost_s === null ? "how much time is lost is not known" : `${lost_s.toFixed(2)} s of it are lost`
  }. What there is was measured; copy the recording again for the rest.`,
});

export const decoderGaveUp = (decoder: string, frame: number, other: string): Warning => ({
  code: "decoder-changed",
  message:
    decoder === other
      ? `The decoder ${decoder} was interrupted at frame ${frame} and began anew; it gave the same pictures up to there.`
      : `The decoder ${decoder} gave up at frame ${frame}; the whole recording was decoded with ${other}, which gave the same pictures up to there.`,
});

export const decodersDiffer = (decoder: string, frame: number, other: string): Warning => ({
  code: "decoders-differ",
  message: `The decoder ${decoder} gave up at frame ${frame}, and ${other} gives other pictures before it, so the recording is damaged. Only what came before was measured.`,
});

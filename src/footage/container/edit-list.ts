import type { Warning } from "../../quantities/index.ts";

/** One entry of an edit list (ISO/IEC 14496-12, `elst`). */
export interface Edit {
  /** Length in ticks of the movie's clock; 0 means to the end. */
  readonly duration: number;
  /** Where it starts in the track, ticks of the track's clock; −1 is an empty edit (a delay). */
  readonly mediaTime: number;
  readonly rate: number;
}

/** What is needed to apply an edit list: the entries and both clocks, ticks a second. */
export interface EditList {
  readonly edits: readonly Edit[];
  readonly movieTimescale: number;
  readonly mediaTimescale: number;
}

/** Which frames of a track are part of the recording as it is meant to be seen. */
export interface EditRule {
  /** Whether a frame of this media time (ticks of the track's clock) is kept. */
  keeps(mediaTicks: number): boolean;
  readonly warnings: readonly Warning[];
}

/**
 * Keeps the frames whose media time lies in the union of the edits that play at rate 1. Without such an edit, and
 * without a list, every frame is kept. Decoding libraries disagree about edit lists, so none of them is asked.
 */
export function editRule({ edits, movieTimescale, mediaTimescale }: EditList): EditRule {
  const shown = edits.filter((edit) => edit.mediaTime >= 0);
  const spans = shown
    .filter((edit) => edit.rate === 1)
    .map(({ mediaTime, duration }) => ({
      from: mediaTime,
      // The end is kept in units of 1 / (both timescales), whole numbers, so that no frame is won or lost to rounding.
      end: duration === 0 ? Number.POSITIVE_INFINITY : mediaTime * movieTimescale + duration * mediaTimescale,
    }));
  const warnings: Warning[] = [];
  if (shown.length > 1)
    warnings.push({
      code: "edited-recording",
      message: `The recording was put together from ${shown.length} pieces by an editor; frames of all pieces are measured on the camera's own clock. Measure the untouched original if you have it.`,
    });
  if (shown.some((edit) => edit.rate !== 1))
    warnings.push({
      code: "edited-rate",
      message:
        "The recording asks to be played at another speed than it was stored; its stored times are used. Measure the untouched original if you have it.",
    });
  return {
    keeps: (ticks) =>
      spans.length === 0 || spans.some(({ from, end }) => ticks >= from && ticks * movieTimescale < end),
    warnings,
  };
}

/**
 * Seconds that the demuxing library adds to media time because of the edit list: it honours leading empty edits and
 * the start of the first other edit if that plays at rate 1, and nothing else.
 */
export function libraryShift_s({ edits, movieTimescale, mediaTimescale }: EditList): number {
  let delay = 0;
  for (const edit of edits) {
    if (edit.mediaTime === -1) delay += edit.duration;
    else return edit.rate === 1 ? delay / movieTimescale - edit.mediaTime / mediaTimescale : 0;
  }
  return 0;
}

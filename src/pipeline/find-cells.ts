import type { Footage, ReadReport } from "../footage/index.ts";
import {
  type Context,
  type Frame,
  InputError,
  type Sightings,
  SightingsBuilder,
  throwIfStopped,
} from "../quantities/index.ts";
import { type FrameNote, learnScene, type Scene, Spotter, Survey, type VisionSettings } from "../vision/index.ts";

/** Everything found in the pictures of a recording. */
export interface Found {
  readonly scene: Scene;
  readonly sightings: Sightings;
  /** One for each frame. */
  readonly notes: readonly FrameNote[];
  readonly times_s: Float64Array;
  readonly report: ReadReport;
}

/**
 * Reads the recording and finds the cells in every frame. A short clip is decoded once and kept; of a longer one the first
 * stretch is looked at to learn the scene, then all of it is read again from the start, so that memory doesn't grow.
 *
 * @throws InputError when the recording has fewer than two frames; Stopped when the signal is raised
 */
export async function findCells(
  footage: Footage,
  recording: string,
  settings: VisionSettings,
  context: Context,
): Promise<Found> {
  const survey = new Survey(settings.surveySpan_s);
  const expected = footage.facts.framesExpected;
  let seen = 0;
  const surveyed = await footage.read((frame) => {
    if (seen++ % 8 === 0) context.progress?.({ stage: "looking at the scene", done: frame.index, total: expected });
    return survey.take(frame);
  }, context.signal);
  throwIfStopped(context.signal);
  if (surveyed.framesRead < 2) throw tooFewFrames(surveyed.framesRead, recording);
  context.progress?.({ stage: "learning the scene", done: 0, total: null });
  const { scene, whitener } = learnScene(survey, settings);
  const spotter = new Spotter(scene, whitener);
  const builder = new SightingsBuilder();
  const notes: FrameNote[] = [];
  const times: number[] = [];
  const kept = survey.everyFrame;
  const total = kept?.length ?? expected;
  const take = (frame: Frame) => {
    throwIfStopped(context.signal);
    if (frame.index % 4 === 0) context.progress?.({ stage: "finding cells", done: frame.index, total });
    notes.push(spotter.spot(frame, builder));
    times.push(frame.t_s);
  };
  let report = surveyed;
  if (kept) {
    for (const { index, t_s, luma } of kept) take({ index, t_s, luma, width: survey.width, height: survey.height });
  } else {
    report = await footage.read((frame) => {
      take(frame);
      return "more";
    }, context.signal);
  }
  const repeated = new Set(report.repeatedFrames);
  return { scene, sightings: without(builder.seal(), repeated), notes, times_s: Float64Array.from(times), report };
}

/** A frame that shows the one before again says nothing about where cells were at its own time. */
function without(sightings: Sightings, frames: ReadonlySet<number>): Sightings {
  if (frames.size === 0) return sightings;
  const kept = new SightingsBuilder();
  for (let i = 0; i < sightings.count; i++) {
    if (frames.has(sightings.frame[i] as number)) continue;
    kept.add({
      frame: sightings.frame[i] as number,
      x_px: sightings.x_px[i] as number,
      y_px: sightings.y_px[i] as number,
      seX_px: sightings.seX_px[i] as number,
      seY_px: sightings.seY_px[i] as number,
      snr: sightings.snr[i] as number,
      contrast: sightings.contrast[i] as number,
      major_px: sightings.major_px[i] as number,
      minor_px: sightings.minor_px[i] as number,
      axis_rad: sightings.axis_rad[i] as number,
    });
  }
  return kept.seal();
}

function tooFewFrames(frames: number, recording: string): InputError {
  return new InputError(
    "too-few-frames",
    frames === 1 ? "The recording has only one frame, and motion takes at least two." : "The recording has no frame.",
    recording,
    "Give a recording that shows cells moving, half a second long or more.",
  );
}

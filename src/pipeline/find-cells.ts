import type { Footage, ReadReport } from "../footage/index.ts";
import {
  type Appetite,
  type Context,
  type Frame,
  InputError,
  type Sightings,
  SightingsBuilder,
  throwIfStopped,
} from "../quantities/index.ts";
import {
  type FrameNote,
  learnScene,
  type Sample,
  type Scene,
  Spotter,
  Survey,
  type VisionSettings,
} from "../vision/index.ts";

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
 * Reads the recording and finds the cells in every frame. The first stretch is kept in memory; once the scene has been
 * learnt from it, its frames are gone through and the rest follows as it is decoded. Only when that stretch is too large to
 * be kept is the recording read again from the start. Memory doesn't grow with length.
 *
 * @throws InputError when the recording has fewer than two frames; Stopped when the signal is raised
 */
export async function findCells(
  footage: Footage,
  recording: string,
  settings: VisionSettings,
  context: Context,
): Promise<Found> {
  const search = new Search(footage.facts.framesExpected, settings, context);
  let report = await footage.read((frame) => search.take(frame), context.signal);
  throwIfStopped(context.signal);
  if (report.framesRead < 2) throw tooFewFrames(report.framesRead, recording);
  if (search.needsAnotherReading()) report = await footage.read((frame) => search.take(frame), context.signal);
  throwIfStopped(context.signal);
  return search.finish(report);
}

/** Takes frames as they are read: first into the survey, then, the scene being known, to be searched for cells. */
class Search {
  private readonly total: number | null;
  private readonly context: Context;
  private readonly survey: Survey;
  private readonly settings: VisionSettings;
  private known: { readonly scene: Scene; readonly spotter: Spotter } | null = null;
  private readonly sightings = new SightingsBuilder();
  private readonly notes: FrameNote[] = [];
  private readonly times: number[] = [];
  private surveyed = false;

  constructor(total: number | null, settings: VisionSettings, context: Context) {
    this.total = total;
    this.settings = settings;
    this.context = context;
    this.survey = new Survey(settings.surveySpan_s);
  }

  take(frame: Frame): Appetite {
    throwIfStopped(this.context.signal);
    if (this.surveyed) {
      this.look(frame);
      return "more";
    }
    if (frame.index % 4 === 0) this.tell("looking at the scene", frame.index);
    if (this.survey.take(frame) === "more") return "more";
    return this.learn() ? "more" : "enough";
  }

  /** After a reading: the recording may have ended before the survey had enough, or been too large to keep. */
  needsAnotherReading(): boolean {
    if (!this.surveyed) this.learn();
    return this.times.length === 0;
  }

  finish(report: ReadReport): Found {
    const { scene } = this.known as { readonly scene: Scene };
    const sightings = without(this.sightings.seal(), new Set(report.repeatedFrames));
    return { scene, sightings, notes: this.notes, times_s: Float64Array.from(this.times), report };
  }

  /** Learns the scene, and looks at the frames kept. Returns false when they weren't. */
  private learn(): boolean {
    this.surveyed = true;
    this.context.progress?.({ stage: "learning the scene", done: 0, total: null });
    const { survey } = this;
    const { scene, whitener } = learnScene(survey, this.settings);
    this.known = { scene, spotter: new Spotter(scene, whitener) };
    const kept = survey.release();
    if (!kept) return false;
    for (let i = 0; i < kept.length; i++) {
      throwIfStopped(this.context.signal);
      const { index, t_s, luma } = kept[i] as Sample;
      this.look({ index, t_s, luma, width: survey.width, height: survey.height });
    }
    return true;
  }

  private look(frame: Frame): void {
    if (frame.index % 4 === 0) this.tell("finding cells", frame.index);
    const { spotter } = this.known as { readonly spotter: Spotter };
    this.notes.push(spotter.spot(frame, this.sightings));
    this.times.push(frame.t_s);
  }

  private tell(stage: string, done: number): void {
    this.context.progress?.({ stage, done, total: this.total });
  }
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

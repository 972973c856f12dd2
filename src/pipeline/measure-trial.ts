import { analyseMotion } from "../analysis/motion/index.ts";
import { judgeFootage } from "../analysis/quality/index.ts";
import type { Footage } from "../footage/index.ts";
import {
  type Context,
  duration_s,
  type MeasuredTrial,
  type Scale,
  type SourceFacts,
  throwIfStopped,
  type View,
} from "../quantities/index.ts";
import { median } from "../statistics/index.ts";
import { trackCells } from "../tracking/index.ts";
import { describeTrial, type TrialDescription } from "../trial/index.ts";
import { type Found, findCells } from "./find-cells.ts";
import type { MeasureSettings } from "./settings.ts";
import { warningsOfTrial } from "./warnings.ts";

/** What the measuring of a trial needs from whoever runs it. */
export interface MeasurePorts {
  readonly footage: Footage;
  /** Name of the recording and the SHA-256 of its bytes, lower-case hexadecimal. */
  readonly recording: { readonly name: string; readonly sha256: string };
  readonly tool: { readonly name: string; readonly version: string };
}

/**
 * Measures one trial: footage → sightings → paths → motion and quality. The same bytes and settings give the same result.
 *
 * @throws InputError when the recording can't be measured; Stopped when the context's signal is raised
 */
export async function measureTrial(
  trial: TrialDescription,
  ports: MeasurePorts,
  settings: MeasureSettings,
  context: Context,
): Promise<MeasuredTrial> {
  const found = await findCells(ports.footage, ports.recording.name, settings.vision, context);
  const { scene, sightings, times_s } = found;
  const { paths, neighbourDistance_px } = trackCells(
    sightings,
    times_s,
    { width: scene.width, height: scene.height, circle: scene.circle, area_px2: scene.area_px2 },
    settings.tracking,
    context,
  );
  throwIfStopped(context.signal);
  context.progress?.({ stage: "working out speeds", done: 0, total: null });
  const scale = scaleOf(trial);
  const motion = analyseMotion(paths, medianInterval_s(times_s), scale, settings.motion);
  const shift = {
    x_px: Float32Array.from(found.notes, (n) => n.shift.x),
    y_px: Float32Array.from(found.notes, (n) => n.shift.y),
  };
  const typicalSpeed_px_s = motion.speed.median_px_s;
  const quality = judgeFootage({
    times_s,
    repeatedFrames: found.report.repeatedFrames.length,
    framesExpected: ports.footage.facts.framesExpected,
    shift: scene.steady ? shift : null,
    gain: Float32Array.from(found.notes, (n) => n.exposure.gain),
    falseAlarmsPerFrame: meanFalseAlarms(found),
    litShare: scene.area_px2 / (scene.width * scene.height),
    clippedShare: clippedShare(scene.still.level, scene.inView),
    spotSigma_px: sightings.count > 0 ? scene.kind.sigma_px : null,
    minor_px: sightings.minor_px,
    snr: sightings.snr,
    neighbourDistance_px,
    pathDurations_s: Array.from({ length: paths.count }, (_, p) => duration_s(paths, p)),
    typicalSpeed_px_s,
  });
  return {
    trial: trial.trial,
    strain: trial.strain,
    culture: trial.culture,
    condition: trial.condition,
    source: sourceOf(ports, found),
    settings: { trial: describeTrial(trial), ...settings, found: { velocity_window_s: motion.window_s } },
    tool: ports.tool,
    scale,
    frameTimes_s: times_s,
    shift,
    view: viewOf(found),
    sightings,
    paths,
    cells: motion.cells,
    speed: motion.speed,
    drift: motion.drift,
    quality,
    warnings: [...found.report.warnings, ...warningsOfTrial(trial, found), ...motion.warnings],
  };
}

function scaleOf({ scale }: TrialDescription): Scale | null {
  if (scale?.from !== "numbers") return null;
  return { um_per_px: scale.um_per_px, uncertainty_um_per_px: scale.uncertainty_um_per_px, from: "trial.json" };
}

function sourceOf({ footage, recording }: MeasurePorts, { times_s, report }: Found): SourceFacts {
  const { facts } = footage;
  const interval_s = medianInterval_s(times_s);
  return {
    recording: recording.name,
    sha256: recording.sha256,
    frames: report.framesRead,
    // A frame lasts until the next: so does the last.
    duration_s: (times_s.at(-1) as number) + interval_s,
    fps_median: 1 / interval_s,
    width_px: facts.width,
    height_px: facts.height,
    decoder: facts.decoder,
    container: facts.container,
    codec: facts.codec,
    rotation_deg: facts.rotation_deg,
    timeFactor: facts.timeFactor,
    timeFactorFrom: facts.timeFactorFrom,
    framesExpected: facts.framesExpected,
  };
}

function viewOf({ scene }: Found): View {
  return {
    width: scene.width,
    height: scene.height,
    background: Uint8Array.from(scene.still.level, (v) => Math.max(0, Math.min(255, Math.round(v)))),
    circle: scene.circle,
    still: scene.stillSpots,
  };
}

/** Part of the view that is all but black or white. */
function clippedShare(level: Float32Array, inView: Uint8Array): number {
  let clipped = 0;
  let lit = 0;
  level.forEach((v, i) => {
    if (inView[i] === 0) return;
    lit++;
    if (v > 250 || v < 4) clipped++;
  });
  return lit > 0 ? clipped / lit : 1;
}

function medianInterval_s(times_s: Float64Array): number {
  return median(
    Array.from({ length: times_s.length - 1 }, (_, i) => (times_s[i + 1] as number) - (times_s[i] as number)),
  );
}

/** Over the frames in which they were counted; null when in none. */
function meanFalseAlarms({ notes }: Found): number | null {
  const counted = notes.flatMap((n) => n.falseAlarms ?? []);
  return counted.length > 0 ? counted.reduce((sum, n) => sum + n, 0) / counted.length : null;
}

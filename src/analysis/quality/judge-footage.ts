import type { QualityCheck } from "../../quantities/index.ts";
import { median, quantile } from "../../statistics/index.ts";
import type { FootageEvidence } from "./evidence.ts";

type Verdict = QualityCheck["verdict"];

/**
 * What of the footage limits its figures: each check with its figure, a verdict, and what to do when filming again.
 * The bounds between verdicts are common practice, no source.
 */
export function judgeFootage(e: FootageEvidence): QualityCheck[] {
  return [
    contrast(e),
    focus(e),
    crowding(e),
    frameRate(e),
    droppedFrames(e),
    repeatedFrames(e),
    pathLength(e),
    falseAlarms(e),
    shake(e),
    exposure(e),
    exposureDrift(e),
    fieldOfView(e),
  ];
}

function contrast(e: FootageEvidence): QualityCheck {
  const figure = e.snr.length > 0 ? median(Array.from(e.snr)) : null;
  return check("contrast", figure, "signal over noise", higherIsBetter(figure, 15, 8), {
    good: "Cells stand out clearly.",
    fair: "Cells stand out, but not far above the noise: more light or a lower camera gain would place them better.",
    poor: "Cells hardly stand out of the noise, and some will be missed: use more light, a lower camera gain or more optical contrast.",
    unknown: "No cell was seen, so its contrast can't be told.",
  });
}

function focus(e: FootageEvidence): QualityCheck {
  const widths = Array.from(e.minor_px);
  const sharp = widths.length > 0 ? quantile(widths, 0.2) : null;
  const figure = sharp === null ? null : widths.filter((w) => w > 1.6 * sharp).length / widths.length;
  return check("focus", figure, "share of sightings blurred", lowerIsBetter(figure, 0.15, 0.4), {
    good: "Nearly all cells are as sharp as the sharpest.",
    fair: "Part of the cells are out of focus: a shallower chamber keeps them in focus longer.",
    poor: "Most cells are out of focus: focus again, or use a shallower chamber.",
    unknown: "No cell was seen, so focus can't be told.",
  });
}

function crowding(e: FootageEvidence): QualityCheck {
  const size = e.spotSigma_px;
  const figure = size === null || e.neighbourDistance_px === null ? null : e.neighbourDistance_px / size;
  return check("crowding", figure, "distance to the next cell over cell size", higherIsBetter(figure, 12, 7), {
    good: "Cells are well apart.",
    fair: "Cells often come close: some may be taken for one another as they cross.",
    poor: "Cells touch often and will be taken for one another: dilute the sample.",
    unknown: "Fewer than two cells were seen at a time, so crowding can't be told.",
  });
}

function frameRate(e: FootageEvidence): QualityCheck {
  const known = e.typicalSpeed_px_s !== null && e.neighbourDistance_px !== null && e.times_s.length > 1;
  const figure = known ? ((e.typicalSpeed_px_s as number) * interval_s(e)) / (e.neighbourDistance_px as number) : null;
  return check(
    "frame_rate",
    figure,
    "step per frame over distance to the next cell",
    lowerIsBetter(figure, 0.25, 0.5),
    {
      good: "Frames follow one another fast enough to tell cells apart.",
      fair: "Cells go far between frames for how dense they are: a higher frame rate or fewer cells would be safer.",
      poor: "Cells go so far between frames that they may be taken for one another: use a higher frame rate or dilute the sample.",
      unknown: "Nothing swam among others, so the frame rate needn't be judged.",
    },
  );
}

function droppedFrames(e: FootageEvidence): QualityCheck {
  const interval = interval_s(e);
  let missing = 0;
  for (let i = 1; i < e.times_s.length; i++) {
    const gap = (e.times_s[i] as number) - (e.times_s[i - 1] as number);
    if (gap > 1.7 * interval) missing += Math.round(gap / interval) - 1;
  }
  const figure = e.times_s.length > 1 ? missing / (missing + e.times_s.length) : null;
  return check("dropped_frames", figure, "share of frames missing", lowerIsBetter(figure, 0.01, 0.05), {
    good: "Hardly a frame is missing.",
    fair: "Some frames are missing; their times are allowed for. Close other apps on the phone, or film at a lower rate.",
    poor: "Many frames are missing, and paths break at the gaps: film at a lower rate, or with another camera.",
    unknown: "There are too few frames to tell.",
  });
}

function repeatedFrames(e: FootageEvidence): QualityCheck {
  const figure = e.times_s.length > 1 ? e.repeatedFrames / e.times_s.length : null;
  return check("repeated_frames", figure, "share of frames repeated", lowerIsBetter(figure, 0.01, 0.1), {
    good: "Hardly a frame is shown twice.",
    fair: "Some frames are shown twice and were left out. Measure the file as the camera wrote it, not a copy from a messenger.",
    poor: "Many frames are shown twice: the file was converted to another frame rate. Measure the file as the camera wrote it.",
    unknown: "There are too few frames to tell.",
  });
}

function pathLength(e: FootageEvidence): QualityCheck {
  const figure = e.pathDurations_s.length > 0 ? median(e.pathDurations_s) : null;
  return check("path_length", figure, "s", higherIsBetter(figure, 1.5, 0.7), {
    good: "Cells are followed long enough for their own speeds.",
    fair: "Cells are followed for a short time: a wider field of view or a shallower chamber keeps them longer.",
    poor: "Cells are lost after a moment: use a wider field of view, a shallower chamber or a higher frame rate.",
    unknown: "No cell was followed.",
  });
}

function falseAlarms(e: FootageEvidence): QualityCheck {
  return check("false_alarms", e.falseAlarmsPerFrame, "per frame", lowerIsBetter(e.falseAlarmsPerFrame, 0.5, 2), {
    good: "Noise is hardly ever taken for a cell.",
    fair: "Noise looks like a cell now and then; such sightings rarely make a path. Use more light or less compression.",
    poor: "Noise often looks like a cell: use more light, less compression, and a steadier camera.",
    unknown: "No frame was looked at.",
  });
}

function shake(e: FootageEvidence): QualityCheck {
  const figure = e.shift ? rootMeanSquareStep(e.shift.x_px, e.shift.y_px) : null;
  return check("shake", figure, "px per frame", lowerIsBetter(figure, 1, 4), {
    good: "The picture hardly shakes; what shake there was has been taken out.",
    fair: "The picture shakes; that has been taken out, but blurs it. Hold the phone with an adapter.",
    poor: "The picture shakes much: fix the camera to the microscope.",
    unknown: "There is nothing in the picture that stays in place, so shake could not be measured or taken out.",
  });
}

function exposure(e: FootageEvidence): QualityCheck {
  return check(
    "exposure",
    e.clippedShare,
    "share of the view black or white",
    lowerIsBetter(e.clippedShare, 0.01, 0.1),
    {
      good: "The view is neither black nor burnt out anywhere.",
      fair: "Part of the view is black or burnt out: cells there may be missed. Lower or even out the light.",
      poor: "Much of the view is black or burnt out: cells there can't be seen. Set the exposure by hand.",
      unknown: "The view could not be told.",
    },
  );
}

function exposureDrift(e: FootageEvidence): QualityCheck {
  const gains = Array.from(e.gain);
  const figure = gains.length > 0 ? quantile(gains, 0.98) - quantile(gains, 0.02) : null;
  return check("exposure_drift", figure, "share of the brightness gained or lost", lowerIsBetter(figure, 0.1, 0.3), {
    good: "Brightness is steady; what change there was has been allowed for.",
    fair: "Brightness changes during the clip; that has been allowed for. Lock the exposure.",
    poor: "Brightness changes much during the clip: lock the exposure.",
    unknown: "No frame was looked at.",
  });
}

function fieldOfView(e: FootageEvidence): QualityCheck {
  return check("field_of_view", e.litShare, "share of the picture lit", higherIsBetter(e.litShare, 0.35, 0.15), {
    good: "Enough of the picture is used.",
    fair: "Much of the picture is dark: come closer to the eyepiece, or zoom in.",
    poor: "Nearly all of the picture is dark: come closer to the eyepiece, or zoom in.",
    unknown: "The view could not be told.",
  });
}

function interval_s(e: FootageEvidence): number {
  const gaps = Array.from(
    { length: e.times_s.length - 1 },
    (_, i) => (e.times_s[i + 1] as number) - (e.times_s[i] as number),
  );
  return median(gaps);
}

function rootMeanSquareStep(x: Float32Array, y: Float32Array): number {
  let sum = 0;
  for (let i = 1; i < x.length; i++) {
    sum += ((x[i] as number) - (x[i - 1] as number)) ** 2 + ((y[i] as number) - (y[i - 1] as number)) ** 2;
  }
  return Math.sqrt(sum / Math.max(1, x.length - 1));
}

function check(
  name: string,
  figure: number | null,
  unit: string,
  verdict: Verdict,
  advice: Readonly<Record<Verdict, string>>,
): QualityCheck {
  return { check: name, figure, unit, verdict, advice: advice[verdict] };
}

function lowerIsBetter(figure: number | null, good: number, fair: number): Verdict {
  return figure === null ? "unknown" : figure <= good ? "good" : figure <= fair ? "fair" : "poor";
}

function higherIsBetter(figure: number | null, good: number, fair: number): Verdict {
  return figure === null ? "unknown" : figure >= good ? "good" : figure >= fair ? "fair" : "poor";
}

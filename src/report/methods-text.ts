import type { MeasuredTrial } from "../quantities/index.ts";
import { readableAlone, withUncertainty } from "./numbers.ts";

/** A published method: short form as cited in the text, and the full reference. */
export interface Reference {
  readonly short: string;
  readonly full: string;
}

/** Paragraphs for a methods section, plain text, and the publications they cite. */
export interface MethodsText {
  readonly paragraphs: readonly string[];
  readonly references: readonly Reference[];
}

const adler: Reference = {
  short: "Adler 1981",
  full: "Adler RJ. The Geometry of Random Fields. Wiley, Chichester, 1981.",
};
const bernstein: Reference = {
  short: "Bernstein and Jarvis 2002",
  full: "Bernstein GM, Jarvis M. Shapes and shears, stars and smears: optimal measurements for weak lensing. Astron. J. 123, 583–618 (2002).",
};
const huber: Reference = {
  short: "Huber 1964",
  full: "Huber PJ. Robust estimation of a location parameter. Ann. Math. Stat. 35, 73–101 (1964).",
};
const jonker: Reference = {
  short: "Jonker and Volgenant 1987",
  full: "Jonker R, Volgenant A. A shortest augmenting path algorithm for dense and sparse linear assignment problems. Computing 38, 325–340 (1987).",
};
const kalman: Reference = {
  short: "Kalman 1960",
  full: "Kalman RE. A new approach to linear filtering and prediction problems. J. Basic Eng. 82, 35–45 (1960).",
};
const lucas: Reference = {
  short: "Lucas and Kanade 1981",
  full: "Lucas BD, Kanade T. An iterative image registration technique with an application to stereo vision. Proc. 7th Int. Joint Conf. Artif. Intell., 674–679 (1981).",
};
const marquardt: Reference = {
  short: "Marquardt 1963",
  full: "Marquardt DW. An algorithm for least-squares estimation of nonlinear parameters. J. Soc. Ind. Appl. Math. 11, 431–441 (1963).",
};
const rice: Reference = {
  short: "Rice 1945",
  full: "Rice SO. Mathematical analysis of random noise. Bell Syst. Tech. J. 24, 46–156 (1945).",
};
const student: Reference = {
  short: "Student 1908",
  full: "Student. The probable error of a mean. Biometrika 6, 1–25 (1908).",
};
const vestergaard: Reference = {
  short: "Vestergaard et al. 2014",
  full: "Vestergaard CL, Blainey PC, Flyvbjerg H. Optimal estimation of diffusion coefficients from single-particle trajectories. Phys. Rev. E 89, 022726 (2014).",
};
const wilson: Reference = {
  short: "Wilson 1927",
  full: "Wilson EB. Probable inference, the law of succession, and statistical inference. J. Am. Stat. Assoc. 22, 209–212 (1927).",
};

/** In the order of a list of references. */
const references = [adler, bernstein, huber, jonker, kalman, lucas, marquardt, rice, student, vestergaard, wilson];

/** A methods section ready to paste, for what was done to this trial. */
export function methodsText(measured: MeasuredTrial): MethodsText {
  const finding =
    "A still background (mean of the middle quarter of 32 frames of the first seconds, pixel by pixel) was subtracted from " +
    "every frame and the residual divided by the noise, read from the spread over the same frames. The result was " +
    "smoothed with a Gaussian matched to the size of the cells. The threshold was set so that noise alone would rarely " +
    `pass anywhere in a frame, from the expected Euler characteristic of a Gaussian random field (${adler.short}), and ` +
    "raised where the polarity that cells don't have showed more. Cells were located with sub-pixel accuracy by " +
    `adaptive Gaussian-weighted moments (${bernstein.short}), touching ones by a joint least-squares fit ` +
    `(${marquardt.short}).${shakeText(measured)}`;
  const following =
    `Sightings were joined into paths with a Kalman filter (${kalman.short}) that predicts each position over the ` +
    "measured time between frames, and an optimal assignment of sightings to predictions by likelihood " +
    `(${jonker.short}). Pieces of path that fit in place and velocity were joined across gaps.`;
  const judging =
    "A cell was called motile when, over any stretch of its path, it moved farther than diffusion, localisation and flow " +
    "explain (F test of the squared displacement, corrected for the number of stretches and cells), at a chance of " +
    "1\u00a0% that any diffusing cell of the clip is called so. Diffusion and localisation noise were estimated from the " +
    `covariance of successive displacements (${vestergaard.short}). Speeds are slopes of straight lines fitted to short stretches of ` +
    `the path, corrected for what noise adds to their length (${rice.short}), in the image plane.${flowText(measured)}`;
  const counting =
    "The mean speed is over motile cells followed for at least 0.5 s, each cell once, with a 95\u00a0% interval from " +
    `Student's t distribution over cells (${student.short})${ofScale(measured)}. The motile share has a Wilson 95\u00a0% interval ` +
    `(${wilson.short}).`;
  const paragraphs = [`${recordingText(measured)} ${finding}`, `${following} ${judging}`, counting];
  const cited = (reference: Reference) => paragraphs.some((text) => text.includes(reference.short));
  return { paragraphs, references: references.filter(cited) };
}

function shakeText({ shift }: MeasuredTrial): string {
  const moved = shift.x_px.some((x) => x !== 0) || shift.y_px.some((y) => y !== 0);
  if (!moved) return " No camera shake was subtracted.";
  return ` Camera shake was measured against texture that stays in place (${lucas.short}), and subtracted.`;
}

function ofScale({ scale }: MeasuredTrial): string {
  if (!scale || scale.uncertainty_um_per_px === 0) return "";
  return ", to which the uncertainty of the scale was added in squares";
}

function flowText({ drift }: MeasuredTrial): string {
  if (!drift) return " No common flow of the fluid was subtracted.";
  const from =
    drift.from === "diffusing cells"
      ? "cells that only diffused"
      : `swimmers that turned, by robust regression (${huber.short})`;
  return ` The common flow of the fluid was measured from ${from}, and subtracted.`;
}

function recordingText({ source, scale, tool }: MeasuredTrial): string {
  const rate = source.fps_median === null ? "" : `, median rate ${readableAlone(source.fps_median)} frames per second`;
  const clock = source.timeFactor === 1 ? "" : `, time rescaled by ${readableAlone(source.timeFactor)}`;
  const sized = scale
    ? `The scale was ${withUncertainty(scale.um_per_px, scale.uncertainty_um_per_px)} µm per pixel.`
    : "No scale was given; lengths are in pixels.";
  return (
    `The recording (${source.width_px} × ${source.height_px} pixels, ${source.frames} frames${rate}${clock}) was ` +
    `measured with Lodewake ${tool.version}. ${sized} Times are capture times from the recording's own time stamps.`
  );
}

import type { Warning } from "../quantities/index.ts";
import type { TrialDescription } from "../trial/index.ts";
import type { Found } from "./find-cells.ts";

/** What the reader of a result must know of the trial itself. */
export function warningsOfTrial(trial: TrialDescription, { scene, sightings }: Found): Warning[] {
  const warnings: Warning[] = [];
  if (trial.scale === null) {
    warnings.push({
      code: "no-scale",
      message:
        "The trial gives no scale, so lengths are in pixels and every figure in micrometres is empty. Add scale.um_per_px and scale.uncertainty_um_per_px to trial.json.",
    });
  } else if (trial.scale.from === "micrometer") {
    warnings.push({
      code: "scale-not-measured",
      message: `Measuring the scale from ${trial.scale.file} is not built yet, so every figure in micrometres is empty. Give scale.um_per_px and scale.uncertainty_um_per_px in trial.json.`,
    });
  }
  if (trial.subject !== "cells") {
    warnings.push({
      code: "front-not-measured",
      message: "Measuring the edge of a spot is not built yet: the front is empty. Single cells were measured.",
    });
  }
  if (trial.field !== null) {
    warnings.push({
      code: "field-not-used",
      message: "Measuring alignment and turns against the field is not built yet: those figures are empty.",
    });
  }
  if (sightings.count === 0) {
    warnings.push({
      code: "no-sightings",
      message: `Nothing that looks like a cell moves in this recording; ${stillSpots(scene.stillSpots.length)}.`,
    });
  }
  if (!scene.steady) {
    warnings.push({
      code: "shake-not-measured",
      message:
        "Nothing in the picture stays in place, so shake of the camera could not be taken out. If the camera was not fixed, speeds include its motion.",
    });
  }
  return warnings;
}

function stillSpots(n: number): string {
  return n === 0 ? "nothing lies still in it either" : n === 1 ? "1 spot lies still" : `${n} spots lie still`;
}

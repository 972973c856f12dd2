import { describe, expect, it } from "vitest";
import { InputError } from "../quantities/index.ts";
import { describeTrial, readTrial } from "./index.ts";

const base = { schema: "lodewake/trial@1", recording: "swim.mp4" };
const read = (more: object) => readTrial(JSON.stringify({ ...base, ...more }), "T07/trial.json");

function refusal(run: () => unknown): InputError {
  try {
    run();
  } catch (error) {
    if (error instanceof InputError) return error;
    throw error;
  }
  throw new Error("nothing was refused");
}

const full = {
  ...base,
  trial: "T07",
  strain: "WT",
  culture: "C2",
  condition: "22 C",
  subject: "both",
  scale: { um_per_px: 0.494, uncertainty_um_per_px: 0.001 },
  clock: { capture_fps: 240 },
  field: {
    steps: [
      { t_s: 0, magnitude_mT: 0.3, angle_deg: 0 },
      { t_s: 5, magnitude_mT: 0.3, angle_deg: 180 },
    ],
    rotation_hz: 0.5,
    ambient_mT: [0.02, -0.04],
  },
  sample: { temperature_C: 22, cell_radius_um: 1 },
};

describe("readTrial", () => {
  it("reads a full description and echoes it in its own shape", () => {
    const { trial, warnings } = readTrial(JSON.stringify(full), "trial.json");
    expect(warnings).toEqual([]);
    expect(trial.scale).toEqual({ from: "numbers", um_per_px: 0.494, uncertainty_um_per_px: 0.001 });
    expect(trial.captureFps).toBe(240);
    expect(trial.field).toMatchObject({ from: "steps", rotation_hz: 0.5, ambient_mT: [0.02, -0.04] });
    expect(describeTrial(trial)).toEqual(full);
  });

  it("fills in defaults and makes what was left out null", () => {
    expect(read({}).trial).toEqual({
      trial: null,
      strain: null,
      culture: null,
      condition: null,
      recording: "swim.mp4",
      subject: "cells",
      scale: null,
      captureFps: null,
      field: null,
      sample: { temperature_C: null, cellRadius_um: null },
    });
    const nulls = { strain: null, scale: null, clock: null, field: null, sample: null };
    expect(read(nulls)).toEqual(read({}));
  });

  it("echoes what it read as something it reads the same", () => {
    const log = { log: "logs/field.csv", coils: { x_mT_per_A: 0.8, y_mT_per_A: -0.7 } };
    for (const more of [{}, full, { scale: { micrometer: "scale.png", division_um: 10 }, field: log }]) {
      const { trial } = read(more);
      expect(readTrial(JSON.stringify(describeTrial(trial)), "echo").trial).toEqual(trial);
    }
  });

  it("reads a micrometer, a log, its clock and coils", () => {
    const { trial } = read({
      scale: { micrometer: "./scale.png", division_um: 10 },
      field: { log: "field.csv", clock_offset_s: "auto", coils: { x_mT_per_A: 1, y_mT_per_A: 2 } },
    });
    expect(trial.scale).toEqual({ from: "micrometer", file: "scale.png", division_um: 10 });
    expect(trial.field).toEqual({
      from: "log",
      file: "field.csv",
      clockOffset_s: "auto",
      coils: { x_mT_per_A: 1, y_mT_per_A: 2, x_deg: 0, y_deg: 90 },
      ambient_mT: [0, 0],
    });
  });

  it("reads a file with a byte order mark", () => {
    expect(readTrial(`\uFEFF${JSON.stringify(base)}`, "trial.json").trial.recording).toBe("swim.mp4");
  });

  it("says where a text stops being JSON", () => {
    const error = refusal(() =>
      readTrial('{\n  "schema": "lodewake/trial@1",\n  "recording": "a.mp4",\n}', "trial.json"),
    );
    expect(error.code).toBe("trial-not-json");
    expect(error.where).toBe("trial.json: line 3, column 23");
    expect(error.message).toBe("This is not valid JSON: at line 3, column 23, a comma stands after the last entry.");
  });

  it.each([
    [[], "The file holds an empty list, but must hold one group of entries, in { }."],
    [{ recording: "a.mp4" }, "schema is missing: nothing says that this file describes a trial."],
    [
      { ...base, schema: "lodewake/trial@2" },
      'schema is "lodewake/trial@2", a version that this Lodewake doesn\'t know; it reads "lodewake/trial@1".',
    ],
    [
      { ...base, schema: "lodewake/summary@1" },
      'schema is the text "lodewake/summary@1", but must be "lodewake/trial@1".',
    ],
    [{ ...base, schema: 1 }, 'schema is 1, but must be "lodewake/trial@1".'],
  ])("refuses what is no trial description: %j", (document, message) => {
    expect(refusal(() => readTrial(JSON.stringify(document), "trial.json")).message).toBe(message);
  });

  it.each([
    ["recording", { recording: undefined }, "recording is missing (file name of the recording)."],
    [
      "recording",
      { recording: 7 },
      "recording is 7, but must be text in double quotes, up to 1024 characters (file name of the recording).",
    ],
    ["recording", { recording: "" }, 'recording is the text "", but must be'],
    [
      "strain",
      { strain: 12 },
      "strain is 12, but must be text in double quotes, up to 200 characters (name of the strain).",
    ],
    [
      "subject",
      { subject: "cell" },
      'subject is the text "cell", but must be "cells", "spot" or "both" (what to measure).',
    ],
    ["scale", { scale: 0.494 }, "scale is 0.494, but must be a group of entries, in { } (size of a picture element)."],
    [
      "scale.um_per_px",
      { scale: { um_per_px: -0.494, uncertainty_um_per_px: 0 } },
      "scale.um_per_px is -0.494, but must be a number greater than 0 (micrometres per pixel).",
    ],
    [
      "scale.um_per_px",
      { scale: { um_per_px: 0, uncertainty_um_per_px: 0 } },
      "scale.um_per_px is 0, but must be a number greater than 0",
    ],
    [
      "scale.um_per_px",
      { scale: { um_per_px: "0.494" } },
      'scale.um_per_px is the text "0.494", but must be a number greater than 0',
    ],
    ["scale.um_per_px", { scale: {} }, "scale.um_per_px is missing (micrometres per pixel)."],
    ["scale.division_um", { scale: { micrometer: "a.png" } }, "scale.division_um is missing"],
    [
      "scale.um_per_px",
      { scale: { um_per_px: 1, micrometer: "a.png", division_um: 10 } },
      "scale.um_per_px doesn't go together with the other entries of scale.",
    ],
    [
      "clock.capture_fps",
      { clock: { capture_fps: -240 } },
      "clock.capture_fps is -240, but must be a number greater than 0 (frames captured per second of real time).",
    ],
    ["field.steps", { field: {} }, "field.steps is missing"],
    [
      "field.steps",
      { field: { steps: [] } },
      "field.steps is an empty list, but must be a list with at least one entry",
    ],
    [
      "field.steps",
      { field: { log: "f.csv", steps: full.field.steps } },
      "field.steps doesn't go together with the other entries of field.",
    ],
    [
      "field.steps[0].magnitude_mT",
      { field: { steps: [{ t_s: 0, magnitude_mT: -0.3, angle_deg: 0 }] } },
      "field.steps[0].magnitude_mT is -0.3, but must be a number of 0 or more",
    ],
    [
      "field.steps[0].angle_deg",
      { field: { steps: [{ t_s: 0, magnitude_mT: 1 }] } },
      "field.steps[0].angle_deg is missing",
    ],
    [
      "field.steps[1].t_s",
      { field: { steps: [...full.field.steps].reverse() } },
      "field.steps[1].t_s is 0, but must be later than the step before it (5 s).",
    ],
    [
      "field.ambient_mT",
      { field: { ...full.field, ambient_mT: [0] } },
      "field.ambient_mT is a list of 1, but must be a list of 2 numbers",
    ],
    [
      "field.clock_offset_s",
      { field: { log: "f.csv", clock_offset_s: "later" } },
      'field.clock_offset_s is the text "later", but must be a number or "auto"',
    ],
    ["field.log", { field: { coils: { x_mT_per_A: 1, y_mT_per_A: 1 } } }, "field.log is missing"],
    [
      "sample.temperature_C",
      { sample: { temperature_C: 300 } },
      "sample.temperature_C is 300, but must be a number from -20 to 120",
    ],
  ])("refuses %s when wrong: %j", (field, more, message) => {
    const error = refusal(() => read(more));
    expect(error.message).toContain(message);
    expect(error.message.split("\n")).toHaveLength(1);
    expect(error.where).toBe(`T07/trial.json: ${field}`);
    expect(error.remedy).toMatch(/\.$/);
  });

  it.each([
    "/data/swim.mp4",
    "../swim.mp4",
    "a/../../swim.mp4",
    "C:\\swim.mp4",
    "..\\swim.mp4",
    "https://x.example/a.mp4",
    "videos/",
    "\\\\host\\a.mp4",
  ])("refuses a path that leaves the folder: %s", (path) => {
    for (const more of [
      { recording: path },
      { scale: { micrometer: path, division_um: 10 } },
      { field: { log: path } },
    ]) {
      expect(refusal(() => read(more)).message).toContain("which is not a file inside the trial folder.");
    }
  });

  it("keeps a path into a folder below, in one spelling", () => {
    expect(read({ recording: "./day 2\\swim.mp4" }).trial.recording).toBe("day 2/swim.mp4");
  });

  it("lists every problem, the first leading", () => {
    const error = refusal(() => read({ scale: { um_per_px: -1 }, subject: 3, recording: "../a.mp4" }));
    expect(error.message.split("\n")).toHaveLength(3);
    expect(error.where).toBe(`T07/trial.json: ${error.message.split(" ")[0]}`);
  });

  it("refuses a number too large to hold", () => {
    const text =
      '{"schema":"lodewake/trial@1","recording":"a.mp4","scale":{"um_per_px":1e999,"uncertainty_um_per_px":0}}';
    expect(refusal(() => readTrial(text, "trial.json")).message).toBe(
      "scale.um_per_px is too large to be held as a number.",
    );
  });

  it("warns of names it doesn't know, with the one that was meant", () => {
    const { warnings } = read({
      scale: { um_per_px: 0.5, uncertainty_um_per_px: 0.01, um_per_pixel: 1 },
      field: { steps: [{ t_s: 0, magnitude_mT: 1, angle_deg: 0, angel_deg: 3 }] },
      strian: "WT",
      __proto__x: 1,
    });
    expect(warnings.map((it) => it.code)).toEqual(Array(4).fill("trial-unknown-name"));
    expect(warnings.map((it) => it.message)).toEqual([
      "T07/trial.json: scale.um_per_pixel is not a name Lodewake knows and is ignored; did you mean um_per_px?",
      "T07/trial.json: field.steps[0].angel_deg is not a name Lodewake knows and is ignored; did you mean angle_deg?",
      "T07/trial.json: strian is not a name Lodewake knows and is ignored; did you mean strain?",
      "T07/trial.json: __proto__x is not a name Lodewake knows and is ignored.",
    ]);
  });

  it("warns of a scale without uncertainty", () => {
    const { trial, warnings } = read({ scale: { um_per_px: 0.5 } });
    expect(trial.scale).toMatchObject({ uncertainty_um_per_px: 0 });
    expect(warnings.map((it) => it.code)).toEqual(["scale-without-uncertainty"]);
  });
});

import type { Schema } from "@cfworker/json-schema";
import trialSchema from "../../docs/schemas/trial-1.schema.json" with { type: "json" };
import { InputError, type Warning } from "../quantities/index.ts";
import { findJsonFault } from "./json-fault.ts";
import { insideFolder } from "./paths-in-folder.ts";
import { type Problem, problemsOf, shown, unknownNames } from "./schema-sentences.ts";
import type {
  Coils,
  FieldDescription,
  FieldStep,
  ScaleDescription,
  Subject,
  TrialDescription,
} from "./trial-description.ts";

const tag = "lodewake/trial@1";
const schema = trialSchema as Schema;

/**
 * Reads the text of a `trial.json`; `where` names the file in messages.
 *
 * Unknown names and a scale without uncertainty are warnings.
 * @throws InputError `trial-not-json` (with line and column), `trial-wrong-schema`, or `trial-invalid`: one sentence
 * a problem, one a line, all of them; `where` and `remedy` belong to the first.
 */
export function readTrial(text: string, where: string): { trial: TrialDescription; warnings: Warning[] } {
  const document = parse(text, where);
  checkTag(document, where);
  const problems = problemsOf(document, schema);
  problems.push(...problemsBeyondSchema(document, problems));
  const first = problems[0];
  if (first) {
    const what = problems.map((problem) => problem.sentence).join("\n");
    throw new InputError("trial-invalid", what, `${where}: ${first.field}`, first.remedy);
  }
  const trial = describe(document as unknown as Written);
  return { trial, warnings: warningsAbout(document, where) };
}

function parse(text: string, where: string): unknown {
  const bare = text.startsWith("\uFEFF") ? text.slice(1) : text;
  try {
    return JSON.parse(bare);
  } catch {
    const fault = findJsonFault(bare);
    const place = fault ? `line ${fault.line}, column ${fault.column}` : "unknown place";
    throw new InputError(
      "trial-not-json",
      `This is not valid JSON: at ${place}, ${fault?.what ?? "the text can't be read"}.`,
      `${where}: ${place}`,
      "Open the file in a text editor and mend that place; a file that only says what is needed is short.",
    );
  }
}

function checkTag(document: unknown, where: string): asserts document is Record<string, unknown> {
  if (typeof document !== "object" || document === null || Array.isArray(document)) {
    const what = `The file holds ${shown(document)}, but must hold one group of entries, in { }.`;
    throw new InputError("trial-invalid", what, where, `Write { "schema": "${tag}", "recording": "…" }.`);
  }
  const found = (document as Record<string, unknown>).schema;
  if (found === tag) return;
  const later = typeof found === "string" && /^lodewake\/trial@\d+$/.test(found);
  const other = typeof found === "string" && found.startsWith("lodewake/") && !later;
  const what =
    found === undefined
      ? `schema is missing: nothing says that this file describes a trial.`
      : later
        ? `schema is ${JSON.stringify(found)}, a version that this Lodewake doesn't know; it reads "${tag}".`
        : `schema is ${shown(found)}, but must be "${tag}".`;
  const remedy = later
    ? "Use the Lodewake that the file was written for, or write the file in the older shape."
    : other
      ? "This looks like another kind of Lodewake file; give the trial's own description."
      : `Add "schema": "${tag}" as the first entry.`;
  throw new InputError("trial-wrong-schema", what, `${where}: schema`, remedy);
}

/** What a schema can't say: numbers too large to hold, times in order, files that stay in the folder. */
function problemsBeyondSchema(document: Record<string, unknown>, known: readonly Problem[]): Problem[] {
  const problems: Problem[] = [];
  const add = (field: string, sentence: string, remedy: string) => {
    if (![...known, ...problems].some((problem) => problem.field === field)) problems.push({ field, sentence, remedy });
  };
  for (const field of infiniteNumbers(document, "")) {
    add(field, `${field} is too large to be held as a number.`, `Set ${field} to a number below 1e308.`);
  }
  const { scale, field } = document as { scale?: Record<string, unknown>; field?: Record<string, unknown> };
  const files = { recording: document.recording, "scale.micrometer": scale?.micrometer, "field.log": field?.log };
  for (const [name, path] of Object.entries(files)) {
    if (typeof path !== "string" || path === "" || insideFolder(path) !== null) continue;
    const sentence = `${name} is ${shown(path)}, which is not a file inside the trial folder.`;
    add(
      name,
      sentence,
      `Put the file into the trial folder and give its name alone, without a drive, / or .. in front.`,
    );
  }
  const steps = Array.isArray(field?.steps) ? (field.steps as (FieldStep | null)[]) : [];
  for (let i = 1; i < steps.length; i++) {
    const before = steps[i - 1]?.t_s;
    const now = steps[i]?.t_s;
    if (typeof before !== "number" || typeof now !== "number" || now > before) continue;
    const name = `field.steps[${i}].t_s`;
    const sentence = `${name} is ${now}, but must be later than the step before it (${before} s).`;
    add(name, sentence, "Put the field steps in order of time, each with a time of its own.");
  }
  return problems;
}

function infiniteNumbers(value: unknown, name: string): string[] {
  if (typeof value === "number") return Number.isFinite(value) ? [] : [name];
  if (Array.isArray(value)) return value.flatMap((item, i) => infiniteNumbers(item, `${name}[${i}]`));
  if (typeof value !== "object" || value === null) return [];
  return Object.entries(value).flatMap(([key, item]) => infiniteNumbers(item, name ? `${name}.${key}` : key));
}

function warningsAbout(document: Record<string, unknown>, where: string): Warning[] {
  const warnings: Warning[] = unknownNames(document, schema).map(({ field, nearest }) => ({
    code: "trial-unknown-name",
    message: `${where}: ${field} is not a name Lodewake knows and is ignored${nearest ? `; did you mean ${nearest}?` : "."}`,
  }));
  const scale = document.scale as Record<string, unknown> | null | undefined;
  if (scale && scale.um_per_px !== undefined && scale.uncertainty_um_per_px === undefined) {
    warnings.push({
      code: "scale-without-uncertainty",
      message:
        `${where}: scale.uncertainty_um_per_px is missing and taken as 0: intervals hold only the scatter between ` +
        "cells. Measure the scale several times and give its standard uncertainty.",
    });
  }
  return warnings;
}

/** `trial.json` after the checks. */
interface Written {
  readonly trial?: string | null;
  readonly strain?: string | null;
  readonly culture?: string | null;
  readonly condition?: string | null;
  readonly recording: string;
  readonly subject?: Subject;
  readonly scale?: {
    readonly um_per_px?: number;
    readonly uncertainty_um_per_px?: number;
    readonly micrometer?: string;
    readonly division_um?: number;
  } | null;
  readonly clock?: { readonly capture_fps?: number | null } | null;
  readonly field?: {
    readonly steps?: readonly FieldStep[];
    readonly rotation_hz?: number;
    readonly ambient_mT?: readonly [number, number];
    readonly log?: string;
    readonly clock_offset_s?: number | "auto";
    readonly coils?: Pick<Coils, "x_mT_per_A" | "y_mT_per_A"> & Partial<Coils>;
  } | null;
  readonly sample?: { readonly temperature_C?: number | null; readonly cell_radius_um?: number | null } | null;
}

function describe(written: Written): TrialDescription {
  return {
    trial: nameOrNull(written.trial),
    strain: nameOrNull(written.strain),
    culture: nameOrNull(written.culture),
    condition: nameOrNull(written.condition),
    recording: insideFolder(written.recording)!,
    subject: written.subject ?? "cells",
    scale: written.scale ? scaleOf(written.scale) : null,
    captureFps: written.clock?.capture_fps ?? null,
    field: written.field ? fieldOf(written.field) : null,
    sample: {
      temperature_C: written.sample?.temperature_C ?? null,
      cellRadius_um: written.sample?.cell_radius_um ?? null,
    },
  };
}

/** A name that is empty or only blanks says nothing. */
function nameOrNull(name: string | null | undefined): string | null {
  return name?.trim() || null;
}

function scaleOf(scale: NonNullable<Written["scale"]>): ScaleDescription {
  if (scale.um_per_px !== undefined) {
    return {
      from: "numbers",
      um_per_px: scale.um_per_px,
      uncertainty_um_per_px: scale.uncertainty_um_per_px ?? 0,
    };
  }
  return { from: "micrometer", file: insideFolder(scale.micrometer!)!, division_um: scale.division_um! };
}

function fieldOf(field: NonNullable<Written["field"]>): FieldDescription {
  const [ambientX, ambientY] = field.ambient_mT ?? [0, 0];
  const ambient_mT = [ambientX, ambientY] as const;
  if (field.steps) {
    const steps = field.steps.map(({ t_s, magnitude_mT, angle_deg }) => ({ t_s, magnitude_mT, angle_deg }));
    return { from: "steps", steps, rotation_hz: field.rotation_hz ?? 0, ambient_mT };
  }
  const coils = field.coils;
  return {
    from: "log",
    file: insideFolder(field.log!)!,
    clockOffset_s: field.clock_offset_s ?? 0,
    coils: coils
      ? {
          x_mT_per_A: coils.x_mT_per_A,
          y_mT_per_A: coils.y_mT_per_A,
          x_deg: coils.x_deg ?? 0,
          y_deg: coils.y_deg ?? 90,
        }
      : null,
    ambient_mT,
  };
}

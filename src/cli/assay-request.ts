import { type AssayOptions, assayPresets, type Preset, type TrialLabels } from "../assay/index.ts";
import { InputError } from "../quantities/index.ts";
import { readArguments, usageError } from "./arguments.ts";
import { type Codec, containersOf, type EncodeOptions } from "./encode/index.ts";

/** What `lodewake assay` was asked for. */
export interface AssayRequest {
  readonly list: boolean;
  readonly out: string;
  readonly replace: boolean;
  readonly options: AssayOptions;
  readonly labels: TrialLabels;
  readonly encoding: Pick<EncodeOptions, "codec" | "container" | "crf" | "preset" | "rotation">;
}

/**
 * Quality of each codec: [used, best, worst] constant rate factor (Motion JPEG: quantiser). The ones used keep the
 * sensor's noise, as phones do at their usual rates (10 Mbit/s and more at 1280 × 720).
 */
const qualities: Readonly<Record<Codec, readonly [used: number, best: number, worst: number]>> = {
  h264: [18, 0, 51],
  hevc: [16, 0, 51],
  vp9: [24, 0, 63],
  av1: [24, 0, 63],
  mjpeg: [3, 1, 31],
};

const rotations = [0, 90, 180, 270] as const;

/** Reads the arguments of `lodewake assay`. @throws InputError when one is wrong */
export function readAssayRequest(args: readonly string[]): AssayRequest {
  const { values, positionals } = readArguments("assay", args, {
    out: { type: "string" },
    preset: { type: "string", default: "plain" },
    seed: { type: "string" },
    seconds: { type: "string" },
    set: { type: "string", multiple: true, default: [] },
    codec: { type: "string", default: "h264" },
    container: { type: "string" },
    quality: { type: "string" },
    rotate: { type: "string", default: "0" },
    trial: { type: "string" },
    strain: { type: "string" },
    culture: { type: "string" },
    condition: { type: "string" },
    replace: { type: "boolean", default: false },
    list: { type: "boolean", default: false },
    json: { type: "boolean" },
  });
  if (positionals.length > 0) throw usageError("assay", `It takes no "${positionals[0]}".`);
  if (!values.list && !values.out) throw usageError("assay", "No folder to write to was given (--out FOLDER).");
  const preset = presetNamed(values.preset);
  const seed = values.seed === undefined ? {} : { seed: wholeNumber("--seed", values.seed, 0, 0xffffffff) };
  const length = values.seconds === undefined ? [] : [`time.seconds=${values.seconds}`];
  const options = withSettings({ ...preset.options, ...seed }, [...length, ...values.set]);
  const { trial, strain, culture, condition } = values;
  const given = Object.entries({ trial, strain, culture, condition }).filter(([, name]) => name !== undefined);
  return {
    list: values.list,
    out: values.out ?? "",
    replace: values.replace,
    options,
    labels: {
      trial: `${values.preset}-${options.seed ?? 1}`,
      strain: "synthetic",
      condition: values.preset,
      ...preset.labels,
      ...Object.fromEntries(given),
    },
    encoding: encodingOf(preset, values),
  };
}

function presetNamed(name: string): Preset {
  const preset = Object.hasOwn(assayPresets, name) ? assayPresets[name] : undefined;
  if (preset) return preset;
  throw new InputError(
    "assay-preset",
    `There is no preset "${name}".`,
    "--preset",
    `Give one of ${Object.keys(assayPresets).join(", ")}.`,
  );
}

/** Lays `section.name=value` over the options; values are JSON, or else plain words. */
function withSettings(options: AssayOptions, sets: readonly string[]): AssayOptions {
  const changed: Record<string, unknown> = { ...options };
  for (const set of sets) {
    const [, section, name, value] = /^(\w+)(?:\.(\w+))?=(.*)$/s.exec(set) ?? [];
    if (section === undefined || value === undefined) {
      throw usageError("assay", `--set takes section.name=value, not "${set}".`);
    }
    if (name === undefined) changed[section] = parsed(value);
    else changed[section] = { ...(changed[section] as object | undefined), [name]: parsed(value) };
  }
  return changed as AssayOptions;
}

function parsed(value: string): unknown {
  try {
    return JSON.parse(value);
  } catch {
    return value;
  }
}

function encodingOf(
  preset: Preset,
  values: { codec: string; container?: string; quality?: string; rotate: string },
): AssayRequest["encoding"] {
  const codec = oneOf("--codec", values.codec, Object.keys(containersOf) as Codec[]);
  const containers = containersOf[codec];
  const container = oneOf("--container", values.container ?? (containers[0] as string), containers, ` with ${codec}`);
  const rotation = oneOf("--rotate", Number(values.rotate), rotations);
  if (container === "avi" && rotation !== 0) throw usageError("assay", "AVI has no rotation tag: leave out --rotate.");
  const [used, best, worst] = qualities[codec];
  const usual = codec === "h264" ? (preset.encoding?.crf ?? used) : used;
  const crf = values.quality === undefined ? usual : wholeNumber("--quality", values.quality, best, worst);
  return { codec, container, crf, preset: preset.encoding?.preset ?? "veryfast", rotation };
}

function oneOf<T extends string | number>(option: string, given: string | number, all: readonly T[], when = ""): T {
  const found = all.find((one) => one === given);
  if (found !== undefined) return found;
  throw usageError("assay", `${option}${when} is "${given}", but must be ${all.join(" or ")}.`);
}

function wholeNumber(option: string, given: string, least: number, most: number): number {
  const value = Number(given);
  if (given.trim() !== "" && Number.isInteger(value) && value >= least && value <= most) return value;
  throw usageError("assay", `${option} is "${given}", but must be a whole number from ${least} to ${most}.`);
}

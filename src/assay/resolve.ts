import { InputError } from "../quantities/index.ts";
import { type AssayOptions, type AssaySettings, defaultSettings } from "./options.ts";

type Sections = Exclude<keyof AssaySettings, "seed" | "visibleAt">;

/** Bounds of numeric options, inclusive: [least, most]. Kept so that every assay allowed can be made. */
const bounds: { readonly [S in Sections]?: Readonly<Record<string, readonly [number, number]>> } = {
  picture: { width_px: [32, 4096], height_px: [32, 4096], um_per_px: [0.01, 100] },
  time: {
    seconds: [0.001, 3600],
    fps: [0.5, 2000],
    container_fps: [0.5, 2000],
    jitter: [0, 0.4],
    wander: [0, 0.5],
    dropped: [0, 0.9],
    repeated: [0, 0.9],
    exposure_s: [0, 1],
  },
  sample: { depth_um: [1, 1000], temperature_C: [0, 60], relativeViscosity: [0.5, 100], cellRadius_um: [0.1, 10] },
  swimmers: {
    cells: [0, 5000],
    speed_um_s: [0, 2000],
    speedCv: [0, 1.5],
    moment_A_m2: [0, 1e-12],
    momentCv: [0, 1.5],
    southFraction: [0, 1],
    restlessness: [0.01, 1000],
  },
  dead: { cells: [0, 5000] },
  stuck: { cells: [0, 5000] },
  debris: { pieces: [0, 5000], size_um: [0.05, 200], contrast: [0, 0.9] },
  field: { rotation_hz: [-100, 100] },
  optics: {
    contrast: [0, 0.95],
    contrastCv: [0, 1],
    bodyLength_um: [0.1, 50],
    bodyWidth_um: [0.1, 50],
    psf_um: [0.05, 20],
    defocus: [0, 2],
    ring: [0, 0.8],
    focus_um: [-1000, 2000],
  },
  light: { level: [1, 250], vignette: [0, 0.9], eyepiece: [0.1, 3], black: [0, 100] },
  sensor: { noise: [0, 50], readNoise: [0, 50], grain: [0, 0.33], gainDrift: [0, 0.5], gainStep: [-0.5, 0.5] },
  phone: { shake_px: [0, 30], bump_px: [-60, 60] },
};

const sections = Object.keys(bounds) as Sections[];

/**
 * Fills what was left out with the defaults and checks every number.
 * @throws InputError naming the option, its bounds and what was given.
 */
export function resolveOptions(options: AssayOptions): AssaySettings {
  for (const section of sections) {
    const given: unknown = options[section];
    if (given !== undefined && (typeof given !== "object" || given === null || Array.isArray(given))) {
      reject(section, given, "a section of named settings");
    }
  }
  const settings = { ...defaultSettings, ...options } as unknown as Record<string, unknown>;
  for (const section of sections) settings[section] = { ...defaultSettings[section], ...options[section] };
  refuseUnknown(settings);
  const whole = settings as unknown as AssaySettings;
  if (!Number.isInteger(whole.seed) || whole.seed < 0 || whole.seed > 0xffffffff) {
    reject("seed", whole.seed, "a whole number from 0 to 4294967295");
  }
  if (!(whole.visibleAt >= 0)) reject("visibleAt", whole.visibleAt, "0 or more");
  for (const section of sections) {
    const values = whole[section] as unknown as Record<string, unknown>;
    for (const [name, [least, most]] of Object.entries(bounds[section] ?? {})) {
      const value = values[name];
      if (value === null && (defaultSettings[section] as unknown as Record<string, unknown>)[name] === null) continue;
      if (typeof value !== "number" || !(value >= least && value <= most)) {
        reject(`${section}.${name}`, value, `a number from ${least} to ${most}`);
      }
    }
  }
  // Chroma is half the size in 4:2:0 video, so an odd picture could not be encoded as it is.
  const { width_px, height_px } = whole.picture;
  if (width_px % 2 !== 0 || height_px % 2 !== 0) {
    reject("picture", `${width_px} x ${height_px}`, "an even whole number of pixels each way");
  }
  if (!["dark", "bright", "phase"].includes(whole.optics.polarity)) {
    reject("optics.polarity", whole.optics.polarity, "dark, bright or phase");
  }
  for (const [where, vector] of [
    ["sample.flow_um_s", whole.sample.flow_um_s],
    ["field.ambient_mT", whole.field.ambient_mT],
  ] as const) {
    if (!Array.isArray(vector) || vector.length !== 2 || !vector.every(Number.isFinite)) {
      reject(where, vector, "two numbers");
    }
  }
  if (!Array.isArray(whole.field.steps)) reject("field.steps", whole.field.steps, "a list of steps");
  for (const step of whole.field.steps) {
    const fine = [step.t_s, step.magnitude_mT, step.angle_deg].every(Number.isFinite) && step.magnitude_mT >= 0;
    if (!fine) reject("field.steps", JSON.stringify(step), "steps of finite numbers with a magnitude of 0 or more");
  }
  return whole;
}

/** A misspelt name must not pass as a setting left out. */
function refuseUnknown(settings: Record<string, unknown>): void {
  for (const [section, values] of Object.entries(settings)) {
    if (!Object.hasOwn(defaultSettings, section)) rejectName(section, Object.keys(defaultSettings));
    if (typeof values !== "object") continue;
    const known = Object.keys(defaultSettings[section as Sections]);
    for (const name of Object.keys(values as object)) {
      if (!known.includes(name)) rejectName(`${section}.${name}`, known);
    }
  }
}

function rejectName(where: string, known: readonly string[]): never {
  throw new InputError("assay-option", `There is no setting ${where}.`, where, `Use one of ${known.join(", ")}.`);
}

function reject(where: string, given: unknown, wanted: string): never {
  throw new InputError("assay-option", `${String(given)} is not ${wanted}`, where, `Give ${wanted}.`);
}

import { sphereDrag, thermalEnergy_J } from "./medium.ts";
import type { AssaySettings } from "./options.ts";
import { logNormal, type Normal, normals, stream } from "./variates.ts";

export type Kind = "swimmer" | "dead" | "stuck" | "debris";

/** One cell before it moves. */
export interface Body {
  readonly kind: "swimmer" | "dead" | "stuck";
  /** Place in the box, µm: x right, y up from the scene's origin, z up from the floor. */
  readonly x_um: number;
  readonly y_um: number;
  readonly z_um: number;
  /** Seed path of its own random numbers. */
  readonly name: string;
  readonly speed_um_s: number;
  /** Rate at which the torque turns it per millitesla, signed: negative for south-seekers. */
  readonly turn_per_s_mT: number;
  readonly moment_A_m2: number;
  /** Peak contrast in focus, fraction of the light. */
  readonly contrast: number;
}

/** The box the cells live in: larger than the view by a margin on each side, and repeated for ever. */
export interface Box {
  readonly left_um: number;
  readonly bottom_um: number;
  readonly width_um: number;
  readonly height_um: number;
  readonly depth_um: number;
}

/** Margin of the box around the picture: a cell that is wrapped is well out of sight. */
const margin_um = 25;

export function boxOf(settings: AssaySettings): Box {
  const { width_px, height_px, um_per_px } = settings.picture;
  return {
    left_um: -margin_um,
    bottom_um: -height_px * um_per_px - margin_um,
    width_um: width_px * um_per_px + 2 * margin_um,
    height_um: height_px * um_per_px + 2 * margin_um,
    depth_um: settings.sample.depth_um,
  };
}

/** Area of the lit view, µm². */
function viewArea_um2(settings: AssaySettings): number {
  const { width_px, height_px, um_per_px } = settings.picture;
  const eyepiece = settings.light.eyepiece;
  const whole = width_px * height_px;
  const circle = eyepiece === null ? whole : Math.PI * ((eyepiece * height_px) / 2) ** 2;
  return Math.min(whole, circle) * um_per_px ** 2;
}

/** Fills the box so that the asked number of each kind is in view at any time, on average. */
export function populate(settings: AssaySettings, box: Box): Body[] {
  const crowd = (box.width_um * box.height_um) / viewArea_um2(settings);
  const bodies: Body[] = [];
  for (const [kind, inView] of [
    ["swimmer", settings.swimmers.cells],
    ["dead", settings.dead.cells],
    ["stuck", settings.stuck.cells],
  ] as const) {
    const count = Math.round(inView * crowd);
    for (let i = 0; i < count; i++) bodies.push(bodyOf(kind, i, settings, box));
  }
  return bodies;
}

function bodyOf(kind: Body["kind"], index: number, settings: AssaySettings, box: Box): Body {
  const name = `${kind} ${index}`;
  const random = stream(settings.seed, "body", name);
  const normal = normals(random);
  const { swimmers, sample, optics } = settings;
  const x_um = box.left_um + random() * box.width_um;
  const y_um = box.bottom_um + random() * box.height_um;
  const focus = optics.focus_um ?? sample.depth_um / 2;
  // Stuck cells sit on glass; the glass in focus is where anyone would look.
  const z_um = kind === "stuck" ? focus + 2 * (random() - 0.5) : random() * box.depth_um;
  const south = random() < swimmers.southFraction;
  const moment = logNormal(swimmers.moment_A_m2, swimmers.momentCv, normal);
  const drag = sphereDrag(sample.cellRadius_um, sample.temperature_C, sample.relativeViscosity);
  const speed = truncatedLogNormal(swimmers.speed_um_s, swimmers.speedCv, normal);
  return {
    kind,
    x_um,
    y_um,
    z_um,
    name,
    speed_um_s: kind === "swimmer" ? speed : 0,
    // (A m² × mT × 1e-3 T/mT) / (N m s) = 1/s per mT.
    turn_per_s_mT: ((south ? -1 : 1) * moment * 1e-3) / drag.rotational_N_m_s,
    moment_A_m2: moment,
    contrast: Math.min(0.95, logNormal(optics.contrast, optics.contrastCv, normal)),
  };
}

/** Lognormal speeds without the far tail: no cell is faster than the mean plus four standard deviations. */
function truncatedLogNormal(mean: number, cv: number, normal: Normal): number {
  for (;;) {
    const v = logNormal(mean, cv, normal);
    if (v <= mean * (1 + 4 * cv)) return v;
  }
}

/** Energy ratio x = mB/(k_B T) of a body in a field, divided by how restless its kind is. */
export function energyRatio(moment_A_m2: number, field_mT: number, settings: AssaySettings): number {
  const ratio = (moment_A_m2 * field_mT * 1e-3) / thermalEnergy_J(settings.sample.temperature_C);
  return ratio / settings.swimmers.restlessness;
}

/** Boltzmann constant, J/K: exact by definition of the kelvin (SI, 2019). */
const boltzmann_J_per_K = 1.380649e-23;

/** Thermal energy k_B·T at a temperature in degrees Celsius, joule. */
export function thermalEnergy_J(temperature_C: number): number {
  return boltzmann_J_per_K * (temperature_C + 273.15);
}

/**
 * Dynamic viscosity of water at 0.1 MPa, Pa·s, for -20 to 110 degrees Celsius.
 * Source: Pátek, Hrubý, Klomfar, Součková and Harvey, J. Phys. Chem. Ref. Data 38, 21 (2009), equation for viscosity.
 */
export function waterViscosity_Pa_s(temperature_C: number): number {
  const t = (temperature_C + 273.15) / 300;
  return 1e-6 * (280.68 * t ** -1.9 + 511.45 * t ** -7.7 + 61.131 * t ** -19.6 + 0.45903 * t ** -40);
}

/** What the fluid does to a sphere of the given radius: Stokes drag (translational, rotational) and Einstein diffusion. */
export interface Drag {
  readonly translational_N_s_m: number;
  readonly rotational_N_m_s: number;
  /** Translational diffusion, µm²/s. */
  readonly diffusion_um2_s: number;
  /** Rotational diffusion about one axis, rad²/s. */
  readonly rotationalDiffusion_per_s: number;
}

/** Drag and thermal diffusion of a sphere: f = 6πηR, f_r = 8πηR³ (Stokes), D = k_B T / f (Einstein). */
export function sphereDrag(radius_um: number, temperature_C: number, relativeViscosity = 1): Drag {
  const viscosity = waterViscosity_Pa_s(temperature_C) * relativeViscosity;
  const r = radius_um * 1e-6;
  const translational_N_s_m = 6 * Math.PI * viscosity * r;
  const rotational_N_m_s = 8 * Math.PI * viscosity * r ** 3;
  const kT = thermalEnergy_J(temperature_C);
  return {
    translational_N_s_m,
    rotational_N_m_s,
    diffusion_um2_s: (kT / translational_N_s_m) * 1e12,
    rotationalDiffusion_per_s: kT / rotational_N_m_s,
  };
}

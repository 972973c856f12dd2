/** One step of the field program: held until the next. Angle counter-clockwise from image right. */
export interface FieldStep {
  readonly t_s: number;
  readonly magnitude_mT: number;
  readonly angle_deg: number;
}

/** Everything about one synthetic assay. Lengths in µm, times in s unless the name says otherwise. */
export interface AssaySettings {
  readonly seed: number;
  readonly picture: {
    readonly width_px: number;
    readonly height_px: number;
    readonly um_per_px: number;
  };
  readonly time: {
    readonly seconds: number;
    /** Capture rate. */
    readonly fps: number;
    /** Rate the container plays at: differs from `fps` in slow motion. Null: the same. */
    readonly container_fps: number | null;
    /** Standard deviation of each frame interval, as a fraction of it. */
    readonly jitter: number;
    /** Slow swing of the frame interval (dim light, busy phone), as a fraction of it. */
    readonly wander: number;
    /** Chance of a frame being dropped (a gap), and of one being repeated (the last picture again). */
    readonly dropped: number;
    readonly repeated: number;
    /** Exposure of one frame. */
    readonly exposure_s: number;
  };
  readonly sample: {
    readonly depth_um: number;
    readonly temperature_C: number;
    /** Viscosity over that of water. */
    readonly relativeViscosity: number;
    /** Radius of the sphere whose Stokes drag the cells have. */
    readonly cellRadius_um: number;
    /** Common flow of the fluid, x right, y up. */
    readonly flow_um_s: readonly [number, number];
  };
  readonly swimmers: {
    /** Swimmers in view at any time, on average. */
    readonly cells: number;
    readonly speed_um_s: number;
    /** Coefficient of variation of speed over cells (lognormal). */
    readonly speedCv: number;
    readonly moment_A_m2: number;
    readonly momentCv: number;
    /** Fraction that swims against the field. */
    readonly southFraction: number;
    /** Rotational diffusion over its thermal value: above 1 for cells whose own wobble turns them. */
    readonly restlessness: number;
  };
  readonly dead: { readonly cells: number };
  readonly stuck: { readonly cells: number };
  readonly debris: {
    readonly pieces: number;
    /** Median size (standard deviation of the spot). Sizes are lognormal with a coefficient of variation of 0.7. */
    readonly size_um: number;
    /** Peak darkening, fraction of the light. */
    readonly contrast: number;
  };
  readonly field: {
    readonly steps: readonly FieldStep[];
    readonly rotation_hz: number;
    readonly ambient_mT: readonly [number, number];
  };
  readonly optics: {
    readonly polarity: "dark" | "bright" | "phase";
    /** Peak change of light by a cell lying in focus, fraction of the local light. */
    readonly contrast: number;
    /** Coefficient of variation of contrast over cells (lognormal). */
    readonly contrastCv: number;
    readonly bodyLength_um: number;
    readonly bodyWidth_um: number;
    /** Standard deviation of the in-focus point spread. */
    readonly psf_um: number;
    /** Growth of the blur (standard deviation) with distance from the focal plane, µm per µm. */
    readonly defocus: number;
    /** Strength of the ring of opposite sign round a cell far out of focus, share of its core. 0: none. */
    readonly ring: number;
    /** Height of the focal plane over the chamber floor. Null: the middle. */
    readonly focus_um: number | null;
  };
  readonly light: {
    /** Grey level of the brightest part of the empty field. */
    readonly level: number;
    /** Fall of the light from the centre to the corner, fraction. */
    readonly vignette: number;
    /** Eyepiece circle: radius as a fraction of half the picture's height. Null: the whole picture is lit. */
    readonly eyepiece: number | null;
    /** Grey level outside the eyepiece. */
    readonly black: number;
  };
  readonly sensor: {
    /** Standard deviation of the noise at the brightest level, grey levels; grows with the root of the level. */
    readonly noise: number;
    /** Part of it that doesn't depend on the level. */
    readonly readNoise: number;
    /**
     * Weight of each of the two neighbours a pixel's noise is averaged with along either axis (itself: 1 - 2 × grain):
     * 0 is independent noise, 0.2 what a phone's own smoothing leaves (by eye). The size of the noise stays the same.
     */
    readonly grain: number;
    /** Slow swing of the exposure gain, fraction. */
    readonly gainDrift: number;
    /** Sudden change of the gain half-way through the clip, fraction (0.1: a tenth brighter). */
    readonly gainStep: number;
  };
  readonly phone: {
    /** Root-mean-square shake along each axis, pixels. */
    readonly shake_px: number;
    /** What shakes: the phone (rim and all) or the stage (the sample under a still rim). */
    readonly shakes: "phone" | "stage";
    /** Size of one knock, 60 % through the clip, pixels. */
    readonly bump_px: number;
  };
  /** A cell counts as visible when its peak stands this many noise standard deviations out of the light. */
  readonly visibleAt: number;
}

/** What may be asked for: any part of {@link AssaySettings}; the rest is the default. */
export type AssayOptions = {
  readonly [S in keyof AssaySettings]?: AssaySettings[S] extends number ? number : Partial<AssaySettings[S]>;
};

/** A plain clip: the whole picture lit, dark cells in good focus, nothing in the way. */
export const defaultSettings: AssaySettings = {
  seed: 1,
  picture: { width_px: 1280, height_px: 720, um_per_px: 0.45 },
  time: {
    seconds: 8,
    fps: 30,
    container_fps: null,
    jitter: 0,
    wander: 0,
    dropped: 0,
    repeated: 0,
    exposure_s: 0.008,
  },
  sample: { depth_um: 30, temperature_C: 22, relativeViscosity: 1, cellRadius_um: 1, flow_um_s: [0, 0] },
  swimmers: {
    cells: 40,
    speed_um_s: 40,
    speedCv: 0.25,
    moment_A_m2: 4e-16,
    momentCv: 0.2,
    southFraction: 0,
    restlessness: 1,
  },
  dead: { cells: 6 },
  stuck: { cells: 3 },
  debris: { pieces: 10, size_um: 2, contrast: 0.2 },
  field: {
    steps: [
      { t_s: 0, magnitude_mT: 0.4, angle_deg: 0 },
      { t_s: 4, magnitude_mT: 0.4, angle_deg: 180 },
    ],
    rotation_hz: 0,
    ambient_mT: [0, 0],
  },
  optics: {
    polarity: "dark",
    contrast: 0.3,
    contrastCv: 0.15,
    bodyLength_um: 3,
    bodyWidth_um: 1,
    psf_um: 0.45,
    defocus: 0.06,
    ring: 0.3,
    focus_um: null,
  },
  light: { level: 165, vignette: 0.25, eyepiece: null, black: 5 },
  sensor: { noise: 2, readNoise: 0.7, grain: 0.12, gainDrift: 0, gainStep: 0 },
  phone: { shake_px: 0, shakes: "phone", bump_px: 0 },
  visibleAt: 3,
};

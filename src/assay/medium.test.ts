import { describe, expect, it } from "vitest";
import { sphereDrag, thermalEnergy_J, waterViscosity_Pa_s } from "./medium.ts";

describe("viscosity of water", () => {
  // The full IAPWS formulation R12-08 (Huber et al., J. Phys. Chem. Ref. Data 38, 101, 2009), computed independently at
  // 298.15 K and 997.047 kg/m³, and at 310.15 K and 993.33 kg/m³.
  it.each([
    [25, 0.890022686e-3],
    [37, 0.691303632e-3],
  ])("agrees with the full formulation at %d °C", (t, expected) => {
    expect(Math.abs(waterViscosity_Pa_s(t) / expected - 1)).toBeLessThan(1e-4);
  });

  it("is the handbook's 1.0016 mPa s at 20 °C", () => {
    // CRC Handbook of Chemistry and Physics, from memory.
    expect(waterViscosity_Pa_s(20)).toBeCloseTo(1.0016e-3, 6);
  });

  it("falls by 2.45 % per kelvin at 20 °C", () => {
    // Computed independently from the same correlation.
    const slope = (Math.log(waterViscosity_Pa_s(20.01)) - Math.log(waterViscosity_Pa_s(19.99))) / 0.02;
    expect(slope).toBeCloseTo(-0.02449659, 6);
  });
});

describe("sphere in water", () => {
  // 6πηR, 8πηR³, kT/f for R = 1 µm and 0.5 µm, computed independently with the viscosity above.
  it.each([
    [1, 20, 1.88790982e-8, 2.51721309e-20, 0.21438379, 0.16078784],
    [1, 25, 1.6776044e-8, 2.23680586e-20, 0.245374, 0.1840305],
    [1, 37, 1.30307625e-8, 1.737435e-20, 0.32861338, 0.24646003],
    [0.5, 25, 8.38802198e-9, 2.79600733e-21, 0.490748, 1.47224399],
  ])("of radius %d µm at %d °C has Stokes drag and Einstein diffusion", (radius, t, ft, fr, d, dr) => {
    const drag = sphereDrag(radius, t);
    expect(drag.translational_N_s_m / ft).toBeCloseTo(1, 6);
    expect(drag.rotational_N_m_s / fr).toBeCloseTo(1, 6);
    expect(drag.diffusion_um2_s / d).toBeCloseTo(1, 6);
    expect(drag.rotationalDiffusion_per_s / dr).toBeCloseTo(1, 6);
  });

  it("diffuses less in what is more viscous", () => {
    expect(sphereDrag(1, 22, 2.5).diffusion_um2_s).toBeCloseTo(sphereDrag(1, 22).diffusion_um2_s / 2.5, 12);
  });

  it("has thermal energy k_B T", () => {
    expect(thermalEnergy_J(25)).toBeCloseTo(4.11643e-21, 25);
  });
});

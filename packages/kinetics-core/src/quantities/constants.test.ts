import { describe, expect, it } from "vitest";
import { AVOGADRO_CONSTANT, BOLTZMANN_CONSTANT, GAS_CONSTANT, PLANCK_CONSTANT } from "./index";

describe("fundamental constants", () => {
  it("R is the product of N_A and k_B to the last place", () => {
    expect((AVOGADRO_CONSTANT * BOLTZMANN_CONSTANT) / GAS_CONSTANT).toBeCloseTo(1, 15);
  });

  it("give the frequency of the transition-state theory at 298.15 K and its logarithm a kelvin", () => {
    // Computed from the exact constants in 40-digit arithmetic.
    expect((BOLTZMANN_CONSTANT * 298.15) / PLANCK_CONSTANT / 6212437992000).toBeCloseTo(1, 9);
    expect(Math.log(BOLTZMANN_CONSTANT / PLANCK_CONSTANT)).toBeCloseTo(23.7599778105, 9);
    expect(GAS_CONSTANT * 298.15).toBeCloseTo(2478.95703, 5);
  });
});

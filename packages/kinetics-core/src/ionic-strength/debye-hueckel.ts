import {
  AVOGADRO_CONSTANT,
  BOLTZMANN_CONSTANT,
  ELECTRIC_CONSTANT,
  ELEMENTARY_CHARGE,
  type Uncertain,
} from "kinetics-core/quantities";
import { WATER_RANGE, waterDensity, waterPermittivity } from "./water";

/**
 * Constants of the Debye-Hückel law, lg γ = −A z² √I/(1 + B a √I), in water:
 *
 *   A = e³ √(2 N_A n) / (ln 10 · 8π (ε₀ ε_r k_B T)^{3/2}),   B = e √(2 N_A n/(ε₀ ε_r k_B T)),
 *
 * with n the litre's 1000 (I in mol/L) or the density of water in kg m⁻³ (I in mol/kg). B in Å⁻¹ here.
 */
export interface DebyeHueckelConstants {
  readonly A: number;
  readonly perAngstrom: number;
}

/** A at 25 °C as texts and tables of rate constants have it. */
const ACCEPTED_A = 0.509;
const ACCEPTED_AT_KELVIN = 298.15;
/**
 * Relative standard uncertainty of A: printed values at 25 °C run from 0.5085 to 0.5116 with the permittivity and the
 * scale of concentration that they were computed with, and half of that spread is one standard deviation.
 */
const RELATIVE_UNCERTAINTY_OF_A = 0.003;

/** From the fundamental constants, permittivity and density. `temperatureKelvin` within `WATER_RANGE`. */
export function debyeHueckelFromConstants(
  temperatureKelvin: number,
  scale: "mol/L" | "mol/kg",
): DebyeHueckelConstants {
  const perCubicMetre = 2 * AVOGADRO_CONSTANT * (scale === "mol/L" ? 1000 : waterDensity(temperatureKelvin));
  const energy =
    ELECTRIC_CONSTANT * waterPermittivity(temperatureKelvin) * BOLTZMANN_CONSTANT * temperatureKelvin;
  return {
    A: (ELEMENTARY_CHARGE ** 3 * Math.sqrt(perCubicMetre)) / (Math.LN10 * 8 * Math.PI * energy ** 1.5),
    perAngstrom: ELEMENTARY_CHARGE * Math.sqrt(perCubicMetre / energy) * 1e-10,
  };
}

/**
 * A for I in mol/L: the accepted 0.509 at 25 °C, carried to other temperatures by the ratio that the constants give.
 * Null outside the range of liquid water.
 */
export function debyeHueckelA(temperatureKelvin: number): Uncertain | null {
  if (!(temperatureKelvin >= WATER_RANGE.lowest && temperatureKelvin <= WATER_RANGE.highest)) return null;
  const ratio =
    debyeHueckelFromConstants(temperatureKelvin, "mol/L").A /
    debyeHueckelFromConstants(ACCEPTED_AT_KELVIN, "mol/L").A;
  const value = ACCEPTED_A * ratio;
  return { value, standardUncertainty: RELATIVE_UNCERTAINTY_OF_A * value };
}

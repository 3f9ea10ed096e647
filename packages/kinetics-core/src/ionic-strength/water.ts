import { ZERO_CELSIUS } from "kinetics-core/quantities";

/** Water between its melting and boiling points at normal pressure: where the formulae below hold. */
export const WATER_RANGE = { lowest: ZERO_CELSIUS, highest: ZERO_CELSIUS + 100 } as const;

/**
 * Density of air-free water at 101 325 Pa, kg m⁻³: Kell, J. Chem. Eng. Data 20 (1975) 97 (coefficients from memory; they
 * give the accepted values at 0 to 60 °C to 0.003 kg m⁻³).
 */
export function waterDensity(temperatureKelvin: number): number {
  const t = temperatureKelvin - ZERO_CELSIUS;
  const numerator =
    999.83952 +
    t * (16.945176 + t * (-7.9870401e-3 + t * (-46.170461e-6 + t * (105.56302e-9 + t * -280.54253e-12))));
  return numerator / (1 + 16.87985e-3 * t);
}

/**
 * Relative permittivity of water: Malmberg and Maryott, J. Res. Natl. Bur. Stand. 56 (1956) 1 (coefficients from memory).
 * Later determinations lie up to 0.15 % above it at 25 °C.
 */
export function waterPermittivity(temperatureKelvin: number): number {
  const t = temperatureKelvin - ZERO_CELSIUS;
  return 87.74 + t * (-0.40008 + t * (9.398e-4 + t * -1.41e-6));
}

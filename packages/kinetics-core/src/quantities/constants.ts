/**
 * Fundamental constants: CODATA recommended values 2022 (NIST). All but the electric constant are exact since the
 * SI of 2019.
 */

/** Boltzmann constant k_B / (J K⁻¹), exact. */
export const BOLTZMANN_CONSTANT = 1.380649e-23;

/** Planck constant h / (J s), exact. */
export const PLANCK_CONSTANT = 6.62607015e-34;

/** Avogadro constant N_A / mol⁻¹, exact. */
export const AVOGADRO_CONSTANT = 6.02214076e23;

/** Elementary charge e / C, exact. */
export const ELEMENTARY_CHARGE = 1.602176634e-19;

/** Molar gas constant R = N_A k_B / (J mol⁻¹ K⁻¹), exact: all digits of the product. */
export const GAS_CONSTANT = 8.31446261815324;

/** Electric constant ε₀ / (F m⁻¹), standard uncertainty 1.4 × 10⁻²¹. */
export const ELECTRIC_CONSTANT = 8.8541878188e-12;

/** 0 °C on the thermodynamic scale / K, by definition. */
export const ZERO_CELSIUS = 273.15;

/**
 * Units in which concentrations and times are typed and shown. Inside, everything is mol L⁻¹ and s; the conversion
 * happens where data enter and where they are shown, nowhere else.
 */

/** mmHg stands for a partial pressure; it has no fixed size in mol L⁻¹ and is never converted, only carried along. */
export type ConcentrationUnit = "mol/L" | "mmol/L" | "umol/L" | "mmHg";

/** The concentration units that are a power of ten of mol L⁻¹. */
export type MolarUnit = Exclude<ConcentrationUnit, "mmHg">;

export type TimeUnit = "s" | "min" | "h";

const perMolar: Record<MolarUnit, number> = { "mol/L": 1, "mmol/L": 1e3, "umol/L": 1e6 };
const secondsPer: Record<TimeUnit, number> = { s: 1, min: 60, h: 3600 };

export function concentrationToMolar(value: number, unit: MolarUnit): number {
  return value / perMolar[unit];
}

export function molarTo(value: number, unit: MolarUnit): number {
  return value * perMolar[unit];
}

export function timeToSeconds(value: number, unit: TimeUnit): number {
  return value * secondsPer[unit];
}

export function secondsTo(value: number, unit: TimeUnit): number {
  return value / secondsPer[unit];
}

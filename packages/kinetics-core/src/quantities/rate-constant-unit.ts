import type { ConcentrationUnit, TimeUnit } from "./units";

/**
 * Unit of k in rate = k Π c^n for overall order Σn: (concentration)^(1 − Σn) time⁻¹, as plain text with `^` before
 * exponents and a space between factors: "s^-1", "L mol^-1 s^-1", "L^0.5 mol^-0.5 s^-1", "mol L^-1 s^-1".
 * Closed forms for whole and half overall orders (within 1e-6); any other order as a power to three decimals,
 * "(mol L^-1)^-1.013 s^-1".
 */
export function rateConstantUnit(
  overallOrder: number,
  concentrationUnit: ConcentrationUnit,
  timeUnit: TimeUnit,
): string {
  const time = `${timeUnit}^-1`;
  const exponent = 1 - overallOrder;
  const closed = Math.round(2 * exponent) / 2;
  if (Math.abs(exponent - closed) < 1e-6) {
    if (closed === 0) return time;
    if (concentrationUnit === "mmHg") return `${raised("mmHg", closed)} ${time}`;
    const amount = concentrationUnit.slice(0, concentrationUnit.indexOf("/"));
    // The factor with the positive exponent leads: mol L^-1 s^-1, but L mol^-1 s^-1.
    return closed > 0
      ? `${raised(amount, closed)} ${raised("L", -closed)} ${time}`
      : `${raised("L", -closed)} ${raised(amount, closed)} ${time}`;
  }
  return `(${concentrationUnitText(concentrationUnit)})^${Number(exponent.toFixed(3))} ${time}`;
}

/** Unit of a rate of reaction as plain text: "mol L^-1 s^-1". */
export function rateUnit(concentrationUnit: ConcentrationUnit, timeUnit: TimeUnit): string {
  return `${concentrationUnitText(concentrationUnit)} ${timeUnit}^-1`;
}

/** "mol/L" as plain text without a solidus: "mol L^-1". */
export function concentrationUnitText(unit: ConcentrationUnit): string {
  return unit === "mmHg" ? unit : unit.replace("/L", " L^-1");
}

function raised(base: string, exponent: number): string {
  return exponent === 1 ? base : `${base}^${exponent}`;
}

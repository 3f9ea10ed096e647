import {
  orthonormalPolynomials,
  type PolynomialRecurrence,
  plainCoefficients,
  polynomialsAt,
  projectOn,
} from "kinetics-core/least-squares";
import { quadraticForm } from "./autoregressive-noise";
import type { Readings } from "./readings";
import type { NoiseModel } from "./trace-noise";

/** Slopes at mixing of the nested polynomials on one window. */
export interface PolynomialSlopes {
  readonly from: number;
  /** One past the last reading. */
  readonly to: number;
  /** By degree; index 0 (the constant) has slope 0 and is there so that a degree is its own index. */
  readonly slopes: readonly number[];
  readonly standardErrors: readonly number[];
  readonly recurrence: PolynomialRecurrence;
  readonly projections: readonly number[];
}

/**
 * Polynomials of degree 1 to `degree` on readings [from, to), each with its slope at mixing and that slope's
 * standard error σ√(aᵀRa). In the orthonormal basis the row that gives the slope of degree d is
 * a_d = Σ_{j≤d} p_j′(0) p_j, so each degree adds one term to the one below.
 * The window holds at least `degree` + 1 readings; `scratch` (length ≥ window·(degree + 1)) is overwritten.
 */
export function polynomialSlopes(
  readings: Readings,
  noise: NoiseModel,
  from: number,
  to: number,
  degree: number,
  scratch?: Float64Array,
): PolynomialSlopes {
  const basis = orthonormalPolynomials(readings.time, from, to, degree, scratch);
  const projections = projectOn(basis, readings.signal, from);
  const { derivatives } = polynomialsAt(basis.recurrence, 0);
  const slopes = [0];
  const standardErrors = [0];
  let slope = 0;
  const { columns, points } = basis;
  // The first column is constant and never enters a slope: it carries the growing row a_d.
  const row = columns.subarray(0, points).fill(0);
  for (let d = 1; d <= degree; d++) {
    const derivative = derivatives[d] ?? Number.NaN;
    slope += derivative * (projections[d] ?? Number.NaN);
    slopes.push(slope);
    const column = columns.subarray(d * points, (d + 1) * points);
    for (let i = 0; i < points; i++) row[i] = (row[i] ?? Number.NaN) + derivative * (column[i] ?? Number.NaN);
    standardErrors.push(noise.standardDeviation * Math.sqrt(quadraticForm(row, noise.steps, from)));
  }
  return { from, to, slopes, standardErrors, recurrence: basis.recurrence, projections };
}

/** Coefficients of the polynomial of one degree in time since mixing. */
export function polynomialCurve(fit: PolynomialSlopes, degree: number): number[] {
  return plainCoefficients(fit.recurrence, fit.projections.slice(0, degree + 1));
}

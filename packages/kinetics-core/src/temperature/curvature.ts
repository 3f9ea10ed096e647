import { fSurvival } from "kinetics-core/distributions";
import { correlatedLeastSquares, entry, matrixFromColumns } from "kinetics-core/linear-algebra";
import { estimateOf, GAS_CONSTANT } from "kinetics-core/quantities";
import { mean } from "kinetics-core/summation";
import { EXACT_VARIANCE, FEWEST_FOR_CURVATURE } from "./constants";
import type { PlottedPoints } from "./point-variances";
import type { CurvatureTest } from "./temperature";

export interface CurvatureOptions {
  readonly variances: readonly number[];
  /** Residual standard deviation of ln k about the straight line. */
  readonly straightDeviation: number;
  readonly temperatures: number;
  readonly level: number;
}

/**
 * Does the activation energy change with temperature? With E_a = E₀ + C (T − T₀),
 *     ln k = const − E₀/(R T) + (C/R) q(T),   q = ln(T/T₀) + T₀/T − 1,
 * one more column beside the straight line's two, T₀ = 1/x̄. In the Eyring form ln T lies in the span of the three
 * columns, so both tests are one fit: ΔC_p‡ = C − R. q is −ln(1 + d) + d with d = T₀/T − 1, d²/2 near T₀.
 * The weights are the line's; s² is that of the curved fit. Null with fewer than five temperatures.
 */
export function curvatureOf(
  { reciprocals, logarithms }: PlottedPoints,
  { variances, straightDeviation, temperatures, level }: CurvatureOptions,
): CurvatureTest | null {
  const degreesOfFreedom = reciprocals.length - 3;
  if (temperatures < FEWEST_FOR_CURVATURE) return null;
  const centre = mean(reciprocals);
  const terms = matrixFromColumns([
    reciprocals.map(() => 1),
    reciprocals.map((x) => x - centre),
    reciprocals.map((x) => bend(x / centre - 1)),
  ]);
  const fit = correlatedLeastSquares(terms, logarithms, variances, []);
  const scale = fit.weightedSumOfSquares / degreesOfFreedom;
  const coefficient = GAS_CONSTANT * (fit.coefficients[2] ?? Number.NaN);
  const standardError = GAS_CONSTANT * Math.sqrt(scale * entry(fit.inverseInformation, 2, 2));
  // Points on the line to rounding: residuals and curvature are both rounding, and their ratio means nothing.
  const fStatistic = straightDeviation ** 2 < EXACT_VARIANCE ? 0 : (coefficient / standardError) ** 2;
  return {
    activationEnergySlope: estimateOf(coefficient, standardError, degreesOfFreedom, level),
    heatCapacityOfActivation: estimateOf(coefficient - GAS_CONSTANT, standardError, degreesOfFreedom, level),
    fStatistic,
    pValue: fSurvival(fStatistic, 1, degreesOfFreedom),
    degreesOfFreedom,
  };
}

/** d − ln(1 + d), by its series where the difference would cancel. */
function bend(d: number): number {
  if (Math.abs(d) > 0.05) return d - Math.log1p(d);
  let sum = 0;
  let power = d * d;
  for (let n = 2; n <= 12; n++) {
    sum += power / n;
    power *= -d;
  }
  return sum;
}

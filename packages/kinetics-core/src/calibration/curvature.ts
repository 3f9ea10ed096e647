import { fSurvival } from "kinetics-core/distributions";
import { dot, entry, leastSquares, matrixFromColumns } from "kinetics-core/linear-algebra";
import { type Estimate, estimateOf, verb } from "kinetics-core/quantities";
import type { CalibrationLine } from "./calibration";
import { levelsOf } from "./levels";

/**
 * Is a parabola better than the line? A quadratic term is added to the model and its reduction of the residual sum of
 * squares is compared with what the parabola leaves, as ISO 8466-1 does it:
 *
 *   F = (RSS_line − RSS_parabola)/(RSS_parabola/ν),   ν = n − 3 (n − 2 through the origin),   against F(1, ν).
 *
 * ISO 8466-1 calls a line curved where F exceeds the 99 % point. A test that does not find curvature has not shown
 * straightness: for that see `linearRange`.
 */
export type Curvature =
  | {
      readonly status: "tested";
      /** q of signal = α + β x + q x², with its own residual deviation. */
      readonly quadratic: Estimate;
      readonly fStatistic: number;
      readonly degreesOfFreedom: readonly [number, number];
      readonly pValue: number;
    }
  /** The standards obey the line to rounding: q is 0 as far as numbers go, and there is no scatter to test it by. */
  | { readonly status: "exact"; readonly message: string }
  | { readonly status: "too-few-standards"; readonly message: string };

export function testCurvature(line: CalibrationLine): Curvature {
  const { standards, interceptFitted, centre, level } = line;
  const levels = levelsOf(standards.map((one) => one.concentration));
  const usable = interceptFitted
    ? levels
    : levels.filter(([first = 0]) => standards[first]?.concentration !== 0);
  const parameters = interceptFitted ? 3 : 2;
  const freedom = standards.length - parameters;
  if (usable.length < parameters || freedom < 1)
    return {
      status: "too-few-standards",
      message: `Curvature needs ${parameters} levels${interceptFitted ? "" : " other than 0"} and one standard more; here ${verb(usable.length, "is", "are")} ${usable.length} ${verb(usable.length, "level", "levels")} and ${standards.length} ${verb(standards.length, "standard", "standards")}.`,
    };

  if (line.exact)
    return {
      status: "exact",
      message:
        "The standards lie on the line to the last digit, so there is no scatter to test curvature by.",
    };

  const scale = standards.reduce(
    (widest, one) => Math.max(widest, Math.abs(one.concentration - centre.concentration)),
    0,
  );
  const roots = standards.map((one) => Math.sqrt(one.weight));
  const abscissa = standards.map((one) => (one.concentration - centre.concentration) / scale);
  const columns = [
    ...(interceptFitted ? [roots] : []),
    abscissa.map((u, i) => u * (roots[i] ?? 0)),
    abscissa.map((u, i) => u * u * (roots[i] ?? 0)),
  ];
  // The line's residuals in place of the signals: the quadratic coefficient is the same, and no digits are lost to b x.
  const residuals = standards.map((one, i) => one.residual * (roots[i] ?? 0));
  const fit = leastSquares(matrixFromColumns(columns), residuals);
  const last = parameters - 1;
  const ordinate = standards.map((one, i) => one.signal * (roots[i] ?? 0));
  // A parabola through every standard leaves rounding alone, and a ratio to that would be no number.
  const left = Math.max(fit.residualSumOfSquares, Number.EPSILON ** 2 * dot(ordinate, ordinate));
  const reduction = Math.max(dot(residuals, residuals) - fit.residualSumOfSquares, 0);
  const fStatistic = reduction / (left / freedom);
  const quadratic = (fit.coefficients[last] ?? 0) / scale ** 2;
  const error = Math.sqrt((left / freedom) * entry(fit.inverseGram, last, last)) / scale ** 2;
  return {
    status: "tested",
    quadratic: estimateOf(quadratic, error, freedom, level),
    fStatistic,
    degreesOfFreedom: [1, freedom],
    pValue: fSurvival(fStatistic, 1, freedom),
  };
}

import { dot, entry, leastSquares, matrixFromColumns } from "kinetics-core/linear-algebra";
import { estimateOf } from "kinetics-core/quantities";
import { sum } from "kinetics-core/summation";
import type { CalibrationFault, CalibrationInput, CalibrationLine } from "./calibration";
import { calibrationFault } from "./calibration-fault";

/** What is below this many rounding errors of the signals is rounding. */
const ROUNDING_ERRORS = 16;

/**
 * Ordinary or weighted straight line through calibration standards, with or without intercept, by Householder QR on
 * the centred and scaled concentrations: offsets such as 273 K or steps such as 10⁻⁶ mol/L cost no digits.
 *
 * Refuses, as a value: arrays of different length, numbers that are not finite, weights that are not above 0, fewer
 * than two levels (one level other than 0 through the origin), and figures beyond what a double holds. With as many
 * standards as parameters the line is exact and carries no uncertainty.
 */
export function fitCalibrationLine(input: CalibrationInput): CalibrationLine | CalibrationFault {
  const fault = calibrationFault(input);
  if (fault !== null) return fault;

  const { concentrations, signals, level = 0.95 } = input;
  const interceptFitted = input.intercept !== "none";
  const weights = input.weights ?? concentrations.map(() => 1);
  const centre = interceptFitted ? weightedMean(concentrations, weights) : 0;
  const scale = concentrations.reduce((widest, x) => Math.max(widest, Math.abs(x - centre)), 0);
  const roots = weights.map(Math.sqrt);
  const abscissa = concentrations.map((x, i) => ((x - centre) / scale) * (roots[i] ?? 0));
  const ordinate = signals.map((y, i) => y * (roots[i] ?? 0));
  const fit = leastSquares(matrixFromColumns(interceptFitted ? [roots, abscissa] : [abscissa]), ordinate);

  const last = interceptFitted ? 1 : 0;
  const slope = slopeOf(fit.coefficients[last] ?? 0, scale, signals);
  const signalAtCentre = interceptFitted ? (fit.coefficients[0] ?? 0) : 0;
  const inverseSpread = entry(fit.inverseGram, last, last) / scale ** 2;
  const inverseWeight = interceptFitted ? entry(fit.inverseGram, 0, 0) : 0;
  const degreesOfFreedom = concentrations.length - last - 1;
  const variance = degreesOfFreedom > 0 ? fit.residualSumOfSquares / degreesOfFreedom : null;
  const intercept = signalAtCentre - slope * centre;
  const interceptFactor = inverseWeight + centre ** 2 * inverseSpread;
  return {
    status: "fitted",
    interceptFitted,
    slope: estimateOf(slope, errorOf(variance, inverseSpread), degreesOfFreedom, level),
    intercept: interceptFitted
      ? estimateOf(intercept, errorOf(variance, interceptFactor), degreesOfFreedom, level)
      : { estimate: 0, standardError: null, interval: null, level },
    covariance: variance === null || !interceptFitted ? null : -centre * inverseSpread * variance,
    correlation:
      variance === null || !interceptFitted ? null : -centre * Math.sqrt(inverseSpread / interceptFactor),
    residualStandardDeviation: errorOf(variance, 1),
    degreesOfFreedom,
    rSquared: rSquaredOf(signals, weights, fit.residualSumOfSquares, interceptFitted),
    exact: fit.residualSumOfSquares <= (ROUNDING_ERRORS * Number.EPSILON) ** 2 * dot(ordinate, ordinate),
    level,
    centre: { concentration: centre, signal: signalAtCentre },
    inverseWeight,
    inverseSpread,
    standards: concentrations.map((concentration, i) => ({
      concentration,
      signal: signals[i] ?? 0,
      weight: weights[i] ?? 0,
      residual: (fit.residuals[i] ?? 0) / (roots[i] ?? 1),
      leverage: fit.leverage[i] ?? 0,
    })),
  };
}

/** Signal of the line at a concentration. */
export function signalAt(line: CalibrationLine, concentration: number): number {
  return line.centre.signal + (line.slope.estimate ?? 0) * (concentration - line.centre.concentration);
}

/** A rise over the whole range that is rounding of the signals is no slope. */
function slopeOf(rise: number, scale: number, signals: readonly number[]): number {
  const largest = signals.reduce((greatest, y) => Math.max(greatest, Math.abs(y)), 0);
  return Math.abs(rise) <= ROUNDING_ERRORS * Number.EPSILON * largest ? 0 : rise / scale;
}

function errorOf(variance: number | null, factor: number): number | null {
  return variance === null ? null : Math.sqrt(variance * factor);
}

/** In two passes: the second takes back what the first lost to a large common offset. */
function weightedMean(values: readonly number[], weights: readonly number[]): number {
  const total = sum(weights);
  const first = dot(weights, values) / total;
  return (
    first +
    dot(
      weights,
      values.map((value) => value - first),
    ) /
      total
  );
}

function rSquaredOf(
  signals: readonly number[],
  weights: readonly number[],
  residual: number,
  aboutMean: boolean,
): number | null {
  const origin = aboutMean ? weightedMean(signals, weights) : 0;
  const total = signals.reduce((sum, y, i) => sum + (weights[i] ?? 0) * (y - origin) ** 2, 0);
  return total > 0 ? Math.min(Math.max(1 - residual / total, 0), 1) : null;
}

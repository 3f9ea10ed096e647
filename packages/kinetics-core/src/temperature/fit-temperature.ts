import {
  BOLTZMANN_CONSTANT,
  concentrationToMolar,
  exponentialOf,
  GAS_CONSTANT,
  PLANCK_CONSTANT,
  timeToSeconds,
} from "kinetics-core/quantities";
import { mean } from "kinetics-core/summation";
import { FEWEST_FOR_INTERVAL } from "./constants";
import { curvatureOf } from "./curvature";
import { allStated, type PlottedPoints, type PointVariances, pointVariances } from "./point-variances";
import {
  covarianceOf,
  estimateFunctional,
  type FittedLine,
  type Functional,
  fitReciprocalLine,
  residualsOf,
} from "./reciprocal-line";
import type {
  RateConstantMeasure,
  ReciprocalLine,
  SharedPointUncertainty,
  TemperatureInput,
  TemperatureResult,
} from "./temperature";
import { temperatureFlags } from "./temperature-flags";
import { distinctTemperatures, faultOf } from "./usable-points";

/**
 * Activation parameters from rate constants at several temperatures:
 *   Arrhenius   ln k = ln A − E_a/(R T)
 *   Eyring      ln(k h/(k_B T)) = ΔS‡/R − ΔH‡/(R T),   k in s⁻¹ and mol L⁻¹, transmission coefficient 1.
 * Both lines carry the same weights (`pointVariances`), so that E_a − ΔH‡ = R T at the weighted centre, as it should.
 * All points must belong to one law with one set of orders: k of another order is another quantity with another unit.
 */
export function fitTemperature(input: TemperatureInput): TemperatureResult {
  const fault = faultOf(input);
  if (fault !== null) return fault;
  const { points, shared = [], level = 0.95, weighting = "scatter" } = input;
  const plotted = plottedPoints(input);
  const temperatures = distinctTemperatures(points);
  const scatterIsKnown = temperatures >= FEWEST_FOR_INTERVAL;
  const scatterFrom = scatterIsKnown ? "residuals" : allStated(points) ? "stated" : "none";

  let slope = 0;
  let spread = pointVariances(plotted, slope, weighting, scatterIsKnown);
  let fitted = lineThrough(plotted, plotted.logarithms, spread, shared, slope, scatterFrom);
  // u(T) becomes a variance of ln k by the slope, which the weights hardly move: twice is enough.
  for (let round = 0; round < 2; round++) {
    slope = fitted.line.coefficients[1];
    spread = pointVariances(plotted, slope, weighting, scatterIsKnown);
    fitted = lineThrough(plotted, plotted.logarithms, spread, shared, slope, scatterFrom);
  }
  const arrhenius = fitted.line;
  const reduced = reducedLogarithms(plotted, input.unit);
  const eyring = lineThrough(plotted, reduced, spread, shared, slope, scatterFrom).line;

  const degreesOfFreedom = points.length - 2;
  const options = { level, degreesOfFreedom: scatterIsKnown ? degreesOfFreedom : null };
  const logPreExponential = estimateFunctional(arrhenius, atInfinity(arrhenius), options);
  const curvature = curvatureOf(plotted, {
    variances: spread.variances,
    straightDeviation: arrhenius.residualStandardDeviation ?? 0,
    temperatures,
    level,
  });
  const kelvins = points.map((point) => point.temperatureKelvin);
  const range = [Math.min(...kelvins), Math.max(...kelvins)] as const;
  const heaviest = Math.min(...spread.variances);
  return {
    status: "fitted",
    activationEnergy: estimateFunctional(arrhenius, ENERGY, options),
    logPreExponential,
    preExponential: exponentialOf(logPreExponential),
    enthalpyOfActivation: estimateFunctional(eyring, ENERGY, options),
    entropyOfActivation: estimateFunctional(eyring, entropy(eyring), options),
    covariance: {
      arrhenius: covarianceOf(arrhenius, ENERGY, atInfinity(arrhenius)),
      eyring: covarianceOf(eyring, ENERGY, entropy(eyring)),
    },
    arrhenius,
    eyring,
    degreesOfFreedom,
    betweenPointStandardDeviation: spread.between === null ? null : Math.sqrt(spread.between),
    newPointStandardDeviation: newPoint(fitted, spread, scatterIsKnown),
    temperatures,
    range,
    curvature,
    residuals: residualsOf(arrhenius, plotted.reciprocals, plotted.logarithms).map((residual, j) => ({
      residual,
      weight: heaviest / (spread.variances[j] ?? Number.NaN),
    })),
    level,
    flags: temperatureFlags(input, { temperatures, range, curvature, degreesOfFreedom }),
  };
}

/** E_a and ΔH‡ are −R times the slope of their line. */
const ENERGY: Functional = [0, -GAS_CONSTANT];

/** ln A: the line at 1/T = 0. */
function atInfinity(line: ReciprocalLine): Functional {
  return [1, -line.centre];
}

function entropy(line: ReciprocalLine): Functional {
  return [GAS_CONSTANT, -GAS_CONSTANT * line.centre];
}

function plottedPoints({ points }: TemperatureInput): PlottedPoints {
  return {
    points,
    reciprocals: points.map((point) => 1 / point.temperatureKelvin),
    logarithms: points.map((point) => Math.log(point.rateConstant)),
  };
}

/** ln(k h/(k_B T)) with k in s⁻¹ and mol L⁻¹. */
function reducedLogarithms(
  { points, logarithms }: PlottedPoints,
  unit: RateConstantMeasure | undefined,
): number[] {
  const offset = unit === undefined ? 0 : toMolarSeconds(unit);
  return logarithms.map(
    (value, j) =>
      value +
      offset +
      Math.log(PLANCK_CONSTANT / BOLTZMANN_CONSTANT) -
      Math.log(points[j]?.temperatureKelvin ?? Number.NaN),
  );
}

/** ln of what k must be multiplied by. A pressure in mmHg stays one: ΔS‡ then refers to 1 mmHg, and a flag says so. */
function toMolarSeconds({ overallOrder, concentrationUnit, timeUnit }: RateConstantMeasure): number {
  const molar = concentrationUnit === "mmHg" ? 1 : concentrationToMolar(1, concentrationUnit);
  return (1 - overallOrder) * Math.log(molar) - Math.log(timeToSeconds(1, timeUnit));
}

function lineThrough(
  { points, reciprocals }: PlottedPoints,
  values: readonly number[],
  { variances, floors }: PointVariances,
  shared: readonly SharedPointUncertainty[],
  slope: number,
  scatterFrom: "residuals" | "stated" | "none",
): FittedLine {
  // d ln k/dT = E_a/(R T²) = −b₁/T²; k itself moves by its relative error at every point alike.
  const loadings = shared.flatMap(({ relative = 0, temperatureKelvin = 0 }) => [
    ...(relative > 0 ? [points.map(() => relative)] : []),
    ...(temperatureKelvin > 0
      ? [points.map((point) => (-slope * temperatureKelvin) / point.temperatureKelvin ** 2)]
      : []),
  ]);
  return fitReciprocalLine({ reciprocals, values, variances, floors, loadings, scatterFrom });
}

/** s² times the mean variance: the scatter that the points show, and not below what they state. */
function newPoint(
  { scale }: FittedLine,
  { variances, floors }: PointVariances,
  scatterIsKnown: boolean,
): number | null {
  if (!scatterIsKnown || scale === null) return null;
  return Math.sqrt(Math.max(scale * mean(variances), mean(floors)));
}

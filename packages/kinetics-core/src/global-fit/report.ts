import {
  type Estimate,
  estimateOf,
  exponentialOf,
  noEstimate,
  rateConstantUnit,
} from "kinetics-core/quantities";
import { fitFlags } from "./fit-flags";
import type { FittedStudy } from "./fitted-study";
import type { FittedRun, GlobalFit, GlobalFitInput, PooledEstimates } from "./global-fit";
import { NormalStep } from "./normal-step";
import { scalePlace } from "./prepared-study";
import { ownAutocorrelation } from "./reading-noise";

/** Gives the numbers of a fitted study their names, units and intervals. */
export function report(input: GlobalFitInput, fitted: FittedStudy): GlobalFit {
  const { study, theta, inference, names } = fitted;
  const level = input.level ?? 0.95;
  const freedom = inference.degreesOfFreedom;
  const at = (place: number): Estimate =>
    estimateOf(
      theta[place] ?? Number.NaN,
      freedom > 0 ? Math.sqrt(inference.covariance[place]?.[place] ?? Number.NaN) : null,
      freedom,
      level,
    );
  const logRateConstant = at(0);
  const parameters = named(study.law.free, at);
  const order = study.law.overallOrder(theta.subarray(1, 1 + study.law.free.length));
  const place = scalePlace(study);
  return {
    status: "fitted",
    parameters,
    orders: ordersOf(input, parameters, level),
    logRateConstant,
    rateConstant: {
      ...exponentialOf(logRateConstant),
      unit:
        order === null
          ? null
          : rateConstantUnit(order, input.concentrationUnit ?? "mol/L", input.timeUnit ?? "s"),
    },
    signalPerConcentration:
      place < 0 ? estimateOf(study.scale, 0, Number.POSITIVE_INFINITY, level) : times(at(place), study.scale),
    betweenRunStandardDeviation: freedom > 0 ? inference.betweenRunStandardDeviation : null,
    degreesOfFreedom: freedom,
    parameterNames: names,
    covariance: freedom > 0 ? inference.covariance : null,
    pooled: pooledEstimates(input, fitted, level),
    runs: fitted.pass.runs.map((_, j) => fittedRun(fitted, j, level)),
    residualStandardDeviation: residualDeviation(fitted),
    iterations: fitted.iterations,
    flags: fitFlags(input, fitted),
    information: fitted.information,
    priors: fitted.priors,
    inference,
    undeterminedWithinRuns: fitted.undetermined,
  };
}

function named(names: readonly string[], at: (place: number) => Estimate): Record<string, Estimate> {
  const result: Record<string, Estimate> = {};
  names.forEach((name, j) => {
    result[name] = at(1 + j);
  });
  return result;
}

/** Every species of a law of powers has an order: the fitted one, or the one at which it was held. */
function ordersOf(
  { law, species }: GlobalFitInput,
  parameters: Readonly<Record<string, Estimate>>,
  level: number,
): Record<string, Estimate> {
  const result: Record<string, Estimate> = {};
  if (!("orders" in law)) return result;
  for (const { name } of species) {
    const order = law.orders[name];
    if (order === undefined) continue;
    result[name] =
      order === "free" ? (parameters[name] ?? noEstimate(level)) : estimateOf(order, null, null, level);
  }
  return result;
}

function times(one: Estimate, factor: number): Estimate {
  const { estimate, standardError, interval, level } = one;
  const ends = interval === null ? null : [interval[0] * factor, interval[1] * factor];
  return {
    estimate: estimate === null ? null : estimate * factor,
    standardError: standardError === null ? null : standardError * Math.abs(factor),
    interval: ends === null ? null : [Math.min(...ends), Math.max(...ends)],
    level,
  };
}

function pooledEstimates(input: GlobalFitInput, fitted: FittedStudy, level: number): PooledEstimates {
  const { pooled, study } = fitted;
  const p = pooled.theta.length;
  const inverse = new NormalStep(p).inverse(pooled.gram);
  const at = (place: number): Estimate => {
    const variance = pooled.variance * (inverse[place * p + place] ?? Number.NaN);
    return estimateOf(
      pooled.theta[place] ?? Number.NaN,
      variance > 0 ? Math.sqrt(variance) : null,
      roundedFreedom(pooled.freedom),
      level,
    );
  };
  const parameters = named(study.law.free, at);
  return { parameters, orders: ordersOf(input, parameters, level), logRateConstant: at(0) };
}

function fittedRun(fitted: FittedStudy, index: number, level: number): FittedRun {
  const { study, inference, linearisedAt, information, pass } = fitted;
  const run = study.runs[index];
  const own = inference.runs[index]?.own ?? null;
  const linearisation = pass.runs[index];
  const told = information[index];
  if (run === undefined || linearisation === undefined || told === undefined)
    throw new RangeError(`no run number ${index}`);
  const ratio = scalePlace(study) < 0 ? 1 : (linearisedAt[scalePlace(study)] ?? 1);
  const { autocorrelation: rho, degreesOfFreedom } = told;
  const freedom = degreesOfFreedom - 1;
  const independent = roundedFreedom((freedom * (1 - rho)) / (1 + rho));
  const g = told.gram[0] ?? 0;
  const squares = Math.max(0, told.residualSquares - (g > 0 ? (told.gradient[0] ?? 0) ** 2 / g : 0));
  const offset =
    linearisation.startSignal - study.scale * ratio * linearisation.scaleRatio * run.followedStart;
  return {
    label: run.label,
    logRateConstant:
      own === null
        ? noEstimate(level)
        : estimateOf((linearisedAt[0] ?? 0) + own.offset, own.standardError, independent, level),
    offset: Number.isFinite(offset) ? offset : null,
    residualStandardDeviation: freedom > 0 ? Math.sqrt(squares / freedom) : null,
    autocorrelation: ownAutocorrelation(linearisation),
    points: run.time.length,
  };
}

function residualDeviation({ information }: FittedStudy): number | null {
  let squares = 0;
  let freedom = 0;
  for (const { gram, gradient, residualSquares, degreesOfFreedom } of information) {
    const g = gram[0] ?? 0;
    squares += Math.max(0, residualSquares - (g > 0 ? (gradient[0] ?? 0) ** 2 / g : 0));
    freedom += degreesOfFreedom - 1;
  }
  return freedom > 0 ? Math.sqrt(squares / freedom) : null;
}

/** Degrees of freedom beyond which Student's quantile is the normal one to half a per cent. */
const MANY = 300;

/** Rounded down to a digit, since effective readings are known no better, and without end where they are many. */
function roundedFreedom(value: number): number {
  if (value > MANY) return Number.POSITIVE_INFINITY;
  const unit = 10 ** Math.floor(Math.log10(value));
  return value > 1 ? Math.floor(value / unit) * unit : value;
}

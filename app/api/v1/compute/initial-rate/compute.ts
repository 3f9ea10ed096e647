import { studentTQuantile } from "kinetics-core/distributions";
import {
  estimateInitialRate,
  type InitialRate,
  type InitialRateOptions,
  type Trace,
} from "kinetics-core/initial-rate";
import { phaseFlag } from "kinetics-core/integrated";
import type { Estimate } from "kinetics-core/quantities";
import type { Computed } from "../estimate.schema";
import type { InitialRateRequest, InitialRateResponse } from "./schema";

/** From the slope of the signal to the rate that was asked for: divide by ε·l and by ν where they are given. */
interface Scale {
  readonly divisor: number;
  /** Relative standard uncertainty of the divisor. */
  readonly relative: number;
}

/** The public face of `estimateInitialRate`: names of the API in, names of the API out, nothing stored. */
export function computeInitialRate(request: InitialRateRequest): Computed<InitialRateResponse> {
  const { trace, options } = estimateOf(request);
  return initialRateFault(request) ?? initialRateAnswer(request, estimateInitialRate(trace, options));
}

/** What the schema cannot see: a degree for an estimator that has none. */
export function initialRateFault(request: InitialRateRequest): Computed<InitialRateResponse> | null {
  if (request.degree !== undefined && request.estimator !== "tangent") {
    return fault(
      "degree",
      "A degree goes with the estimator “tangent” only; leave it out or ask for that one.",
    );
  }
  return null;
}

/** The same request in the names of the library. */
export function estimateOf(request: InitialRateRequest): { trace: Trace; options: InitialRateOptions } {
  const span = signalSpan(request);
  return {
    trace: { time: request.time, signal: request.signal },
    options: {
      timeZero: request.timeZero,
      estimator: request.estimator,
      level: levelOf(request),
      ...(span === undefined ? {} : { signalSpan: span }),
      ...(request.window === undefined ? {} : { window: request.window }),
      ...(request.degree === undefined ? {} : { degree: request.degree }),
    },
  };
}

function levelOf(request: InitialRateRequest): number {
  return request.level ?? 0.95;
}

export function initialRateAnswer(
  request: InitialRateRequest,
  result: InitialRate,
): Computed<InitialRateResponse> {
  const level = levelOf(request);
  if (result.status === "too-few-points") return fault(request.window ? "window" : "time", result.message);
  if (result.status === "unusable") return fault(FAULT_PLACES[result.code], result.message);

  const scale = scaleOf(request);
  const scaled = (slope: number, standardError: number) =>
    scaledEstimate(slope, standardError, result.degreesOfFreedom, level, scale);
  return {
    ok: true,
    answer: {
      rate: scaled(result.slope, result.standardError),
      estimator: result.estimator,
      degree: result.degree,
      window: [...result.window],
      points: result.points,
      conversion: result.conversion,
      degreesOfFreedom: result.degreesOfFreedom,
      autocorrelation: result.autocorrelation,
      effectivePoints: result.effectivePoints,
      noise: result.noise,
      alternatives: result.alternatives.map((one) => ({
        estimator: one.estimator,
        degree: one.degree,
        rate: scaled(one.slope, one.standardError),
        window: [...one.window],
      })),
      flags: [...result.flags, ...phaseFlagsOf(request)],
    },
  };
}

/** A window by hand is the asker's own choice of what is initial. */
function phaseFlagsOf({ time, signal, timeZero, window }: InitialRateRequest) {
  const flag = window === undefined ? phaseFlag({ time, signal }, { timeZero }) : null;
  return flag === null ? [] : [{ ...flag }];
}

const FAULT_PLACES = {
  "not-increasing": "time",
  "flat-time": "time",
  "not-finite": "signal",
  "lengths-differ": "signal",
  "empty-window": "window",
  "no-slope": "estimator",
} as const;

/**
 * Signal change at complete conversion. A followed reactant is used up itself, whatever its stoichiometric
 * number; a followed product appears ν times for every limiting reactant of number −1.
 */
function signalSpan(request: InitialRateRequest): number | undefined {
  if (request.initialConcentration === undefined) return undefined;
  const perConcentration = Math.abs(request.signalPerConcentration?.value ?? 1);
  const formed = Math.max(request.stoichiometricNumber ?? -1, 0) || 1;
  return request.initialConcentration * perConcentration * formed;
}

function scaleOf(request: InitialRateRequest): Scale {
  const factor = request.signalPerConcentration ?? { value: 1, standardUncertainty: 0 };
  return {
    divisor: factor.value * (request.stoichiometricNumber ?? 1),
    relative: factor.standardUncertainty / Math.abs(factor.value),
  };
}

/** GUM propagation through the quotient; ε·l is known well, so Welch–Satterthwaite gives it infinite freedom. */
function scaledEstimate(
  slope: number,
  standardError: number,
  degreesOfFreedom: number,
  level: number,
  scale: Scale,
): Estimate & { interval: [number, number] | null } {
  const estimate = slope / scale.divisor;
  const fitted = standardError / Math.abs(scale.divisor);
  const variance = fitted ** 2 + (estimate * scale.relative) ** 2;
  const combined = Math.sqrt(variance);
  if (!Number.isFinite(combined)) return { estimate, standardError: null, interval: null, level };
  const freedom = fitted > 0 ? (variance ** 2 / fitted ** 4) * degreesOfFreedom : degreesOfFreedom;
  const half = studentTQuantile((1 + level) / 2, freedom) * combined;
  return { estimate, standardError: combined, interval: [estimate - half, estimate + half], level };
}

function fault(path: string, message: string): Computed<InitialRateResponse> {
  return { ok: false, errors: [{ path, message }] };
}

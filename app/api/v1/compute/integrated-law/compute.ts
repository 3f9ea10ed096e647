import {
  fitIntegratedLaw,
  type IntegratedLawInput,
  type IntegratedLawResult,
} from "kinetics-core/integrated";
import type { Computed } from "../estimate.schema";
import { plainEstimate } from "../plain-estimate";
import type { IntegratedLawRequest, IntegratedLawResponse } from "./schema";

/** The public face of `fitIntegratedLaw`: names of the API in, names of the API out, nothing stored. */
export function computeIntegratedLaw(request: IntegratedLawRequest): Computed<IntegratedLawResponse> {
  return integratedLawAnswer(fitIntegratedLaw(integratedLawInput(request)));
}

/** The same request in the names of the library. */
export function integratedLawInput(request: IntegratedLawRequest): IntegratedLawInput {
  const { time, signal, order, endSignal, timeZero, signalUnit, timeUnit, level } = request;
  return {
    time,
    signal,
    order,
    ...(endSignal === undefined ? {} : { endSignal }),
    ...(timeZero === undefined ? {} : { timeZero }),
    ...(signalUnit === undefined ? {} : { signalUnit }),
    ...(timeUnit === undefined ? {} : { timeUnit }),
    ...(level === undefined ? {} : { level }),
  };
}

export function integratedLawAnswer(result: IntegratedLawResult): Computed<IntegratedLawResponse> {
  if (result.status === "unusable") return fault(FAULT_PLACES[result.code], result.message);
  if (result.status === "too-few-points") return fault("time", result.message);
  if (result.status === "not-converged") return fault("signal", result.message);
  return {
    ok: true,
    answer: {
      order: plainEstimate(result.order),
      rateConstant: { ...plainEstimate(result.rateConstant), unit: result.rateConstant.unit },
      logRateConstant: plainEstimate(result.logRateConstant),
      initialSignal: plainEstimate(result.initialSignal),
      endSignal: plainEstimate(result.endSignal),
      halfLife: plainEstimate(result.halfLife),
      conversion: result.conversion,
      residualStandardDeviation: result.residualStandardDeviation,
      degreesOfFreedom: result.degreesOfFreedom,
      autocorrelation: result.autocorrelation,
      effectivePoints: result.effectivePoints,
      points: result.points,
      aicc: result.aicc,
      orderStandardError: result.orderStandardError,
      endConflict: result.endConflict,
      lackOfFit: result.lackOfFit === null ? null : { ...result.lackOfFit },
      flags: result.flags.map((flag) => ({ ...flag })),
    },
  };
}

const FAULT_PLACES = {
  "not-increasing": "time",
  "flat-time": "time",
  "not-finite": "signal",
  "lengths-differ": "signal",
  "empty-window": "time",
  "no-slope": "signal",
  "constant-signal": "signal",
} as const;

function fault(path: string, message: string): Computed<IntegratedLawResponse> {
  return { ok: false, errors: [{ path, message }] };
}

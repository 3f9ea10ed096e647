import {
  fitGlobalAndCompareEnds,
  type GlobalFit,
  type GlobalFitInput,
  type GlobalFitResult,
  robustBeside,
} from "kinetics-core/global-fit";
import type { Estimate } from "kinetics-core/quantities";
import type { Computed } from "../estimate.schema";
import { plainEstimate as plain } from "../plain-estimate";
import type { GlobalFitRequest, GlobalFitResponse } from "./schema";

/** The public face of the global fit: names of the API in, names of the API out, nothing stored. */
export function computeGlobalFit(request: GlobalFitRequest): Computed<GlobalFitResponse> {
  return globalFitAnswer(fitGlobalAndCompareEnds(globalFitInput(request)));
}

/** The same request in the names of the library. */
export function globalFitInput(request: GlobalFitRequest): GlobalFitInput {
  const { orders, runs, level, scaleDeviation, ...rest } = request;
  return {
    ...rest,
    ...(level === undefined ? {} : { level }),
    ...(scaleDeviation === undefined ? {} : { scaleDeviation }),
    law: { orders },
    runs: runs.map(({ endSignal, timeZero, ...run }) => ({
      ...run,
      ...(timeZero === undefined ? {} : { timeZero }),
      ...endReadingOf(endSignal),
    })),
  };
}

type EndSignal = GlobalFitRequest["runs"][number]["endSignal"];

/** A number is as good as one reading; a kind says that the end is exactly zero, or that nothing is known of it. */
function endReadingOf(end: EndSignal): Pick<GlobalFitInput["runs"][number], "endSignal"> {
  if (end === undefined) return {};
  if (typeof end === "number") return { endSignal: { value: end, standardUncertainty: null } };
  if ("value" in end)
    return { endSignal: { value: end.value, standardUncertainty: end.standardUncertainty } };
  return end.kind === "zero" ? { endSignal: { value: 0, standardUncertainty: 0 } } : {};
}

export function globalFitAnswer(result: GlobalFitResult): Computed<GlobalFitResponse> {
  if (result.status === "fitted") return { ok: true, answer: answerOf(result) };
  const path = result.path.replace(/^law\.?/, "") || "orders";
  return { ok: false, errors: [{ path, message: result.message }] };
}

function answerOf(fit: GlobalFit): GlobalFitResponse {
  const robust = robustBeside(fit);
  return {
    orders: plainEach(fit.orders),
    rateConstant: { ...plain(fit.rateConstant), unit: fit.rateConstant.unit ?? "" },
    logRateConstant: plain(fit.logRateConstant),
    betweenRunStandardDeviation: fit.betweenRunStandardDeviation,
    degreesOfFreedom: fit.degreesOfFreedom,
    parameterNames: [...fit.parameterNames],
    covariance: fit.covariance?.map((row) => [...row]) ?? null,
    signalPerConcentration: plain(fit.signalPerConcentration),
    clusterRobust: {
      orders: plainEach(robust.parameters),
      logRateConstant: plain(robust.logRateConstant),
    },
    pooled: {
      orders: plainEach(fit.pooled.orders),
      logRateConstant: plain(fit.pooled.logRateConstant),
    },
    runs: fit.runs.map((run) => ({
      label: run.label,
      logRateConstant: plain(run.logRateConstant),
      offset: run.offset,
      residualStandardDeviation: run.residualStandardDeviation,
      autocorrelation: run.autocorrelation,
    })),
    residualStandardDeviation: fit.residualStandardDeviation,
    iterations: fit.iterations,
    flags: [...fit.flags, ...robust.flags].map((flag) => ({ ...flag })),
  };
}

function plainEach(estimates: Readonly<Record<string, Estimate>>): GlobalFitResponse["orders"] {
  const each: GlobalFitResponse["orders"] = {};
  for (const [name, estimate] of Object.entries(estimates)) each[name] = plain(estimate);
  return each;
}

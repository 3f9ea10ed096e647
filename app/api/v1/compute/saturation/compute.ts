import type { Estimate } from "kinetics-core/quantities";
import { fitSaturation } from "kinetics-core/saturation";
import type { Computed } from "../estimate.schema";
import type { SaturationRequest, SaturationResponse } from "./schema";

/** The public face of `fitSaturation`. */
export function computeSaturation({
  concentrations,
  rates,
  level,
}: SaturationRequest): Computed<SaturationResponse> {
  const fit = fitSaturation({ concentrations, rates, ...(level === undefined ? {} : { level }) });
  if (fit.status !== "fitted") return { ok: false, errors: [{ path: fit.place, message: fit.message }] };
  return {
    ok: true,
    answer: {
      limitingRate: plain(fit.limitingRate),
      halfSaturation: plain(fit.halfSaturation),
      initialSlope: plain(fit.initialSlope),
      covariance: fit.covariance === null ? null : fit.covariance.map((row) => [...row]),
      correlation: fit.correlation,
      residualStandardDeviation: fit.residualStandardDeviation,
      degreesOfFreedom: fit.degreesOfFreedom,
      residuals: [...fit.residuals],
      lackOfFit:
        fit.lackOfFit === null
          ? null
          : { ...fit.lackOfFit, degreesOfFreedom: [...fit.lackOfFit.degreesOfFreedom] },
      flags: fit.flags.map((flag) => ({ ...flag })),
    },
  };
}

function plain(one: Estimate) {
  const interval: [number, number] | null = one.interval === null ? null : [...one.interval];
  return { estimate: one.estimate, standardError: one.standardError, interval, level: one.level };
}

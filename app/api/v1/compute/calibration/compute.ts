import { type Calibration, calibrate } from "kinetics-core/calibration";
import type { Computed } from "../estimate.schema";
import { plainEstimate } from "../plain-estimate";
import type { CalibrationRequest, CalibrationResponse } from "./schema";

/** The public face of `calibrate`. */
export function computeCalibration(request: CalibrationRequest): Computed<CalibrationResponse> {
  const result = calibrate(request);
  if (result.status === "calibrated") return { ok: true, answer: answerOf(result) };
  const replicate = "replicate" in result ? result.replicate : null;
  const path = [result.argument, result.index, replicate].filter((part) => part !== null).join(".");
  return { ok: false, errors: [{ path, message: result.message }] };
}

function answerOf(calibration: Calibration): CalibrationResponse {
  const { line, curvature, lackOfFit, linearRange } = calibration;
  const tested = curvature.status === "tested" ? curvature : null;
  return {
    slope: plainEstimate(line.slope),
    intercept: plainEstimate(line.intercept),
    covariance: line.covariance,
    correlation: line.correlation,
    residualStandardDeviation: line.residualStandardDeviation,
    degreesOfFreedom: line.degreesOfFreedom,
    rSquared: line.rSquared,
    curvature: {
      fStatistic: tested?.fStatistic ?? null,
      pValue: tested?.pValue ?? null,
      quadratic: tested === null ? null : plainEstimate(tested.quadratic),
    },
    lackOfFit:
      lackOfFit === null ? null : { ...lackOfFit, degreesOfFreedom: [...lackOfFit.degreesOfFreedom] },
    linearRange:
      linearRange.status === "assessed"
        ? {
            straightUpTo: linearRange.straightUpTo,
            curvedFrom: linearRange.curvedFrom,
            moreStandards: linearRange.moreStandards,
            scatterNeeded: linearRange.scatterNeeded,
          }
        : null,
    limitOfDetection: calibration.limitOfDetection,
    limitOfQuantitation: calibration.limitOfQuantitation,
    readings: calibration.readings.map(plainEstimate),
    residuals: line.standards.map((standard) => standard.residual),
    flags: calibration.flags.map((flag) => ({ ...flag })),
  };
}

import { equationValue } from "kinetics-core/rate-equation";
import type { FittedLaw, Prediction } from "./fitted-law";
import { bothEstimates, type LogPrediction, logPrediction } from "./log-prediction";
import { rangeFlags } from "./prediction-flags";
import type { CourseFault } from "./reaction-course";

export interface RatePrediction extends Prediction {
  readonly status: "predicted";
  /** ln v with its variances, for sealing. */
  readonly logRate: LogPrediction;
}

/** Rate of reaction in a mixture: ln v = ln k + ln f(c; θ), ∂/∂θ = f_θ/f, interval back-transformed. */
export function predictRate(
  law: FittedLaw,
  concentrations: Readonly<Record<string, number>>,
): RatePrediction | CourseFault {
  const { equation, parameters } = law;
  const missing = equation.species.find((name) => !((concentrations[name] ?? -1) >= 0));
  if (missing !== undefined)
    return {
      status: "bad-mixture",
      place: `concentrations.${missing}`,
      message: `The concentration of ${missing} is ${concentrations[missing] ?? "missing"}; it must be 0 or above.`,
    };
  const value = equationValue(equation);
  const c = Float64Array.from(equation.species, (name) => concentrations[name] ?? Number.NaN);
  const hasValue = equation.evaluate(c, Float64Array.from(parameters), value);
  if (!hasValue || !(value.f > 0))
    return {
      status: "no-rate",
      place: "concentrations",
      message:
        "The law gives no rate of reaction above 0 in this mixture: a species that it needs is absent, or the mixture lies beyond its equilibrium. Change the concentrations.",
    };
  const gradient = [1, ...Array.from(value.byParameter, (derivative) => derivative / value.f)];
  const logRate = logPrediction(law, law.logRateConstant + Math.log(value.f), gradient);
  return {
    status: "predicted",
    ...bothEstimates(law, logRate),
    logRate,
    flags: rangeFlags(law, concentrations),
  };
}

import { type ProfileInterval, profileMarginal, randomRateInference } from "kinetics-core/inference";
import { type FittedStudy, fitStudy } from "./fitted-study";
import { failure, type GlobalFitFailure, type GlobalFitInput } from "./global-fit";
import { prepareStudy } from "./prepare-study";
import { informationOf, isSettled, moveRun, partOfStep, scalePrior, takeStep } from "./random-rate-search";

/**
 * Interval of one parameter of a global fit by profile of the marginal likelihood, σ_j² and the variance in the weights
 * held, its deviance per variance of the fit, so that on a linear model it is the Wald interval. At each value tried the
 * other parameters are fitted anew, relinearised like the fit itself. A parameter is held by one more observation of it,
 * a millionth of its standard error wide, since ln k cannot leave θ: its direction is that of the scatter between runs.
 */
export type GlobalProfile = ({ readonly status: "profiled" } & ProfileInterval) | GlobalFitFailure;

const HELD_WITHIN = 1e-6;
const MOST_LINEARISATIONS_HELD = 12;

/** `name`: "ln k", a free parameter of the law, or "scale" (the ratio of ε·l to its stated value). */
export function profileGlobalFit(input: GlobalFitInput, name: string): GlobalProfile {
  const level = input.level ?? 0.95;
  const prepared = prepareStudy(input);
  if (prepared.status === "refused") return prepared.failure;
  const fit = fitStudy(prepared.study, level, {});
  if (fit.status === "refused") return fit.failure;
  const { fitted } = fit;
  const place = fitted.names.indexOf(name);
  if (place < 0)
    return failure(
      "bad-input",
      "name",
      `${name} is no fitted parameter; ${fitted.names.join(", ")} can be profiled.`,
    );
  return { status: "profiled", ...profileOf(fitted, place, level) };
}

function profileOf(fitted: FittedStudy, place: number, level: number): ProfileInterval {
  const { inference, theta, names, bounds } = fitted;
  const standardError = Math.sqrt(inference.covariance[place]?.[place] ?? 0);
  const atEstimate = leastDeviance(fitted, place, theta[place] ?? 0, standardError);
  return profileMarginal({
    estimate: theta[place] ?? Number.NaN,
    standardError,
    degreesOfFreedom: inference.degreesOfFreedom,
    deviance: atEstimate ?? Number.NaN,
    refit: (value) => leastDeviance(fitted, place, value, standardError),
    ...(bounds[place] === undefined ? {} : { bounds: bounds[place] }),
    level,
    name: names[place] ?? "",
  });
}

/** Marginal deviance with one parameter at `value`, least over the others; null where they do not settle. */
function leastDeviance(
  fitted: FittedStudy,
  place: number,
  value: number,
  standardError: number,
): number | null {
  const { pass, inference: whole, bounds, logRate, tolerance, study } = fitted;
  // The weights of the fit take the runs to vary by h + f, its covariance by what they show.
  const perVariance = (whole.workingCovariance[place]?.[place] ?? 0) / (standardError * standardError);
  const theta = fitted.theta.slice();
  theta[place] = value;
  for (let linearisations = 0; linearisations < MOST_LINEARISATIONS_HELD; linearisations++) {
    if (!pass.at(theta, tolerance)) return null;
    const hold = { parameter: place, deviation: 0, standardUncertainty: HELD_WITHIN * standardError };
    const inference = randomRateInference(
      pass.runs.map((run, j) => informationOf(run, study.runs[j]?.label ?? "", fitted.noise[j])),
      [...scalePrior(pass, theta), hold],
      {
        undetermined: fitted.undetermined,
        betweenRunVariance: whole.weightVariance,
        noiseVariances: whole.noiseVariances,
      },
    );
    if (inference.status !== "determined") return null;
    const from = theta.slice();
    const step = takeStep(theta, bounds, inference.step, partOfStep(inference.step, logRate));
    theta[place] = value;
    pass.runs.forEach((run, j) => {
      moveRun(pass, run, inference, j, step, 1);
    });
    if (linearisations > 0 && isSettled({ ...inference, covariance: whole.covariance }, from, theta))
      return perVariance * (inference.marginalDeviance - 2 * Math.log(hold.standardUncertainty));
  }
  return null;
}

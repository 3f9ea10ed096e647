import type { PriorInformation, RandomRateInference, RunInformation } from "kinetics-core/inference";
import { beginning } from "./beginning";
import { FINE_BELOW, FINE_TOLERANCE, MOST_PASSES, SETTLED, STEP_TOLERANCE } from "./constants";
import { failure, type GlobalFitFailure, type GlobalFitOptions } from "./global-fit";
import { noCourse, notConverged, pooledFault, stopped } from "./pooled-fault";
import { PooledSearch } from "./pooled-search";
import { type PreparedStudy, scalePlace } from "./prepared-study";
import { randomRateSearch } from "./random-rate-search";
import type { ReadingNoise } from "./reading-noise";
import { StudyPass } from "./study-pass";

/**
 * The way of a fit: a start from the early rates, a search on thinned traces, the pooled fit of the full ones, then the
 * outer loop with run-to-run scatter. What comes out is numbers by place; `report` gives them their names.
 */
export interface FittedStudy {
  readonly study: PreparedStudy;
  readonly names: readonly string[];
  readonly theta: Float64Array;
  readonly linearisedAt: Float64Array;
  readonly inference: RandomRateInference;
  readonly information: readonly RunInformation[];
  readonly noise: readonly ReadingNoise[];
  readonly priors: readonly PriorInformation[];
  readonly undetermined: number;
  readonly pooled: PooledNumbers;
  readonly pass: StudyPass;
  readonly bounds: readonly (readonly [number, number])[];
  readonly logRate: Float64Array;
  readonly atBound: readonly string[];
  /** Passes over the full traces. */
  readonly iterations: number;
  readonly tolerance: number;
}

export interface PooledNumbers {
  readonly theta: Float64Array;
  /** Σ JᵀJ with the observation of ε·l, in signal². */
  readonly gram: Float64Array;
  readonly variance: number;
  readonly freedom: number;
}

export type StudyFit =
  | { readonly status: "fitted"; readonly fitted: FittedStudy }
  | { readonly status: "refused"; readonly failure: GlobalFitFailure };

export function fitStudy(study: PreparedStudy, level: number, options: GlobalFitOptions): StudyFit {
  const shouldStop = options.shouldStop ?? (() => false);
  const names = parameterNames(study);
  const pass = new StudyPass(study);
  const begun = beginning(study, pass, options, shouldStop);
  if (begun === null) return refused(shouldStop() ? stopped() : noCourse());
  const { theta, logRate, noise } = begun;
  pass.read(study);
  pass.reset();
  pass.setNoise(noise);
  const search = new PooledSearch(pass, theta, logRate);
  let tolerance = STEP_TOLERANCE;
  let end = search.search({ tolerance, settled: SETTLED, mostPasses: MOST_PASSES, shouldStop });
  if (end === "settled" && isFine(pass)) {
    tolerance = FINE_TOLERANCE;
    pass.setNoise(pass.ownVariance());
    end = search.search({ tolerance, settled: SETTLED, mostPasses: MOST_PASSES, shouldStop });
  }
  const fault = pooledFault(end, pass, names, theta);
  if (fault !== null) return refused(fault);
  const pooled = pooledNumbers(pass, theta);

  pass.setNoise(pass.ownVariance());
  for (const run of pass.runs) {
    const information = run.gram[0] ?? 0;
    const own = information > 0 ? (run.gradient[0] ?? 0) / information : 0;
    run.deviation = study.runs.length > 1 ? Math.max(-1, Math.min(1, own)) : 0;
  }
  const outcome = randomRateSearch(pass, theta, search.bounds, logRate, {
    tolerance,
    level,
    shouldStop,
  });
  if (outcome.status === "stopped") return refused(stopped());
  if (outcome.status === "no-course") return refused(noCourse());
  if (outcome.status === "failed")
    return refused(failure("not-determined", "runs", outcome.inference.message));
  if (!outcome.settled) return refused(notConverged());
  return {
    status: "fitted",
    fitted: {
      linearisedAt: outcome.linearisedAt,
      inference: outcome.inference,
      information: outcome.information,
      noise: outcome.noise,
      priors: outcome.priors,
      study,
      names,
      theta,
      undetermined: outcome.undetermined,
      pooled,
      pass,
      bounds: search.bounds,
      logRate,
      atBound: names.filter((_, i) => isAtBound(theta[i] ?? 0, search.bounds[i])),
      iterations: pass.passes,
      tolerance,
    },
  };
}

function isAtBound(value: number, bounds: readonly [number, number] | undefined): boolean {
  return bounds !== undefined && (value <= bounds[0] || value >= bounds[1]);
}

/** Names of θ: "ln k", the law's free parameters, "scale". */
export function parameterNames(study: PreparedStudy): readonly string[] {
  return ["ln k", ...study.law.free, ...(scalePlace(study) >= 0 ? ["scale"] : [])];
}

/** The residuals are so small that errors of the integration would show among them. */
function isFine(pass: StudyPass): boolean {
  const { study } = pass;
  const spans = study.runs.map(({ span }) => span).sort((a, b) => a - b);
  const signal = Math.abs((spans[spans.length >> 1] ?? 0) * study.scale * study.followedNumber);
  return Math.sqrt(pass.ownVariance()) < FINE_BELOW * signal;
}

function pooledNumbers(pass: StudyPass, theta: Float64Array): PooledNumbers {
  let freedom = -pass.parameters + (scalePlace(pass.study) >= 0 ? 1 : 0);
  for (const run of pass.runs) freedom += run.points - 1;
  return {
    theta: theta.slice(),
    gram: pass.gram.slice(),
    variance: pass.residualSquares / Math.max(1, freedom),
    freedom,
  };
}

function refused(fault: GlobalFitFailure): StudyFit {
  return { status: "refused", failure: fault };
}

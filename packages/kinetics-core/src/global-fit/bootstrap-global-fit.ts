import {
  type BootstrapIntervals,
  bootstrapIntervals,
  bootstrapRuns,
  type RandomRateInference,
  type RunInformation,
  randomRateInference,
} from "kinetics-core/inference";
import { type FittedStudy, fitStudy } from "./fitted-study";
import type { GlobalFitFailure, GlobalFitInput } from "./global-fit";
import { prepareStudy } from "./prepare-study";
import { informationOf, isSettled, moveRun, partOfStep, scalePrior, takeStep } from "./random-rate-search";

/**
 * Bootstrap over the runs of a global fit: whole runs drawn with replacement, each study fitted anew with scatter of
 * ln k between runs. A refit begins at the fit of the whole study, whose linearisation serves all of them: only the
 * runs drawn are passed over again, once each, to settle.
 */
export interface GlobalBootstrapOptions {
  /** Whole number. */
  readonly seed: number;
  /** Replicates `first` up to, not including, `last`; each is the same in whatever portion it is computed. */
  readonly first?: number;
  readonly last: number;
  readonly onProgress?: (done: number, of: number) => void;
  /** Asked before each replicate; true ends with what there is. */
  readonly shouldStop?: () => boolean;
}

export interface GlobalBootstrap {
  readonly status: "complete" | "stopped";
  /** "ln k", the free parameters, "scale": the order of every replicate. */
  readonly parameterNames: readonly string[];
  readonly estimates: readonly number[];
  /** Replicate to go on with. */
  readonly next: number;
  /** Null where a refit failed. */
  readonly replicates: readonly (Float64Array | null)[];
  readonly intervals: BootstrapIntervals;
}

export type GlobalBootstrapResult =
  | GlobalBootstrap
  | GlobalFitFailure
  | { readonly status: "too-few-runs" | "bad-request"; readonly message: string };

/** Linearisations of a refit; it begins a standard error from its answer, and one is usual. */
const MOST_REFIT_LINEARISATIONS = 8;

export function bootstrapGlobalFit(
  input: GlobalFitInput,
  options: GlobalBootstrapOptions,
): GlobalBootstrapResult {
  const level = input.level ?? 0.95;
  const prepared = prepareStudy(input);
  if (prepared.status === "refused") return prepared.failure;
  const fit = fitStudy(prepared.study, level, {});
  if (fit.status === "refused") return fit.failure;
  const { fitted } = fit;
  const refits = new Refits(fitted);
  const result = bootstrapRuns({
    runs: fitted.study.runs.length,
    seed: options.seed,
    first: options.first ?? 0,
    last: options.last,
    refit: (indices) => refits.at(indices),
    ...(options.onProgress === undefined ? {} : { onProgress: options.onProgress }),
    ...(options.shouldStop === undefined ? {} : { shouldStop: options.shouldStop }),
  });
  if (!("replicates" in result)) return result;
  return {
    status: result.status,
    next: result.next,
    replicates: result.replicates,
    parameterNames: fitted.names,
    estimates: Array.from(fitted.theta),
    intervals: bootstrapIntervals(fitted.theta, result.replicates, level),
  };
}

/** Where a run stands, to begin every refit from the same place. */
interface Stand {
  readonly deviation: number;
  readonly timeZero: number;
  readonly scaleRatio: number;
  readonly noise: number;
  readonly firstStep: number;
  readonly eliminated: readonly Float64Array[];
  readonly information: RunInformation;
}

class Refits {
  private readonly fitted: FittedStudy;
  private readonly stands: readonly Stand[];
  private readonly theta: Float64Array;

  constructor(fitted: FittedStudy) {
    this.fitted = fitted;
    this.theta = fitted.theta.slice();
    const { pass, study, tolerance } = fitted;
    pass.at(fitted.theta, tolerance);
    this.stands = pass.runs.map((run, j) => {
      const { deviation, timeZero, scaleRatio, noise, firstStep } = run;
      const information = informationOf(run, study.runs[j]?.label ?? "", fitted.noise[j]);
      return {
        deviation,
        timeZero,
        scaleRatio,
        noise,
        firstStep,
        eliminated: run.eliminated.map((row) => row.slice()),
        information: {
          ...information,
          gram: information.gram.slice(),
          gradient: information.gradient.slice(),
        },
      };
    });
  }

  /** θ of the runs at `indices`; null where it does not settle. */
  at(indices: Int32Array): Float64Array | null {
    const { fitted, theta, stands } = this;
    const { bounds, logRate, tolerance, pass } = fitted;
    theta.set(fitted.theta);
    const drawn = [...new Set(indices)];
    let told = this.begin(indices);
    // Found where the refit begins, a standard error from its end: there it hardly differs.
    let variance: number | null = null;
    for (let linearisations = 0; linearisations <= MOST_REFIT_LINEARISATIONS; linearisations++) {
      const inference = randomRateInference(told, scalePrior(pass, theta), {
        undetermined: fitted.undetermined,
        ...(variance === null ? {} : { betweenRunVariance: variance }),
      });
      if (inference.status !== "determined") return null;
      variance ??= inference.weightVariance;
      const from = theta.slice();
      const step = takeStep(theta, bounds, inference.step, partOfStep(inference.step, logRate));
      if (linearisations > 0 && isSettled(inference, from, theta)) return theta;
      this.move(drawn, indices, inference, step);
      for (const j of drawn) if (!pass.one(j, theta, tolerance)) return null;
      const anew = pass.runs.map((run, j) =>
        drawn.includes(j) ? informationOf(run, stands[j]?.information.label ?? "", fitted.noise[j]) : null,
      );
      told = Array.from(indices).flatMap((j) => anew[j] ?? []);
    }
    return null;
  }

  private begin(indices: Int32Array): readonly RunInformation[] {
    this.fitted.pass.runs.forEach((run, j) => {
      const stand = this.stands[j];
      if (stand === undefined) return;
      run.deviation = stand.deviation;
      run.timeZero = stand.timeZero;
      run.scaleRatio = stand.scaleRatio;
      run.noise = stand.noise;
      run.firstStep = stand.firstStep;
      run.eliminated.forEach((row, e) => {
        const kept = stand.eliminated[e];
        if (kept !== undefined) row.set(kept);
      });
    });
    return Array.from(indices).flatMap((j) => this.stands[j]?.information ?? []);
  }

  private move(
    drawn: readonly number[],
    indices: Int32Array,
    inference: RandomRateInference,
    step: Float64Array,
  ): void {
    for (const j of drawn) {
      const run = this.fitted.pass.runs[j];
      if (run !== undefined) moveRun(this.fitted.pass, run, inference, indices.indexOf(j), step, 1);
    }
  }
}

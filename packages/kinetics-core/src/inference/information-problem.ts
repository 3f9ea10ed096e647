import type { InferenceFailure } from "./random-rate-inference";
import type { PriorInformation, RunInformation } from "./run-information";

interface Held {
  readonly undetermined: number;
  readonly betweenRunVariance?: number;
  readonly noiseVariances?: readonly number[];
}

/** What keeps the information from being used, in a sentence that names the run; null where nothing does. */
export function informationProblem(
  runs: readonly RunInformation[],
  priors: readonly PriorInformation[],
  held: Held,
): InferenceFailure | null {
  const p = runs[0]?.gradient.length ?? 0;
  if (runs.length === 0 || p === 0)
    return {
      status: "no-runs",
      message: "There is no run with a parameter to infer. Give at least one run and one parameter, ln k.",
    };
  const sentence =
    firstOf(runs, (run) => runProblem(run, p)) ??
    firstOf(priors, (prior) => priorProblem(prior, p)) ??
    heldProblem(held, runs.length);
  return sentence === null ? null : { status: "bad-information", message: sentence };
}

function firstOf<T>(items: readonly T[], problem: (item: T) => string | null): string | null {
  for (const item of items) {
    const found = problem(item);
    if (found !== null) return found;
  }
  return null;
}

function runProblem(run: RunInformation, p: number): string | null {
  const { label, gram, gradient, residualSquares, degreesOfFreedom, points, autocorrelation } = run;
  if (gradient.length !== p || gram.length !== p * p)
    return `${label} has ${gradient.length} derivatives and a Gram matrix of ${gram.length} elements; ${p} and ${p * p} are needed, as in the first run.`;
  if (!gram.every(Number.isFinite) || !gradient.every(Number.isFinite))
    return `${label} has a derivative that is not a finite number. Set the run aside, or start the fit from other values.`;
  if (!(residualSquares >= 0 && Number.isFinite(residualSquares)))
    return `The sum of squares of ${label} is ${residualSquares}; a finite number from 0 on is needed.`;
  if (!(degreesOfFreedom >= 0 && points >= degreesOfFreedom && Number.isFinite(points)))
    return `${label} has ${points} points and ${degreesOfFreedom} degrees of freedom; both from 0 on, and no more freedom than points, are needed.`;
  if (!(autocorrelation > -1 && autocorrelation < 1))
    return `The autocorrelation of ${label} is ${autocorrelation}; a number between −1 and 1 is needed.`;
  return null;
}

function priorProblem({ parameter, deviation, standardUncertainty }: PriorInformation, p: number) {
  if (!(Number.isInteger(parameter) && parameter >= 0 && parameter < p))
    return `A stated value belongs to parameter ${parameter}; whole numbers from 0 to ${p - 1} are accepted.`;
  if (!Number.isFinite(deviation))
    return `The stated value of parameter ${parameter} departs by ${deviation}; a finite number is needed.`;
  if (!(standardUncertainty > 0 && Number.isFinite(1 / standardUncertainty ** 2)))
    return `The standard uncertainty of the stated value of parameter ${parameter} is ${standardUncertainty}; a number above 0 is needed. Hold a parameter that is exact.`;
  return null;
}

function heldProblem({ undetermined, betweenRunVariance, noiseVariances }: Held, runs: number) {
  if (!(Number.isInteger(undetermined) && undetermined >= 1))
    return `The number of parameters that only runs determine is ${undetermined}; a whole number from 1 (ln k) on is needed.`;
  if (betweenRunVariance !== undefined && !(betweenRunVariance >= 0 && Number.isFinite(betweenRunVariance)))
    return `The variance between runs is held at ${betweenRunVariance}; a finite number from 0 on is needed.`;
  if (
    noiseVariances !== undefined &&
    !(noiseVariances.length === runs && noiseVariances.every((one) => one > 0 && Number.isFinite(one)))
  )
    return `The noise variances are held, but they are not ${runs} finite numbers above 0, one a run.`;
  return null;
}

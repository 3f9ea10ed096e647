import { decompose, factorise, rankIn } from "./linearisation";
import type { NonlinearFit, NonlinearProblem, NonlinearSolution } from "./nonlinear-problem";
import { adjustableIn, type NonlinearSearch } from "./nonlinear-search";
import { rescale } from "./rescale";

/** What cannot be fitted at all, or null. */
export function refusalOf(problem: NonlinearProblem, start: ArrayLike<number>): NonlinearFit | null {
  const { residuals, parameters, bounds } = problem;
  const badStart = (message: string): NonlinearFit => ({ status: "bad-start", message });
  if (start.length !== parameters)
    return badStart(`The start has ${start.length} values; the problem has ${parameters} parameters.`);
  for (let j = 0; j < parameters; j++) {
    const value = start[j] ?? Number.NaN;
    const [low, high] = bounds?.[j] ?? [Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY];
    if (!Number.isFinite(value))
      return badStart(`The start of parameter ${j} is ${value}; it must be a finite number.`);
    if (!(value >= low && value <= high))
      return badStart(`The start of parameter ${j} is ${value}; it must lie between ${low} and ${high}.`);
  }
  const adjustable = adjustableIn(problem);
  if (residuals < adjustable)
    return {
      status: "too-few-points",
      message: `There are ${residuals} points for ${adjustable} parameters; at least as many points as parameters are needed.`,
    };
  return null;
}

const MESSAGES = {
  "no-descent":
    "No step lowers the sum of squares although the derivatives promise it: the model is flat or not smooth here, or its derivatives do not belong to it. Start elsewhere.",
  "out-of-evaluations":
    "The sum of squares was still falling when the allowed number of evaluations was used up. Start nearer to the answer, or allow more.",
  flat: "No parameter changes the residuals here: the point lies on a plateau of the model. Start elsewhere.",
  stopped: "The fit was stopped before its end.",
};

export type SearchEnd = "converged" | keyof typeof MESSAGES;

/** The current point of the search with its rank and covariance. */
export function solutionOf(search: NonlinearSearch, searchEnd: SearchEnd): NonlinearFit {
  const { current, degreesOfFreedom, low, high } = search;
  const determined = determination(search);
  const isFlat = determined.rank === 0 && search.adjustable > 0 && current.squares > 0;
  const end = searchEnd === "converged" && isFlat ? "flat" : searchEnd;
  const solution: NonlinearSolution = {
    // Copies: the search's own store is larger than what is kept of it.
    parameters: current.theta.slice(),
    residuals: current.residuals.slice(),
    residualSquares: current.squares,
    degreesOfFreedom,
    residualStandardDeviation: degreesOfFreedom > 0 ? Math.sqrt(current.squares / degreesOfFreedom) : null,
    ...determined,
    held: Array.from(current.theta, (value, j) => value <= (low[j] ?? 0) || value >= (high[j] ?? 0)),
    steps: search.steps,
    evaluations: search.evaluations,
  };
  if (end === "converged") return { status: "converged", ...solution };
  return { status: end === "stopped" ? "stopped" : "not-converged", message: MESSAGES[end], ...solution };
}

/**
 * (JᵀJ)⁻¹ = D⁻¹ V S⁻² Vᵀ D⁻¹ over the parameters that their bounds do not fix; a fixed one has zeros. A parameter that
 * rests on a bound counts as free here.
 */
function determination(search: NonlinearSearch): Pick<NonlinearSolution, "rank" | "unscaledCovariance"> {
  const { linear, current, free, low, high, adjustable } = search;
  rescale(search);
  factorise(current.jacobian, current.residuals, linear);
  for (let j = 0; j < free.length; j++) free[j] = (low[j] ?? 0) < (high[j] ?? 0) ? 1 : 0;
  decompose(linear, free, linear.projected);
  const rank = rankIn(linear);
  if (rank < adjustable) return { rank, unscaledCovariance: null };
  const { parameters: n, directions, singular, scale } = linear;
  const indices = Array.from({ length: n }, (_, j) => j);
  const element = (i: number, j: number) => {
    let sum = 0;
    for (let k = 0; k < n; k++) {
      const length = singular[k] ?? 0;
      if (length > 0)
        sum += ((directions[k * n + i] ?? 0) / length) * ((directions[k * n + j] ?? 0) / length);
    }
    return sum / ((scale[i] ?? 1) * (scale[j] ?? 1));
  };
  const covariance = indices.map((i) => indices.map((j) => element(i, j)));
  // Beyond what a double holds there is no number to give.
  const isPrintable = covariance.every((row) => row.every(Number.isFinite));
  return { rank, unscaledCovariance: isPrintable ? covariance : null };
}

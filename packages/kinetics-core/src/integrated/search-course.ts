import { fitNonlinear, type NonlinearSolution } from "kinetics-core/least-squares";
import { sumOfSquares } from "kinetics-core/summation";
import type { CourseLaw } from "./course-law";
import type { EndCondition } from "./end-signal";
import { type ProjectedCourse, projectedCourse } from "./projected-course";

/** A trace on its own scales: time from the first reading to 1 at the last, signal from the first over the range. */
export interface ScaledTrace {
  readonly time: Float64Array;
  readonly signal: Float64Array;
  /** What a reading is uncertain by at least, for it is a double: half their spacing at the largest signal. */
  readonly rounding: number;
}

export interface CourseFound {
  readonly status: "found";
  readonly theta: Float64Array;
  readonly held: readonly boolean[];
  readonly residuals: Float64Array;
  readonly residualSquares: number;
  /** Evaluated at `theta`. */
  readonly problem: ProjectedCourse;
}

export type CourseSearch = CourseFound | { readonly status: "not-converged"; readonly message: string };

/** Readings on which starting values compete. */
const THINNED_READINGS = 80;
/** Starts that are followed to their end: below first order the sum of squares has a least between each two readings. */
const FOLLOWED_STARTS = 4;
/** Steps of one descent; a well-posed one takes about ten. */
const MOST_EVALUATIONS = 300;

/**
 * The least of the sum of squares over θ, from many starts on a thinned trace and then on all readings; or from
 * `near` alone, the solution of a neighbouring problem.
 */
export function searchCourse(
  law: CourseLaw,
  trace: ScaledTrace,
  end: EndCondition,
  near?: ArrayLike<number>,
): CourseSearch {
  const problem = projectedCourse(law, trace.time, trace.signal, end);
  for (const start of near === undefined ? bestStarts(law, trace, end) : [near]) {
    const [fit] = descend(law, problem, start, trace.rounding);
    if (fit === undefined) continue;
    const residuals = new Float64Array(problem.residuals);
    problem.evaluate(fit.parameters, residuals, null);
    return {
      status: "found",
      theta: fit.parameters,
      held: fit.held,
      residuals,
      residualSquares: fit.residualSquares,
      problem,
    };
  }
  return {
    status: "not-converged",
    message:
      "The search for the course of this trace did not settle; check its time and signal columns, or hold the order.",
  };
}

/** Where descents on the thinned trace ended, best first. */
function bestStarts(law: CourseLaw, trace: ScaledTrace, end: EndCondition): Float64Array[] {
  const { time, signal } = thin(trace);
  const heats = projectedCourse(law, time, signal, end);
  return ranked(heats, startsOf(law, heats))
    .slice(0, FOLLOWED_STARTS)
    .flatMap((start) => descend(law, heats, start, trace.rounding))
    .sort((a, b) => a.residualSquares - b.residualSquares)
    .map(({ parameters }) => parameters);
}

/**
 * One descent; nothing where it did not settle. A course that ends before the last reading has a corner there, and the
 * sum of squares may have its least where a reading meets the corner: no gradient vanishes at such a point, and the
 * descent that can get no lower has arrived. So has one whose residuals are nothing but rounding, and one on a plateau:
 * a straight trace with a free end is the same at every rate. Plateaus far from the readings lose by their sum of squares.
 */
function descend(
  law: CourseLaw,
  problem: ProjectedCourse,
  start: ArrayLike<number>,
  rounding: number,
): NonlinearSolution[] {
  const fit = fitNonlinear(problem, start, { mostEvaluations: MOST_EVALUATIONS });
  if (fit.status === "converged") return [fit];
  if (!("parameters" in fit)) return [];
  const over = law.endOfCourse?.(fit.parameters) ?? Number.POSITIVE_INFINITY;
  return fit.rank === 0 || over < 1 || isExact(problem, fit, rounding) ? [fit] : [];
}

/** A residual collects about this many roundings of what it is the difference of. */
const ROUNDINGS = 32;

function isExact(
  problem: ProjectedCourse,
  { residualSquares }: NonlinearSolution,
  rounding: number,
): boolean {
  const { end, scales } = problem.linear;
  const parts = scales.reduce((sum, scale) => sum + Math.abs(scale), Math.abs(end));
  const largest = ROUNDINGS * (rounding + Number.EPSILON * parts);
  return residualSquares <= problem.residuals * largest * largest;
}

function thin({ time, signal }: ScaledTrace): Pick<ScaledTrace, "time" | "signal"> {
  if (time.length <= THINNED_READINGS) return { time, signal };
  const pick = (column: Float64Array) =>
    Float64Array.from(
      { length: THINNED_READINGS },
      (_, i) => column[Math.round((i * (column.length - 1)) / (THINNED_READINGS - 1))] ?? Number.NaN,
    );
  return { time: pick(time), signal: pick(signal) };
}

/** All combinations of the parameters' own starts. */
function startsOf(law: CourseLaw, { bounds }: ProjectedCourse): number[][] {
  return law.parameters.reduce<number[][]>(
    (tuples, { starts }, j) => {
      const [low, high] = bounds[j] ?? [Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY];
      const within = starts.filter((start) => start >= low && start <= high);
      return tuples.flatMap((tuple) => within.map((start) => [...tuple, start]));
    },
    [[]],
  );
}

/** Best first; starts at which the law has no finite value are left out. */
function ranked(problem: ProjectedCourse, starts: readonly number[][]): number[][] {
  const residuals = new Float64Array(problem.residuals);
  return starts
    .map((start) => {
      const valid = problem.evaluate(Float64Array.from(start), residuals, null);
      return { start, squares: valid ? sumOfSquares(residuals) : Number.POSITIVE_INFINITY };
    })
    .filter(({ squares }) => Number.isFinite(squares))
    .sort((a, b) => a.squares - b.squares)
    .map(({ start }) => start);
}

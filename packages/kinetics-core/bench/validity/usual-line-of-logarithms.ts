import { normalQuantile, studentTFactor } from "kinetics-core/distributions";
import { entry, leastSquares, matrixFromColumns } from "kinetics-core/linear-algebra";
import { type Estimate, noEstimate } from "kinetics-core/quantities";
import type { RateLawInput } from "kinetics-core/rate-law";

/** What is usually done with ln v on ln c, to be compared with; ln k is the last estimate. */
export interface UsualIntervals {
  /** Every run alike, Student's t. */
  readonly ordinary: readonly Estimate[];
  /** Weights from the rates' own errors, taken for all there is, with the normal quantile. */
  readonly weighted: readonly Estimate[];
}

const LEVEL = 0.95;

/** Estimates without a value where a rate has no logarithm; weighted ones also where no errors are stated. */
export function usualIntervals({ species, runs }: RateLawInput): UsualIntervals {
  const none = [...species, "ln k"].map(() => noEstimate(LEVEL));
  if (runs.some(({ rate }) => !(rate > 0))) return { ordinary: none, weighted: none };
  const ordinary = linesOf(
    { species, runs },
    runs.map(() => 1),
  );
  const freedom = runs.length - species.length - 1;
  const scatter = Math.sqrt(ordinary.squares / freedom);
  const stated = runs.every(({ rateStandardError = 0 }) => rateStandardError > 0);
  const roots = runs.map(({ rate, rateStandardError = 0 }) => rate / rateStandardError);
  return {
    ordinary: intervals(ordinary, scatter * studentTFactor(LEVEL, freedom)),
    weighted: stated ? intervals(linesOf({ species, runs }, roots), normalQuantile(0.5 + LEVEL / 2)) : none,
  };
}

interface Lines {
  readonly coefficients: readonly number[];
  readonly unscaledErrors: readonly number[];
  readonly squares: number;
}

/** ln v = Σ n_i ln c_i + ln k, rows times `roots`. */
function linesOf({ species, runs }: RateLawInput, roots: readonly number[]): Lines {
  const column = (of: (run: RateLawInput["runs"][number]) => number) =>
    Float64Array.from(runs, (run, j) => (roots[j] ?? 0) * of(run));
  const columns = species.map((name) =>
    column(({ concentrations }) => Math.log(concentrations[name] ?? Number.NaN)),
  );
  const fit = leastSquares(
    matrixFromColumns([...columns, column(() => 1)]),
    column(({ rate }) => Math.log(rate)),
  );
  return {
    coefficients: Array.from(fit.coefficients),
    unscaledErrors: Array.from(fit.coefficients, (_, i) => Math.sqrt(entry(fit.inverseGram, i, i))),
    squares: fit.residualSumOfSquares,
  };
}

function intervals({ coefficients, unscaledErrors }: Lines, factor: number): readonly Estimate[] {
  return coefficients.map((estimate, i) => {
    const half = factor * (unscaledErrors[i] ?? Number.NaN);
    return { estimate, standardError: null, interval: [estimate - half, estimate + half], level: LEVEL };
  });
}

import type { NonlinearProblem } from "kinetics-core/least-squares";
import { equationValue, type RateEquation } from "kinetics-core/rate-equation";
import { sum } from "kinetics-core/summation";

/** A run as a candidate law sees it. */
export interface CandidateRun {
  readonly label: string;
  /** In mol L⁻¹, of every species of every candidate; 0 for a product that was not added. */
  readonly concentrations: Readonly<Record<string, number>>;
  /** Rate of reaction in mol L⁻¹ s⁻¹, above 0. */
  readonly rate: number;
  /** w, 1/(u² + f) of the rate law or any multiple: the same for all candidates. */
  readonly weight: number;
}

/** Part of the mean that centring leaves as rounding: a column of nothing else would pass for a determined parameter. */
const ROUNDING_OF_CENTRING = 1e-13;

/**
 * ln v = ln k + ln f(c; θ) with weights w as a nonlinear problem in θ alone: at each θ the best ln k is the weighted
 * mean of ln v − ln f, so that every column is centred. A law whose k and constant grow together without end, a
 * saturation that the runs do not show, is then a short way and no ridge. Residuals are √w (ln v̂ − ln v). No value
 * where f is not above 0 in some run.
 */
export interface RateProblem extends NonlinearProblem {
  /** At θ: the best ln k, and its derivatives ∂ln k/∂θ with the sign changed. */
  level(theta: ArrayLike<number>): { readonly logConstant: number; readonly slopes: Float64Array } | null;
}

export function rateProblem(equation: RateEquation, runs: readonly CandidateRun[]): RateProblem {
  const m = runs.length;
  const p = equation.parameters.length;
  const logRates = Float64Array.from(runs, (run) => Math.log(run.rate));
  const weights = Float64Array.from(runs, (run) => run.weight);
  const total = sum(weights);
  const recipes = runs.map((run) =>
    Float64Array.from(equation.species, (name) => run.concentrations[name] ?? Number.NaN),
  );
  const value = equationValue(equation);
  const inner = new Float64Array(p);
  const departures = new Float64Array(m);
  const derivatives = Array.from({ length: p }, () => new Float64Array(m));

  /** ln v − ln f and ∂ln f/∂θ of every run; false where f has no logarithm. */
  function logarithms(theta: ArrayLike<number>): boolean {
    for (let k = 0; k < p; k++) inner[k] = theta[k] ?? Number.NaN;
    for (let j = 0; j < m; j++) {
      const recipe = recipes[j];
      if (recipe === undefined || !equation.evaluate(recipe, inner, value) || !(value.f > 0)) return false;
      departures[j] = (logRates[j] ?? 0) - Math.log(value.f);
      for (let k = 0; k < p; k++) {
        const column = derivatives[k];
        if (column !== undefined) column[j] = (value.byParameter[k] ?? 0) / value.f;
      }
    }
    return true;
  }

  function mean(values: Float64Array): number {
    let sum = 0;
    for (let j = 0; j < m; j++) sum += (weights[j] ?? 0) * (values[j] ?? 0);
    return sum / total;
  }

  return {
    residuals: m,
    parameters: p,
    bounds: equation.parameters.map(({ bounds }) => bounds),
    evaluate(theta, residuals, jacobian) {
      if (!logarithms(theta)) return false;
      const level = mean(departures);
      for (let j = 0; j < m; j++) residuals[j] = Math.sqrt(weights[j] ?? 0) * (level - (departures[j] ?? 0));
      jacobian?.forEach((column, k) => {
        const own = derivatives[k];
        if (own === undefined) return;
        const centre = mean(own);
        const least = ROUNDING_OF_CENTRING * Math.abs(centre);
        for (let j = 0; j < m; j++) {
          const rest = (own[j] ?? 0) - centre;
          column[j] = Math.abs(rest) > least ? Math.sqrt(weights[j] ?? 0) * rest : 0;
        }
      });
      return true;
    },
    level(theta) {
      if (!logarithms(theta)) return null;
      return { logConstant: mean(departures), slopes: Float64Array.from(derivatives, mean) };
    },
  };
}

/** What keeps a law from being fitted to these runs, in a sentence; null where nothing does. */
export function runsProblem(equation: RateEquation, runs: readonly CandidateRun[]): string | null {
  for (const { label, concentrations, rate, weight } of runs) {
    if (!(rate > 0 && Number.isFinite(rate)))
      return `The rate of ${label} is ${rate}, which has no logarithm. Set the run aside, or give its rate.`;
    if (!(weight > 0 && Number.isFinite(weight)))
      return `The weight of ${label} is ${weight}; a finite number above 0 is needed.`;
    for (const name of equation.species) {
      const concentration = concentrations[name];
      if (!(concentration !== undefined && concentration >= 0 && Number.isFinite(concentration)))
        return `${label} has no concentration of ${name}, which the law ${equation.law} needs. Give it, 0 where none was added.`;
    }
  }
  return null;
}

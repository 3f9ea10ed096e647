import type { NonlinearProblem } from "kinetics-core/least-squares";
import { equationValue, type RateEquation } from "kinetics-core/rate-equation";

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

/**
 * ln v = ln k + ln f(c; θ) with weights w as a nonlinear problem in (ln k, θ), with residuals √w (ln v̂ − ln v). A
 * logarithm is taken for k alone. No value where f is not above 0 in some run.
 */
export function rateProblem(equation: RateEquation, runs: readonly CandidateRun[]): NonlinearProblem {
  const m = runs.length;
  const p = equation.parameters.length;
  const logRates = Float64Array.from(runs, (run) => Math.log(run.rate));
  const roots = Float64Array.from(runs, (run) => Math.sqrt(run.weight));
  const recipes = runs.map((run) =>
    Float64Array.from(equation.species, (name) => run.concentrations[name] ?? Number.NaN),
  );
  const value = equationValue(equation);
  const inner = new Float64Array(p);
  return {
    residuals: m,
    parameters: p + 1,
    bounds: [
      [Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY],
      ...equation.parameters.map(({ bounds }) => bounds),
    ],
    evaluate(theta, residuals, jacobian) {
      for (let k = 0; k < p; k++) inner[k] = theta[k + 1] ?? Number.NaN;
      const logConstant = theta[0] ?? Number.NaN;
      for (let j = 0; j < m; j++) {
        const recipe = recipes[j];
        if (recipe === undefined || !equation.evaluate(recipe, inner, value) || !(value.f > 0)) return false;
        const root = roots[j] ?? 0;
        residuals[j] = root * (logConstant + Math.log(value.f) - (logRates[j] ?? 0));
        if (jacobian === null) continue;
        jacobian.forEach((column, k) => {
          column[j] = k === 0 ? root : (root * (value.byParameter[k - 1] ?? 0)) / value.f;
        });
      }
      return true;
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

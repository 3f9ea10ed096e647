import { studentTFactor } from "kinetics-core/distributions";
import type { ProfileInterval } from "kinetics-core/inference";
import { estimateOf, noEstimate } from "kinetics-core/quantities";
import type { RateEquation } from "kinetics-core/rate-equation";
import { bestFitOnRates, exactSquares, type RateFit } from "./best-fit-on-rates";
import type { Candidate, CandidateParameter } from "./candidate";
import { IMPOSSIBLE_LEVEL, INTERVAL_LEVEL } from "./constants";
import { extensionFacts } from "./extension-facts";
import { constantInterval, profilesOnRates } from "./profiles-on-rates";
import { type CandidateRun, rateProblem, runsProblem } from "./rate-problem";
import { replicateLackOfFit } from "./replicate-lack-of-fit";

/**
 * A candidate law fitted to initial rates, ln v = ln k + ln f(c; θ), with weights that all candidates share, and all
 * that a comparison asks of it. Orders have Wald intervals, constants profile intervals (their estimates are lopsided);
 * both by Student's t with m − p degrees of freedom. Never throws on data: what cannot be fitted has a sentence.
 */
export function fitCandidateOnRates(
  equation: RateEquation,
  runs: readonly CandidateRun[],
  id = equation.law,
): Candidate {
  const failed = (message: string): Candidate => ({ status: "failed", id, law: equation.law, message });
  const problem = runsProblem(equation, runs);
  if (problem !== null) return failed(problem);
  const fit = bestFitOnRates(equation, runs);
  if ("message" in fit) return failed(fit.message);
  const { theta } = fit;
  const residuals = new Float64Array(runs.length);
  const columns = Array.from(theta, () => new Float64Array(runs.length));
  rateProblem(equation, runs).evaluate(theta, residuals, columns);
  const roots = runs.map((run) => Math.sqrt(run.weight));
  const logResiduals = runs.map((_, j) => -(residuals[j] ?? 0) / (roots[j] ?? 1));
  const species = speciesOf(runs);
  const profiles = profilesOnRates(equation, runs, fit);
  return {
    status: "fitted",
    id,
    law: equation.law,
    parameters: theta.length + 1,
    runSquares: fit.runSquares,
    onRates: {
      residuals: logResiduals,
      fitted: runs.map((run, j) => Math.log(run.rate) - (logResiduals[j] ?? 0)),
      // Centred, as ln k has taken out their means: the columns span the same space.
      sensitivities: [
        runs.map(() => 1),
        ...columns.map((column) => Float64Array.from(column, (value, j) => value / (roots[j] ?? 1))),
      ],
      leaveOneOut: leaveOneOut(equation, runs, fit),
    },
    estimates: estimates(equation, runs, fit, { residuals, columns, profiles }),
    lackOfFit:
      fit.runSquares > exactSquares(runs)
        ? replicateLackOfFit(
            runs.map((run) => species.map((name) => run.concentrations[name] ?? 0)),
            logResiduals,
            runs.map((run) => run.weight),
            theta.length + 1,
          )
        : null,
    extensions: extensionFacts(equation, runs, fit, profiles),
  };
}

/** All that were mixed, so that runs that differ only in a species outside the law are no replicates. */
function speciesOf(runs: readonly CandidateRun[]): readonly string[] {
  return [...new Set(runs.flatMap((run) => Object.keys(run.concentrations)))].sort();
}

/** Refitted without each run in turn, weights kept; null where the others leave no freedom to fit with. */
function leaveOneOut(
  equation: RateEquation,
  runs: readonly CandidateRun[],
  fit: RateFit,
): readonly (number | null)[] {
  if (runs.length - 1 <= fit.theta.length + 1) return runs.map(() => null);
  return runs.map((run, j) => {
    const others = runs.filter((_, i) => i !== j);
    const without = bestFitOnRates(equation, others, fit.theta);
    if ("message" in without || without.unscaledCovariance === null) return null;
    // Of one run alone the best ln k is what it says itself.
    const own = rateProblem(equation, [run]).level(without.theta);
    return own === null ? null : own.logConstant - without.logConstant;
  });
}

interface AtSolution {
  readonly residuals: Float64Array;
  readonly columns: readonly Float64Array[];
  readonly profiles: readonly (ProfileInterval | null)[];
}

function estimates(
  equation: RateEquation,
  runs: readonly CandidateRun[],
  fit: RateFit,
  at: AtSolution,
): readonly CandidateParameter[] {
  const { unscaledCovariance } = fit;
  const freedom = runs.length - fit.theta.length - 1;
  const scale = freedom > 0 ? fit.runSquares / freedom : null;
  return [fit.logConstant, ...fit.theta].map((estimate, k) => {
    const definition = equation.parameters[k - 1];
    const variance = unscaledCovariance?.[k]?.[k];
    const standardError = variance !== undefined && scale !== null ? Math.sqrt(variance * scale) : null;
    const atBound = fit.held[k - 1] ?? false;
    if (definition === undefined || standardError === null)
      return {
        name: definition?.name ?? "ln k",
        value: estimateOf(estimate, standardError, freedom, INTERVAL_LEVEL),
        atBound,
        impossible: false,
      };
    const wald = estimateOf(estimate, standardError, freedom, INTERVAL_LEVEL);
    const profile = at.profiles[k - 1] ?? null;
    const interval =
      definition.kind === "constant" && profile !== null
        ? constantInterval(profile, definition.bounds[0])
        : wald.interval;
    return {
      name: definition.name,
      value: wald.estimate === null ? noEstimate(INTERVAL_LEVEL) : { ...wald, interval },
      atBound,
      impossible: atBound && isImpossible(fit, at, k - 1, definition.bounds, freedom),
    };
  });
}

/**
 * Where a parameter rests on a bound: one Gauss-Newton step δ without bounds tells where it would go, and its interval
 * there may lie wholly beyond the bound, a background below nothing. The step takes δ²/C_kk off the sum of squares; what
 * is left is the scatter by which that interval is measured.
 */
function isImpossible(
  fit: RateFit,
  { residuals, columns }: AtSolution,
  k: number,
  [low, high]: readonly [number, number],
  freedom: number,
): boolean {
  // Of θ alone, whose columns are centred.
  const row = fit.unscaledCovariance?.[k + 1]?.slice(1) ?? [];
  const variance = row[k] ?? 0;
  let step = 0;
  columns.forEach((column, i) => {
    let gradient = 0;
    for (let j = 0; j < residuals.length; j++) gradient += (column[j] ?? 0) * (residuals[j] ?? 0);
    step -= (row[i] ?? 0) * gradient;
  });
  if (!(variance > 0)) return false;
  const scatter = Math.max(0, fit.runSquares - step ** 2 / variance) / freedom;
  const half = studentTFactor(IMPOSSIBLE_LEVEL, freedom) * Math.sqrt(variance * scatter);
  const free = (fit.theta[k] ?? 0) + step;
  return free + half < low || free - half > high;
}

import { fSurvival, normalQuantile, studentTSurvival } from "kinetics-core/distributions";
import { type Flag, inARow, percent, printNumber } from "kinetics-core/quantities";
import type { OrdersFit } from "./fit-orders";
import { groupsByRecipe } from "./pairs";
import type { LackOfFit, RateLawFit } from "./rate-law";
import type { UsableRun } from "./usable-runs";

/** What the residuals say: runs that depart, runs that cannot be checked, replicates that disagree, lack of fit. */

/** From here on a run's residual is fixed by the fit and says nothing. */
const LEVERAGE_BEYOND_CHECK = 0.99;
const FAMILY_LEVEL = 0.05;
const LACK_OF_FIT_LEVEL = 0.01;
/** Replicates closer than this, relative, differ by rounding: their scatter is not known, however small it looks. */
const ROUNDING_OF_A_RATE = 1e-12;

export function residualRows(fit: OrdersFit): RateLawFit["residuals"] {
  const greatest = 1 / Math.min(...fit.ownVariances);
  return fit.runs.map((run, j) => ({
    label: run.label,
    readings: run.readings,
    residual: fit.residuals[j] ?? 0,
    weight: 1 / (fit.ownVariances[j] ?? 1) / greatest,
    leverage: fit.solution.leverage[j] ?? 1,
    studentised: deletedStudentised(fit, j),
  }));
}

/**
 * Residual of a run from the law fitted without it, over its standard error with s from the other runs: with
 * t = (Py)_j/(s √P_jj), t* = t √((ν − 1)/(ν − t²)) is Student's t with ν − 1 degrees of freedom.
 */
function deletedStudentised(fit: OrdersFit, run: number): number | null {
  const freedom = fit.degreesOfFreedom;
  if (fit.scale === null || freedom < 2 || fit.exact) return null;
  if ((fit.solution.leverage[run] ?? 1) >= LEVERAGE_BEYOND_CHECK) return null;
  const diagonal = fit.solution.projectionDiagonal[run] ?? 0;
  const inner = (fit.solution.projected[run] ?? 0) / Math.sqrt(fit.scale * diagonal);
  const rest = freedom - inner ** 2;
  // All scatter sits in this one run: without it the others would be exact.
  if (rest <= 1e-9) return null;
  return inner * Math.sqrt((freedom - 1) / rest);
}

/** ln of a rate over the law's as "12 % above" or "a factor of 30 below"; a percentage of thousands says nothing. */
function distanceInWords(residual: number): string {
  const side = residual > 0 ? "above" : "below";
  const away = Math.abs(residual);
  if (away < Math.LN2) return `${percent(Math.abs(Math.expm1(residual)))} ${side}`;
  const decades = away / Math.LN10;
  return decades < 300
    ? `a factor of ${printNumber(Math.exp(away), 2)} ${side}`
    : `more than 300 powers of ten ${side}`;
}

export function residualFlags(fit: OrdersFit, rows: RateLawFit["residuals"]): readonly Flag[] {
  const flags: Flag[] = [];
  const tested = rows.filter((row) => row.studentised !== null).length;
  for (const row of rows) {
    if (row.studentised === null) continue;
    const pValue = 2 * studentTSurvival(Math.abs(row.studentised), fit.degreesOfFreedom - 1);
    if (pValue * tested >= FAMILY_LEVEL) continue;
    flags.push({
      code: "influential-run",
      severity: "weakens",
      message: `${row.label} lies ${distanceInWords(row.residual)} the law, ${Math.abs(row.studentised).toFixed(1)} standard errors from what the other runs foretell. Look at its trace and recipe; if there is a reason, set it aside.`,
    });
  }
  const unchecked = rows.filter((row) => row.leverage >= LEVERAGE_BEYOND_CHECK).map((row) => row.label);
  if (unchecked.length > 0 && fit.degreesOfFreedom > 0)
    flags.push({
      code: "run-unchecked",
      severity: "note",
      message: `${inARow(unchecked)} cannot be checked: no other run shares what ${unchecked.length === 1 ? "it tells" : "they tell"}. A repeat would.`,
    });
  return flags;
}

/**
 * One finding for each recipe whose most distant replicates differ by more than their scatter allows: |Δ ln v| over
 * 2.77 √(mean u² + τ̂²) for a single pair (1.96·√2: one case of twenty), the factor rising with the number of pairs in
 * the study so that one clean study of twenty is named, not every one (Bonferroni).
 */
export function replicateFlags(fit: OrdersFit): readonly Flag[] {
  const scatter = fit.betweenRuns;
  if (scatter === null || fit.exact) return [];
  const groups = replicateGroups(fit);
  const pairs = groups.reduce((sum, group) => sum + (group.length * (group.length - 1)) / 2, 0);
  if (pairs === 0) return [];
  const factor = Math.SQRT2 * normalQuantile(1 - FAMILY_LEVEL / 2 / pairs);
  return groups.flatMap((group): readonly Flag[] => {
    const sorted = group.filter((run) => run.rate > 0).sort((a, b) => a.rate - b.rate);
    const low = sorted[0];
    const high = sorted.at(-1);
    if (low === undefined || high === undefined || low === high) return [];
    const difference = Math.log(high.rate / low.rate);
    const stated = [low, high].reduce((sum, run) => sum + statedVariance(fit, run), 0) / 2;
    if (difference <= factor * Math.sqrt(stated + scatter)) return [];
    return [
      {
        code: "replicates-disagree",
        severity: "weakens",
        message: `${low.label} and ${high.label} repeat one recipe but their rates differ by ${percent(Math.expm1(difference))}, more than their scatter allows. Repeat it once more, or set one aside with a reason.`,
      },
    ];
  });
}

function statedVariance(fit: OrdersFit, run: UsableRun): number {
  return run.privateErrors.reduce(
    (sum, error, i) => sum + ((fit.orders[i] ?? 0) * error) ** 2,
    (run.rateError / run.rate) ** 2,
  );
}

function replicateGroups(fit: OrdersFit): readonly (readonly UsableRun[])[] {
  return groupsByRecipe(fit.runs, (run) => run.concentrations).filter((group) => group.length > 1);
}

/**
 * F-test of the law against the replicates' own scatter, with the weights of the fit. Null without replicates, without
 * recipes to spare, or where errors shared by some runs or blocks tie the runs together.
 */
export function lackOfFit(fit: OrdersFit): LackOfFit | null {
  if (fit.exact || fit.blocks.length > 0 || fit.shared.some((error) => error.runs !== null)) return null;
  const recipes = groupsByRecipe(fit.runs, (run) => run.concentrations);
  const pureFreedom = fit.runs.length - recipes.length;
  const lackFreedom = recipes.length - fit.design.terms.columns;
  if (pureFreedom < 1 || lackFreedom < 1) return null;
  const place = new Map(fit.runs.map((run, j) => [run, j]));
  let pure = 0;
  let rounding = 0;
  for (const group of recipes) {
    const members = group.map((run) => place.get(run) ?? 0);
    const weight = (j: number) => 1 / (fit.ownVariances[j] ?? 1);
    const total = members.reduce((sum, j) => sum + weight(j), 0);
    // Runs of one recipe have one fitted value, so residuals serve as well as ln v.
    const centre = members.reduce((sum, j) => sum + weight(j) * (fit.residuals[j] ?? 0), 0) / total;
    rounding += total * ROUNDING_OF_A_RATE ** 2;
    pure += members.reduce((sum, j) => sum + weight(j) * ((fit.residuals[j] ?? 0) - centre) ** 2, 0);
  }
  if (!(pure > rounding)) return null;
  const lack = Math.max(0, fit.solution.weightedSumOfSquares - pure);
  const fStatistic = lack / lackFreedom / (pure / pureFreedom);
  return {
    fStatistic,
    degreesOfFreedom: [lackFreedom, pureFreedom],
    pValue: fSurvival(fStatistic, lackFreedom, pureFreedom),
  };
}

export function lackOfFitFlags(test: LackOfFit | null): readonly Flag[] {
  if (test === null || test.pValue >= LACK_OF_FIT_LEVEL) return [];
  return [
    {
      code: "lack-of-fit",
      severity: "weakens",
      message: `The law misses its runs by more than replicates differ among themselves (F = ${test.fStatistic.toFixed(1)} with ${test.degreesOfFreedom[0]} and ${test.degreesOfFreedom[1]} degrees of freedom): another form of the law, or an influence that was not recorded.`,
    },
  ];
}

import { studentTSurvival } from "kinetics-core/distributions";
import { type Estimate, estimateOf, exponentialOf, type Flag, inARow } from "kinetics-core/quantities";
import type { BudgetLine, RateLawFit } from "kinetics-core/rate-law";

/** ln k of one study with its uncertainty budget. */
export interface StudyConstant {
  readonly name: string;
  readonly logRateConstant: number;
  /** Plain text of the unit, "L mol^-1 s^-1"; studies of different units have no ratio. */
  readonly unit: string;
  /** Relative standard uncertainties of k by source; their squares add up to u²(ln k). */
  readonly budget: readonly BudgetLine[];
  /** Of the estimated lines (scatter, blocks) together; null where no scatter can be known. */
  readonly degreesOfFreedom: number | null;
}

export type RatioOfConstants =
  | {
      readonly status: "compared";
      /** k of the first over k of the second; interval back-transformed. */
      readonly ratio: Estimate;
      readonly logRatio: Estimate;
      /** Standard error of ln ratio had nothing been shared. */
      readonly unsharedStandardError: number | null;
      /** Two-sided, that the ratio is 1; null without an interval. */
      readonly pValue: number | null;
      readonly budget: readonly BudgetLine[];
      /** Sources that cancelled, wholly or in part. */
      readonly cancelled: readonly string[];
      readonly flags: readonly Flag[];
    }
  | { readonly status: "different-units" | "no-constant"; readonly place: string; readonly message: string };

/** Lines of a budget that the study's own runs gave: they never cancel, whatever their name. */
const OWN_LINES = new Set(["Scatter of the runs", "Blocks"]);

/**
 * Ratio of two rate constants whose studies share stocks, a calibration or a thermometer: isotope effects, rankings of
 * catalysts. For each source named in `shared` the effects on both ln k are one error, so u²(Δ) gains (r₁ − r₂)² where
 * it would have been r₁² + r₂²: with equal orders the stock cancels. Scatter of the runs is each study's own. Degrees of
 * freedom by Welch and Satterthwaite.
 */
export function ratioOfRateConstants(
  first: StudyConstant,
  second: StudyConstant,
  shared: readonly string[],
  level = 0.95,
): RatioOfConstants {
  const fault = faultOf(first, second);
  if (fault !== null) return fault;
  const lines = joinedLines(first, second, new Set(shared));
  const scatter = [first, second].flatMap((study) =>
    study.budget
      .filter((line) => OWN_LINES.has(line.source))
      .map((line) => ({ variance: line.relative ** 2, freedom: study.degreesOfFreedom })),
  );
  const variance = lines.reduce((sum, line) => sum + line.relative ** 2, 0);
  const known = first.degreesOfFreedom !== null && second.degreesOfFreedom !== null;
  const lost = scatter.reduce(
    (sum, part) => sum + (part.freedom === null ? 0 : part.variance ** 2 / part.freedom),
    0,
  );
  const freedom = !known ? null : lost > 0 ? variance ** 2 / lost : Number.POSITIVE_INFINITY;
  const difference = first.logRateConstant - second.logRateConstant;
  const logRatio = estimateOf(difference, known ? Math.sqrt(variance) : null, freedom, level);
  const missing = shared.filter((source) => !bothHave(first, second, source));
  return {
    status: "compared",
    logRatio,
    ratio: exponentialOf(logRatio),
    unsharedStandardError: known ? Math.sqrt(total(first) + total(second)) : null,
    pValue:
      freedom === null
        ? null
        : variance > 0
          ? 2 * studentTSurvival(Math.abs(difference) / Math.sqrt(variance), freedom)
          : Number(difference === 0),
    budget: lines,
    cancelled: shared.filter((source) => bothHave(first, second, source)),
    flags: [
      ...(missing.length > 0 ? [notShared(missing)] : []),
      ...(known ? [] : [noInterval(first, second)]),
    ],
  };
}

/** Of a fit to rates, with free or simple orders; null where the fit has no k. */
export function studyConstantOf(
  name: string,
  fit: RateLawFit,
  orders: "free" | "simple" = "free",
): StudyConstant | null {
  const { logRateConstant, budget, rateConstant } = orders === "free" ? fit : fit.simpleOrders;
  if (logRateConstant.estimate === null) return null;
  const freedom = orders === "free" ? fit.degreesOfFreedom : fit.residuals.length - 1;
  return {
    name,
    logRateConstant: logRateConstant.estimate,
    unit: rateConstant.unit,
    budget,
    degreesOfFreedom: freedom > 0 ? freedom : null,
  };
}

function joinedLines(
  first: StudyConstant,
  second: StudyConstant,
  shared: ReadonlySet<string>,
): readonly BudgetLine[] {
  const cancels = ({ source }: BudgetLine) => shared.has(source) && bothHave(first, second, source);
  const common = [...shared].filter((source) => bothHave(first, second, source));
  const own = (study: StudyConstant) =>
    study.budget
      .filter((line) => !cancels(line))
      .map((line) => ({ source: `${line.source}, ${study.name}`, relative: line.relative }));
  return [
    ...own(first),
    ...own(second),
    ...common.map((source) => ({
      source,
      relative: Math.abs(relativeOf(first, source) - relativeOf(second, source)),
    })),
  ];
}

function bothHave(first: StudyConstant, second: StudyConstant, source: string): boolean {
  if (OWN_LINES.has(source)) return false;
  return [first, second].every((study) => study.budget.some((line) => line.source === source));
}

/** Lines of one name in one study are one source. */
function relativeOf(study: StudyConstant, source: string): number {
  return Math.sqrt(
    study.budget.reduce((sum, line) => sum + (line.source === source ? line.relative ** 2 : 0), 0),
  );
}

function total(study: StudyConstant): number {
  return study.budget.reduce((sum, line) => sum + line.relative ** 2, 0);
}

function faultOf(
  first: StudyConstant,
  second: StudyConstant,
): Extract<RatioOfConstants, { readonly place: string }> | null {
  for (const [place, study] of [
    ["first", first],
    ["second", second],
  ] as const) {
    if (!Number.isFinite(study.logRateConstant))
      return {
        status: "no-constant",
        place,
        message: `${study.name} has no rate constant, so there is no ratio.`,
      };
  }
  if (first.unit === second.unit) return null;
  return {
    status: "different-units",
    place: "second.unit",
    message: `k of ${first.name} is in ${first.unit}, that of ${second.name} in ${second.unit}: the two have no ratio. Hold the same orders in both studies and use the same units.`,
  };
}

function notShared(missing: readonly string[]): Flag {
  return {
    code: "shared-source-unknown",
    severity: "weakens",
    message: `${inARow(missing)} ${missing.length === 1 ? "is" : "are"} not in both budgets, so nothing was cancelled for ${missing.length === 1 ? "it" : "them"}. Give the source one name in both studies.`,
  };
}

function noInterval(first: StudyConstant, second: StudyConstant): Flag {
  const names = [first, second].flatMap((study) => (study.degreesOfFreedom === null ? [study.name] : []));
  return {
    code: "no-freedom",
    severity: "blocks",
    message: `${inARow(names)} ${names.length === 1 ? "has" : "have"} no run beyond what the law needs, so the ratio has no interval. One more run each gives a first one.`,
  };
}

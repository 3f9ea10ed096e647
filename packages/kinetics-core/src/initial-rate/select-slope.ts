import type { Flag } from "kinetics-core/quantities";
import { chooseSlope } from "./choose-pair";
import { LACK_OF_FIT_LEVEL, SPARE_POINTS } from "./constants";
import { isAdequate, isSettled, type PairFit, polynomialFit } from "./estimator-pairs";
import type { Estimator, EstimatorPair, StudyRule } from "./initial-rate";
import { exponentialFit, generalOrderFit } from "./integrated-slopes";
import { polynomialSlopes } from "./polynomial-slopes";
import type { PreparedTrace } from "./prepared-trace";
import type { RefusedTrace } from "./readings";
import { isDetermined, type WindowFit } from "./window-fit";
import type { Scope, Window } from "./window-scope";

/** What is reported, before it is dressed up with interval, conversion and flags. */
export interface Selection {
  readonly status: "selected";
  readonly slope: number;
  readonly standardError: number;
  /** Its window and curve stand for the estimate. */
  readonly shown: WindowFit;
  readonly pair: EstimatorPair | null;
  readonly flags: readonly Flag[];
}

export type Selected =
  | Selection
  | { readonly status: "too-few-points"; readonly needed: number; readonly got: number }
  | RefusedTrace;

/** An estimator by name; `degree` of a tangent, null otherwise. */
export interface NamedEstimator {
  readonly estimator: Estimator;
  readonly degree: 2 | 3 | 4 | null;
}

/**
 * The estimate that the trace chooses: the averaged upper members of the pairs that agree best, the rule's own
 * pair where the study has a rule, or a quadratic over everything where no pairs can be compared.
 */
export function selectAutomatically(
  prepared: PreparedTrace,
  scope: Scope,
  pairs: readonly PairFit[],
  rule?: StudyRule,
): Selected {
  if (pairs.length === 0) {
    const whole = selectWhole(prepared, scope.widest, { estimator: "tangent", degree: 2 });
    const wanted = rule && scope.integrated.length > 0 && whole.status === "selected";
    return wanted ? { ...whole, flags: [RULE_NOT_APPLIED] } : whole;
  }
  const ruled = pairs.filter(({ pair }) => pair === rule?.pair);
  const candidates = ruled.length > 0 ? ruled : pairs.filter(isAdequate);
  const { slope, standardError, heaviest } = chooseSlope(candidates);
  const flags = isAdequate(heaviest) ? [] : [misfitFlag(heaviest)];
  if (rule && ruled.length === 0) flags.push(RULE_NOT_APPLIED);
  return { status: "selected", slope, standardError, shown: heaviest.upper, pair: heaviest.pair, flags };
}

/**
 * An estimator by name, on the window where its pair agrees best with itself (least M): a straight line and an
 * exponential are the lower member of their pair, a tangent and the general order the upper one. Where no pairs
 * can be compared, on the whole scope.
 *
 * A lower member on a window that was chosen for it carries the disagreement of its pair as one more standard
 * deviation; in simulation its interval then covers the truth in 81 % (line) and 95 % (exponential), without it
 * in 56 % and 82 %. On a window that is given it keeps its own error, and curvature is flagged.
 */
export function selectByName(
  prepared: PreparedTrace,
  scope: Scope,
  pairs: readonly PairFit[],
  named: NamedEstimator,
): Selected {
  const own = pairs.filter((pair) => isNamed(memberOf(pair, named), named));
  if (own.length === 0) return selectWhole(prepared, scope.widest, named);
  const best = own.reduce((a, b) => (b.criterion < a.criterion ? b : a));
  const shown = memberOf(best, named);
  const { slope } = shown;
  const lower = shown === best.lower;
  const disagreement = lower && own.length > 1 ? slope - best.upper.slope : 0;
  const flags: Flag[] = [];
  if (lower && isBent(best)) flags.push(biasFlag(named.estimator, slope, best.upper.slope));
  if (lower ? !shown.settled : !isAdequate(best)) flags.push(misfitFlag(best));
  const standardError = Math.hypot(shown.standardError, disagreement);
  return { status: "selected", slope, standardError, shown, pair: null, flags };
}

function memberOf(pair: PairFit, { estimator }: NamedEstimator): WindowFit {
  return estimator === "straight" || estimator === "exponential" ? pair.lower : pair.upper;
}

/** Nested estimators differ by Var(upper) − Var(lower) if both are unbiased; twice that error is too much. */
function isBent({ lower, upper }: PairFit): boolean {
  const variance = Math.max(upper.standardError ** 2 - lower.standardError ** 2, 0);
  return (upper.slope - lower.slope) ** 2 > 4 * variance;
}

function isNamed(fit: WindowFit, { estimator, degree }: NamedEstimator): boolean {
  return fit.estimator === estimator && (estimator !== "tangent" || fit.degree === degree);
}

/** Parameters of each estimator; a tangent has its degree and one. */
const PARAMETERS = { straight: 2, exponential: 3, integrated: 4 } as const;

/** What an estimator takes at least; the automatic choice ends with a quadratic. */
export function readingsNeeded({ estimator, degree }: NamedEstimator): number {
  return SPARE_POINTS + (estimator === "tangent" ? (degree ?? 2) + 1 : PARAMETERS[estimator]);
}

/** One estimator on all of a window, with nothing to compare it to. */
export function selectWhole(prepared: PreparedTrace, { from, to }: Window, named: NamedEstimator): Selected {
  const { estimator } = named;
  const degree = named.degree ?? 2;
  const got = to - from;
  const needed = readingsNeeded(named);
  if (got < needed) return { status: "too-few-points", needed, got };
  const shown = fitWhole(prepared, { from, to }, estimator, degree);
  if (!isDetermined(shown)) return { status: "unusable", code: "no-slope", message: NO_SLOPE };
  const { slope, standardError } = shown;
  const flags = shown.settled ? [] : [UNSETTLED];
  return { status: "selected", slope, standardError, shown, pair: null, flags };
}

function fitWhole(
  { readings, noise, scratch }: PreparedTrace,
  { from, to }: Window,
  estimator: Estimator,
  tangentDegree: number,
): WindowFit {
  if (estimator === "exponential") return exponentialFit(readings, noise, from, to);
  if (estimator === "integrated") return generalOrderFit(readings, noise, from, to);
  const degree = estimator === "straight" ? 1 : tangentDegree;
  return polynomialFit(polynomialSlopes(readings, noise, from, to, degree, scratch), degree);
}

const NO_SLOPE =
  "These readings do not fix the slope of such a curve at mixing, because it is level from the second reading on; " +
  "ask for a straight line or a tangent, or read the start more densely.";

const RULE_NOT_APPLIED: Flag = {
  code: "rule-not-applied",
  severity: "weakens",
  message:
    "The readings of this run do not carry the estimator that the study uses, so it has one of its own; " +
    "read the run more densely from its start.",
};

/** Why a general order may not enter the choice by itself. */
function misfitFlag(pair: PairFit): Flag {
  if (!isSettled(pair)) return UNSETTLED;
  const p = pair.lackOfFit?.pValue ?? 0;
  return {
    code: "lack-of-fit",
    severity: "weakens",
    message:
      `One reaction order does not follow this window (p ${p < 0.001 ? "< 0.001" : `= ${p.toFixed(3)}`}, limit ${LACK_OF_FIT_LEVEL}); ` +
      "use a polynomial, or a shorter window.",
  };
}

const UNSETTLED: Flag = {
  code: "order-not-settled",
  severity: "weakens",
  message:
    "The readings curve too little to settle on a reaction order, and the slope may depend on where the search ended; " +
    "use a straight line or a tangent, or a longer window.",
};

function biasFlag(estimator: Estimator, lower: number, upper: number): Flag {
  const percent = Math.abs((lower / upper - 1) * 100);
  return {
    code: "curved-window",
    severity: "weakens",
    message:
      `${estimator === "straight" ? "The line" : "The exponential"} differs from a more flexible curve on the same window by ` +
      `${Number.isFinite(percent) ? percent.toFixed(1) : "over 100"} %, more than noise explains; shorten the window or let the rule choose.`,
  };
}

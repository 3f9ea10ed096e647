import {
  LEAST_LONG_WINDOW_POINTS,
  LEAST_WINDOW_POINTS,
  POLYNOMIAL_CONVERSION_END,
  STUDY_CONVERSION_ENDS,
} from "./constants";
import { type Progress, pointsTo } from "./conversion";
import { integratedPairs, isSettled, type PairFit, polynomialPairs } from "./estimator-pairs";
import type { StudyRule, StudyTrace } from "./initial-rate";
import { type PreparedTrace, prepareTrace } from "./prepared-trace";
import { pointsByRule } from "./window-scope";

/** What one run says about one rule: plain numbers, so that a survey can be kept and reused. */
export interface RuleOnRun extends StudyRule {
  readonly lowerSlope: number;
  readonly lowerStandardError: number;
  readonly upperSlope: number;
  readonly upperStandardError: number;
  /** F of the general order against degree six; null for polynomials. */
  readonly lackOfFit: { readonly ratio: number; readonly above: number; readonly below: number } | null;
}

/** Every rule that the run could follow. Empty where its conversion is unknown or it has under 8 readings. */
export interface TraceSurvey {
  readonly label: string;
  readonly rules: readonly RuleOnRun[];
}

/**
 * One run under every rule of a study: polynomial pairs up to 45 % conversion, exponential→general order above.
 * Costs a few milliseconds for a thousand readings and depends on this run alone, so a study that sets one run
 * aside need not look at the others again. Never throws on data.
 */
export function surveyTrace({ label, trace, timeZero, signalSpan }: StudyTrace): TraceSurvey {
  const prepared = prepareTrace(trace, { timeZero, ...(signalSpan === null ? {} : { signalSpan }) });
  if (prepared.status !== "prepared" || !prepared.progress) return { label, rules: [] };
  const { progress, readings } = prepared;
  if (readings.time.length < LEAST_WINDOW_POINTS) return { label, rules: [] };
  return { label, rules: rulesOn(prepared, progress) };
}

function rulesOn(prepared: PreparedTrace, progress: Progress): RuleOnRun[] {
  const { readings, noise, scratch } = prepared;
  const all = readings.time.length;
  const rules: RuleOnRun[] = [];
  // Runs that stop early meet several conversion ends with the same readings.
  let before = { polynomial: true, to: 0, pairs: [] as PairFit[] };
  for (const conversionEnd of STUDY_CONVERSION_ENDS) {
    const polynomial = conversionEnd <= POLYNOMIAL_CONVERSION_END;
    if (!polynomial && all < LEAST_LONG_WINDOW_POINTS) break;
    const reached = pointsTo(readings, progress, conversionEnd);
    const to = pointsByRule(all, reached, polynomial ? "line-quadratic" : "exponential-general");
    if (before.to !== to || before.polynomial !== polynomial) {
      const pairs = polynomial
        ? polynomialPairs(readings, noise, 0, to, scratch)
        : integratedPairs(readings, noise, 0, to);
      before = { polynomial, to, pairs };
    }
    rules.push(...before.pairs.filter(isSettled).map((pair) => ruleOnRun(conversionEnd, pair)));
  }
  return rules;
}

function ruleOnRun(conversionEnd: number, { pair, lower, upper, lackOfFit }: PairFit): RuleOnRun {
  return {
    conversionEnd,
    pair,
    lowerSlope: lower.slope,
    lowerStandardError: lower.standardError,
    upperSlope: upper.slope,
    upperStandardError: upper.standardError,
    lackOfFit: lackOfFit && { ratio: lackOfFit.ratio, above: lackOfFit.above, below: lackOfFit.below },
  };
}

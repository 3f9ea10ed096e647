import type { Flag } from "kinetics-core/quantities";
import { chooseSlope } from "./choose-pair";
import { LEAST_WINDOW_POINTS, POLYNOMIAL_CONVERSION_END, SPARE_POINTS } from "./constants";
import { pointsTo } from "./conversion";
import { type PairFit, polynomialFit, polynomialPairs, type WindowFit } from "./estimator-pairs";
import type { EstimatorPair, StudyRule } from "./initial-rate";
import { polynomialSlopes } from "./polynomial-slopes";
import type { PreparedTrace } from "./prepared-trace";
import { geometricWindows } from "./windows";

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
  | { readonly status: "too-few-points"; readonly needed: number; readonly got: number };

/** A quadratic has three parameters. */
const QUADRATIC_POINTS = 3 + SPARE_POINTS;

/** The estimate that the trace chooses for itself: pairs on all windows, or a quadratic where there is no choice. */
export function selectFreely(prepared: PreparedTrace): Selected {
  const { readings, progress } = prepared;
  const all = readings.time.length;
  if (!progress) {
    return quadraticOn(prepared, 0, all, {
      code: "conversion-unknown",
      severity: "weakens",
      message:
        "The signal change at complete conversion is not known, so no window could be chosen by conversion " +
        "and a quadratic over all readings is reported; give the calibration and the starting concentration.",
    });
  }
  if (all < LEAST_WINDOW_POINTS) return quadraticOn(prepared, 0, all, fewPoints(all));
  const early = pointsTo(readings, progress, POLYNOMIAL_CONVERSION_END);
  const flags: Flag[] = [];
  if (early < LEAST_WINDOW_POINTS) flags.push(sparse(early));
  const pairs = geometricWindows(readings.time, Math.max(early, LEAST_WINDOW_POINTS)).flatMap((to) =>
    polynomialPairs(readings, prepared.noise, 0, to, prepared.scratch),
  );
  return fromPairs(pairs, flags);
}

/** The same choice among pairs, on readings [from, to) that a person picked. */
export function selectOnWindow(prepared: PreparedTrace, from: number, to: number): Selected {
  if (to - from < LEAST_WINDOW_POINTS) return quadraticOn(prepared, from, to, fewPoints(to - from));
  return fromPairs(polynomialPairs(prepared.readings, prepared.noise, from, to, prepared.scratch), []);
}

/** The study's rule on one of its runs; a run that does not reach the conversion uses its end. */
export function selectByRule(prepared: PreparedTrace, rule: StudyRule): Selected {
  const { readings, progress } = prepared;
  const all = readings.time.length;
  if (!progress || all < LEAST_WINDOW_POINTS) return selectFreely(prepared);
  const reached = pointsTo(readings, progress, rule.conversionEnd);
  const to = Math.max(reached, LEAST_WINDOW_POINTS);
  const flags = reached < to ? [sparse(reached, rule.conversionEnd)] : [];
  const pairs = polynomialPairs(readings, prepared.noise, 0, to, prepared.scratch);
  const pair = pairs.find((candidate) => candidate.pair === rule.pair);
  if (!pair) return selectFreely(prepared);
  return fromPairs([pair], flags);
}

function fromPairs(pairs: readonly PairFit[], flags: readonly Flag[]): Selection {
  const { slope, standardError, heaviest } = chooseSlope(pairs);
  return { status: "selected", slope, standardError, shown: heaviest.upper, pair: heaviest.pair, flags };
}

function quadraticOn(prepared: PreparedTrace, from: number, to: number, flag: Flag): Selected {
  const got = to - from;
  if (got < QUADRATIC_POINTS) return { status: "too-few-points", needed: QUADRATIC_POINTS, got };
  const fit = polynomialSlopes(prepared.readings, prepared.noise, from, to, 2, prepared.scratch);
  const shown = polynomialFit(fit, 2);
  const { slope, standardError } = shown;
  return { status: "selected", slope, standardError, shown, pair: null, flags: [flag] };
}

function fewPoints(points: number): Flag {
  return {
    code: "few-points",
    severity: "weakens",
    message:
      `With ${points} readings there is no choice of window and a quadratic through all of them is reported; ` +
      `${LEAST_WINDOW_POINTS} or more let the curvature be judged.`,
  };
}

function sparse(points: number, conversionEnd: number = POLYNOMIAL_CONVERSION_END): Flag {
  return {
    code: "sparse-start",
    severity: "weakens",
    message:
      `Only ${points} readings lie below ${Math.round(conversionEnd * 100)} % conversion, so the window takes the first ` +
      `${LEAST_WINDOW_POINTS}; read the start of the run more densely.`,
  };
}

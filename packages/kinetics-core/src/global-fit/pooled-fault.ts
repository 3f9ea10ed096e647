import { mean, squaresAboutMean } from "kinetics-core/summation";
import { failure, type GlobalFitFailure } from "./global-fit";
import type { SearchEnd } from "./pooled-search";
import type { PreparedRun, PreparedStudy } from "./prepared-study";
import type { StudyPass } from "./study-pass";
import { undeterminedCombinations } from "./undetermined";

/** What keeps the pooled fit from being one, by name; null where nothing does. */
export function pooledFault(
  end: SearchEnd,
  pass: StudyPass,
  names: readonly string[],
  theta: Float64Array,
): GlobalFitFailure | null {
  if (end === "stopped") return stopped();
  if (end === "no-course") return noCourse();
  if (!theta.every(Number.isFinite) || Math.abs(theta[0] ?? 0) >= 690)
    return failure(
      "beyond-precision",
      "runs",
      "The rate constant leaves the range of a double. Check the units of concentrations and times, or hold an order nearer to what is expected.",
    );
  if (pass.runs.every((run) => !((run.gram[0] ?? 0) > 0)))
    return failure(
      "exhausted-at-first-reading",
      "runs",
      "In every run the reaction is over at the first reading, or never begins with the concentrations given, so the traces say nothing about its rate. Read earlier, slow the reaction down, or check the starting concentrations.",
    );
  if (isUnchanged(pass)) return unchanged(pass.study);
  const open = undeterminedCombinations(pass.gram, names);
  if (open.length > 0)
    return failure("not-determined", "runs", open.map(({ message }) => message).join(" "), open);
  return end === "not-settled" ? notConverged() : null;
}

export function notConverged(): GlobalFitFailure {
  return failure(
    "not-converged",
    "law",
    "The search for the parameters did not settle from any start that was tried: the traces do not follow this law, or one run does not belong. Set a run aside, try another law, or hold an order.",
  );
}

/**
 * All courses together gain no more over a constant for each run than chance would give them in one of a thousand. In
 * most studies the first run settles that it is not so.
 */
function isUnchanged(pass: StudyPass): boolean {
  const least = (10 + 6 * pass.runs.length) * pass.ownVariance();
  let gain = 0;
  for (const [j, { signal }] of pass.study.runs.entries()) {
    const flat = variationOf(signal);
    gain += Math.max(0, flat - (pass.runs[j]?.residualSquares ?? 0));
    if (gain > least) return false;
  }
  return true;
}

function unchanged(study: PreparedStudy): GlobalFitFailure {
  const { followedNumber, scale } = study;
  const against = study.runs.filter((run) => trendOf(run) * followedNumber * scale < 0).length;
  if (2 * against > study.runs.length) {
    const [course, expected] = followedNumber * scale < 0 ? ["rise", "fall"] : ["fall", "rise"];
    return failure(
      "wrong-direction",
      "followed",
      `The traces ${course}, where a species of the stoichiometric number ${inText(followedNumber)} with a signal per concentration of ${inText(scale)} makes them ${expected}. Check both signs: a reactant that is followed has a negative number, a product a positive one.`,
    );
  }
  return failure(
    "no-change",
    "runs",
    "No trace changes beyond its noise: the reaction was over before the first reading, or has hardly begun at the last. Read earlier, or wait longer.",
  );
}

/** t above which the slope of a trace is no chance of its noise, autocorrelation included. */
const CLEAR_TREND = 8;

/** +1 or −1 where the straight line through a trace clearly rises or falls, else 0. */
function trendOf({ time, signal }: PreparedRun): number {
  const count = time.length;
  const middle = mean(time);
  const level = mean(signal);
  let across = 0;
  let along = 0;
  let squares = 0;
  for (let i = 0; i < count; i++) {
    const t = (time[i] ?? 0) - middle;
    const y = (signal[i] ?? 0) - level;
    across += t * y;
    along += t * t;
    squares += y * y;
  }
  const explained = along > 0 ? across ** 2 / along : 0;
  return explained * (count - 2) > CLEAR_TREND ** 2 * (squares - explained) ? Math.sign(across) : 0;
}

function inText(value: number): string {
  return String(value).replace("-", "\u2212");
}

/** Squares about the mean; 0 where only rounding is left. */
function variationOf(values: Float64Array): number {
  const squares = squaresAboutMean(values);
  return squares > values.length * (1e-14 * mean(values)) ** 2 ? squares : 0;
}

export function noCourse(): GlobalFitFailure {
  return failure(
    "no-course",
    "law",
    "The law has no finite rate along some run: a negative order in a species that is absent at the start or used up, or a parameter beyond its range. Give a starting concentration above 0, or another law.",
  );
}

export function stopped(): GlobalFitFailure {
  return failure("stopped", "options.shouldStop", "The fit was stopped before it had settled.");
}

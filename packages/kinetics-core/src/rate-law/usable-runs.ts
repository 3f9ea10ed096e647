import { type Flag, inARow, percent, verb } from "kinetics-core/quantities";
import type { RateLawInput, RateLawRun } from "./rate-law";

/**
 * From the runs as given to the runs that a law can be fitted to: re-readings of one mixture averaged, runs without a
 * usable rate or concentration left out by name, and the choice between logarithms and rates.
 */

/** Above this u/v the logarithm is biased (−2 % at 0.2, −17 % at 0.5): rates themselves are fitted. */
const LARGEST_RELATIVE_ERROR_OF_A_LOGARITHM = 0.2;
const PRECISION_THAT_WEAKENS = 0.1;
/** A rate below zero by more than this many standard errors is no rate of this reaction. */
const LARGEST_NEGATIVE_IN_STANDARD_ERRORS = 3;
/** Recipes closer than this are one recipe: what unit conversion and mixing arithmetic leave. */
export const SAME_CONCENTRATION = 1e-6;

export interface UsableRun {
  readonly label: string;
  readonly readings: readonly string[];
  /** In the order of the species. */
  readonly concentrations: readonly number[];
  readonly rate: number;
  /** Standard error of the rate; 0 where none was given. */
  readonly rateError: number;
  /** Private relative standard uncertainty of each concentration. */
  readonly privateErrors: readonly number[];
  readonly block: string | null;
}

export interface UsableRuns {
  readonly runs: readonly UsableRun[];
  readonly scale: "logarithmic" | "rate";
  readonly flags: readonly Flag[];
}

/** Held order of each species, null where it is free. A held order that is no number counts as free. */
export function heldOrders(input: RateLawInput): readonly (number | null)[] {
  return input.species.map((name) => {
    const order = given(input.orders, name) ?? "free";
    return order === "free" || !Number.isFinite(order) ? null : order;
  });
}

export function usableRuns(input: RateLawInput): UsableRuns {
  const flags: Flag[] = [...duplicateLabels(input.runs)];
  const held = heldOrders(input);
  const complete = input.runs.filter((run) => hasUsableConcentrations(run, input.species, held, flags));
  const averaged = averageReadings(
    complete.map((run) => prepare(run, input.species)),
    complete.map((run) => run.mixture ?? null),
    flags,
  );
  const runs = averaged.filter((run) => hasUsableRate(run, flags));
  const poorest = Math.max(0, ...runs.map(relativeRateError));
  const scale = poorest > LARGEST_RELATIVE_ERROR_OF_A_LOGARITHM ? "rate" : "logarithmic";
  flags.push(...ratePrecision(runs));
  return { runs, scale, flags };
}

/** u/v; infinite for a rate that is not above zero, 0 where no standard error was given. */
function relativeRateError(run: UsableRun): number {
  return run.rate > 0 ? run.rateError / run.rate : Number.POSITIVE_INFINITY;
}

function duplicateLabels(runs: readonly RateLawRun[]): readonly Flag[] {
  const seen = new Set<string>();
  const twice = new Set<string>();
  for (const { label } of runs) (seen.has(label) ? twice : seen).add(label);
  if (twice.size === 0) return [];
  const names = [...twice];
  return [
    {
      code: "duplicate-label",
      severity: "weakens",
      message: `More than one run is called ${inARow(names)}, so findings and shared errors that name ${verb(names.length, "it", "them")} mean all of those runs. Give each run a label of its own.`,
    },
  ];
}

function hasUsableConcentrations(
  run: RateLawRun,
  species: readonly string[],
  held: readonly (number | null)[],
  flags: Flag[],
): boolean {
  const wanted = species.filter((_, i) => held[i] !== 0);
  const missing = wanted.filter((name) => numberGiven(run.concentrations, name) === undefined);
  if (missing.length > 0) {
    flags.push({
      code: "concentration-missing",
      severity: "blocks",
      message: `${run.label} has no concentration of ${inARow(missing)} and is not in the fit. Give it, or set the run aside.`,
    });
    return false;
  }
  const negative = wanted.filter((name) => (numberGiven(run.concentrations, name) ?? 0) < 0);
  if (negative.length > 0) {
    flags.push({
      code: "concentration-negative",
      severity: "blocks",
      message: `${run.label} has a concentration of ${inARow(negative)} below zero and is not in the fit. Correct it, or set the run aside.`,
    });
    return false;
  }
  const absent = wanted.filter((name) => numberGiven(run.concentrations, name) === 0);
  if (absent.length > 0) {
    flags.push({
      code: "concentration-zero",
      severity: "weakens",
      message: `${run.label} holds no ${absent.join(" and no ")}: a law of powers gives it no rate, so it is not in the fit. Use it as a blank and set it aside, or hold that order at 0.`,
    });
    return false;
  }
  return true;
}

function prepare(run: RateLawRun, species: readonly string[]): UsableRun {
  return {
    label: run.label,
    readings: [run.label],
    concentrations: species.map((name) => numberGiven(run.concentrations, name) ?? 0),
    rate: run.rate,
    rateError: positiveOrZero(run.rateStandardError),
    privateErrors: species.map((name) => positiveOrZero(numberGiven(run.relativeUncertainty, name))),
    block: run.block ?? null,
  };
}

/** What an object holds itself: every object answers to names such as "constructor". */
function given<T>(record: Readonly<Record<string, T>> | undefined, name: string): T | undefined {
  return record !== undefined && Object.hasOwn(record, name) ? record[name] : undefined;
}

function numberGiven(record: Readonly<Record<string, number>> | undefined, name: string): number | undefined {
  const value = given(record, name);
  return value !== undefined && Number.isFinite(value) ? value : undefined;
}

function positiveOrZero(value: number | undefined): number {
  return value !== undefined && Number.isFinite(value) && value > 0 ? value : 0;
}

/**
 * Readings of one mixture count as one run: their rates are averaged on the rate scale, their own errors are
 * independent, the errors of the mixture stay.
 */
function averageReadings(
  runs: readonly UsableRun[],
  mixtures: readonly (string | null)[],
  flags: Flag[],
): readonly UsableRun[] {
  const groups = new Map<string, UsableRun[]>();
  const result: (UsableRun | UsableRun[])[] = [];
  runs.forEach((run, i) => {
    const mixture = mixtures[i] ?? null;
    const group = mixture === null ? undefined : groups.get(mixture);
    if (mixture === null) result.push(run);
    else if (group === undefined) {
      const started = [run];
      groups.set(mixture, started);
      result.push(started);
    } else group.push(run);
  });
  for (const [mixture, group] of groups) {
    if (!group.every((run) => sameRecipe(run, group[0] ?? run)))
      flags.push({
        code: "mixture-differs",
        severity: "weakens",
        message: `${inARow(group.map((run) => run.label))} are given as readings of the mixture ${mixture}, but their concentrations differ. They count as separate runs until the concentrations or the mixture's name are corrected.`,
      });
  }
  return result.flatMap((one) => {
    if (!Array.isArray(one)) return [one];
    const first = one[0];
    if (first === undefined) return [];
    return one.every((run) => sameRecipe(run, first)) ? [averageOf(one, first)] : one;
  });
}

function sameRecipe(a: UsableRun, b: UsableRun): boolean {
  return a.concentrations.every((value, i) => sameConcentration(value, b.concentrations[i] ?? 0));
}

export function sameConcentration(a: number, b: number): boolean {
  return Math.abs(a - b) <= SAME_CONCENTRATION * Math.max(Math.abs(a), Math.abs(b));
}

function averageOf(readings: readonly UsableRun[], first: UsableRun): UsableRun {
  if (readings.length === 1) return first;
  const known = readings.map((run) => run.rateError).filter((error) => error > 0);
  const meanSquare = known.reduce((sum, error) => sum + error ** 2, 0) / Math.max(known.length, 1);
  return {
    ...first,
    label: readings.map((run) => run.label).join(" + "),
    readings: readings.map((run) => run.label),
    rate: readings.reduce((sum, run) => sum + run.rate, 0) / readings.length,
    rateError: Math.sqrt(meanSquare / readings.length),
  };
}

/**
 * A rate at or below zero has no logarithm. Where its standard error allows for a true rate above zero it still counts
 * on the rate scale; otherwise the run is left out by name.
 */
function hasUsableRate(run: UsableRun, flags: Flag[]): boolean {
  if (!Number.isFinite(run.rate)) {
    flags.push({
      code: "rate-missing",
      severity: "blocks",
      message: `${run.label} has no rate that is a number and is not in the fit. Give its rate, or set the run aside.`,
    });
    return false;
  }
  if (run.rate > 0) return true;
  if (run.rateError > 0 && run.rate > -LARGEST_NEGATIVE_IN_STANDARD_ERRORS * run.rateError) return true;
  const sign = run.rate === 0 ? "zero" : "below zero";
  const why = run.rateError > 0 ? "by more than its standard error allows" : "without a standard error";
  flags.push({
    code: "rate-not-positive",
    severity: "blocks",
    message: `The rate of ${run.label} is ${sign} ${why}: it has no logarithm and is not in the fit. Check the sign of the signal and the window, give the rate's standard error, or set the run aside.`,
  });
  return false;
}

function ratePrecision(runs: readonly UsableRun[]): readonly Flag[] {
  const without = runs.filter((run) => relativeRateError(run) > LARGEST_RELATIVE_ERROR_OF_A_LOGARITHM);
  const poor = runs.filter((run) => relativeRateError(run) > PRECISION_THAT_WEAKENS);
  if (without.length > 0)
    return [
      {
        code: "rate-scale",
        severity: "weakens",
        message: `${precisionInWords(without)}: too uncertain for a logarithm, so the law was fitted to the rates themselves. More points or a longer trace would make ${verb(without.length, "it", "them")} count.`,
      },
    ];
  if (poor.length === 0) return [];
  return [
    {
      code: "rate-precision",
      severity: "weakens",
      message: `${precisionInWords(poor)}. More points or a longer trace would make ${verb(poor.length, "it", "them")} count for more.`,
    },
  ];
}

/** "The rate of run 3 is known to 14 %", "The rates of run 3 and run 5 are known to 14 and 16 %; that of …". */
function precisionInWords(runs: readonly UsableRun[]): string {
  const known = runs.filter((run) => run.rate > run.rateError);
  const lost = runs.filter((run) => run.rate <= run.rateError);
  const parts: string[] = [];
  if (known.length > 0)
    parts.push(
      `The ${verb(known.length, "rate", "rates")} of ${inARow(known.map((run) => run.label))} ${verb(known.length, "is", "are")} known to ${precisions(known)}`,
    );
  if (lost.length > 0)
    parts.push(
      `${parts.length > 0 ? "the" : "The"} ${verb(lost.length, "rate", "rates")} of ${inARow(lost.map((run) => run.label))} cannot be told from zero`,
    );
  return parts.join("; ");
}

/** "14 %", or "14 to 30 %" for runs that differ. */
function precisions(runs: readonly UsableRun[]): string {
  const relative = runs.map((run) => run.rateError / run.rate);
  const least = percent(Math.min(...relative));
  const most = percent(Math.max(...relative));
  return least === most ? least : `${least.replace(/\s*%$/, "")} to ${most}`;
}

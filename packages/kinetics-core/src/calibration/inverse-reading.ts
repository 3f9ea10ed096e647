import { studentTFactor } from "kinetics-core/distributions";
import { type Estimate, noEstimate } from "kinetics-core/quantities";
import { mean } from "kinetics-core/summation";
import { lineFactor } from "./bands";
import type { CalibrationLine } from "./calibration";
import { estimateOfRatio, fieller, type RatioSet } from "./fieller";

/**
 * A concentration read from a calibration line: x₀ = x̄ + (y₀ − ȳ)/b, with
 *
 *   u(x₀) = (s/|b|) √(1/(w m) + 1/W + (x₀ − x̄)²/S_xx)
 *
 * for the mean y₀ of m replicate signals of weight w (Massart et al., Handbook of Chemometrics and Qualimetrics A (1997),
 * 8.26 and 8.28; the terms after the first are the line's own). The interval is Fieller's: the numerator y₀ − ȳ and the
 * slope are independent, with variances s²(1/(w m) + 1/W) and s²/S_xx. It is not symmetric, and where the slope is so
 * poorly known that g ≥ 1 there is none.
 */
export interface SignalReading {
  /** Mean of the replicates. */
  readonly signal: number;
  /** How many signals the mean is of, ≥ 1; "exact" for a mean that is known without scatter (a limit, a set value). */
  readonly replicates: number | "exact";
  /** Of one of the signals on the scale of the standards' weights; default 1. */
  readonly weight?: number;
}

export interface ConcentrationReading extends Estimate {
  /** t² u²(b)/b²: from 1 on the interval is unbounded. Null where the line carries no uncertainty. */
  readonly g: number | null;
  /** What the data do not exclude, also where that is no interval; null where the line carries no uncertainty. */
  readonly set: RatioSet | null;
}

/** Null estimate where the slope is 0; no interval where the line has no degree of freedom or g ≥ 1. */
export function readConcentration(
  line: CalibrationLine,
  reading: SignalReading,
  level = line.level,
): ConcentrationReading {
  const { centre, residualStandardDeviation: s, degreesOfFreedom } = line;
  const slope = line.slope.estimate ?? 0;
  const rise = reading.signal - centre.signal;
  const concentration = centre.concentration + rise / slope;
  // A slope of 0, or a signal beyond what a double holds.
  if (!Number.isFinite(concentration ** 2)) return { ...noEstimate(level), g: null, set: null };
  if (s === null) {
    return { estimate: concentration, standardError: null, interval: null, level, g: null, set: null };
  }
  const own = reading.replicates === "exact" ? 0 : 1 / ((reading.weight ?? 1) * reading.replicates);
  const ratio = fieller({
    numerator: rise,
    denominator: slope,
    numeratorVariance: s ** 2 * (own + line.inverseWeight),
    denominatorVariance: s ** 2 * line.inverseSpread,
    covariance: 0,
    factor: studentTFactor(level, degreesOfFreedom),
  });
  const set = moved(ratio.set, centre.concentration);
  const error = (s / Math.abs(slope)) * Math.sqrt(own + lineFactor(line, concentration));
  return {
    ...estimateOfRatio({ ...ratio, estimate: concentration, standardError: error, set }, level),
    g: ratio.g,
    set,
  };
}

/** Replicate signals of one unknown as a reading. Not empty. */
export function readingOf(signals: readonly number[], weight?: number): SignalReading {
  return { signal: mean(signals), replicates: signals.length, ...(weight === undefined ? {} : { weight }) };
}

/**
 * Standard additions: the standards are amounts added to the sample itself, and the concentration in the sample is
 * where the line meets the signal of nothing, x_E = a/b; `blankSignal` is that signal where it is not 0. The signal of
 * nothing is exact, so u(x_E) = (s/|b|) √(1/W + (x_E + x̄)²/S_xx).
 */
export function standardAdditions(
  line: CalibrationLine,
  blankSignal = 0,
  level = line.level,
): ConcentrationReading {
  const { estimate, standardError, interval, g, set } = readConcentration(
    line,
    { signal: blankSignal, replicates: "exact" },
    level,
  );
  return {
    estimate: estimate === null ? null : negated(estimate),
    standardError,
    interval: interval === null ? null : [negated(interval[1]), negated(interval[0])],
    level,
    g,
    set: set === null ? null : mirrored(set),
  };
}

function moved(set: RatioSet, by: number): RatioSet {
  switch (set.kind) {
    case "bounded":
      return { kind: "bounded", low: set.low + by, high: set.high + by };
    case "complement":
      return {
        kind: "complement",
        upTo: set.upTo === null ? null : set.upTo + by,
        from: set.from === null ? null : set.from + by,
      };
    case "whole-line":
      return set;
  }
}

function mirrored(set: RatioSet): RatioSet {
  switch (set.kind) {
    case "bounded":
      return { kind: "bounded", low: negated(set.high), high: negated(set.low) };
    case "complement":
      return {
        kind: "complement",
        upTo: set.from === null ? null : negated(set.from),
        from: set.upTo === null ? null : negated(set.upTo),
      };
    case "whole-line":
      return set;
  }
}

/** Without a zero below zero. */
function negated(value: number): number {
  return value === 0 ? 0 : -value;
}

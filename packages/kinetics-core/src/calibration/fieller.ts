import { type Estimate, noEstimate } from "kinetics-core/quantities";

/**
 * Confidence set of a ratio θ = α/β of two normally distributed estimates a and b (Fieller, J. R. Stat. Soc. B 16 (1954)
 * 175-185). a − θb is normal with mean zero whatever θ is, so θ belongs to the set where
 *
 *   (a − θb)² ≤ t²(v_a − 2θ c + θ² v_b),   that is   Aθ² − 2Bθ + C ≤ 0,
 *   A = b² − t² v_b,   B = ab − t² c,   C = a² − t² v_a.
 *
 * With g = t² v_b/b² < 1 the denominator differs from zero and the set is an interval about a/b. With g ≥ 1 it is
 * everything outside an interval, or the whole line: the data admit denominators of both signs, and no finite interval
 * can keep its level. The quarter of the discriminant, B² − AC, is written as
 * t²(b² v_a − 2abc + a² v_b − t²(v_a v_b − c²)), in which the great terms a²b² have cancelled already.
 */
export interface RatioOfEstimates {
  readonly numerator: number;
  readonly denominator: number;
  /** Squared standard errors, ≥ 0. */
  readonly numeratorVariance: number;
  readonly denominatorVariance: number;
  readonly covariance: number;
  /** Two-sided factor in standard errors, `studentTFactor(level, degreesOfFreedom)`. */
  readonly factor: number;
}

/** Which ratios the data do not exclude. */
export type RatioSet =
  | { readonly kind: "bounded"; readonly low: number; readonly high: number }
  /**
   * All ratios up to `upTo` and all from `from` on: what lies between them is excluded. An end that is null reaches
   * nothing (the set is a half-line, which happens only at g = 1).
   */
  | { readonly kind: "complement"; readonly upTo: number | null; readonly from: number | null }
  | { readonly kind: "whole-line" };

export interface Ratio {
  /** a/b; null where b is 0 or the quotient is no finite number. */
  readonly estimate: number | null;
  /** To first order in the errors; null where there is no estimate. */
  readonly standardError: number | null;
  /** t² v_b/b²: from 1 on the set is unbounded. Null where b is 0. */
  readonly g: number | null;
  readonly set: RatioSet;
}

/** Throws nothing; a ratio that is not determined has a null estimate and the whole line as its set. */
export function fieller(input: RatioOfEstimates): Ratio {
  const numeratorScale = Math.max(Math.abs(input.numerator), Math.sqrt(input.numeratorVariance));
  const denominatorScale = Math.max(Math.abs(input.denominator), Math.sqrt(input.denominatorVariance));
  const unit = numeratorScale / denominatorScale;
  if (!Number.isFinite(unit) || !Number.isFinite(input.factor)) {
    return { estimate: null, standardError: null, g: null, set: { kind: "whole-line" } };
  }
  if (numeratorScale === 0) return exactlyZero(input);

  // In units of the greater of value and standard error nothing overflows and no digit is lost.
  const scaled: RatioOfEstimates = {
    numerator: input.numerator / numeratorScale,
    denominator: input.denominator / denominatorScale,
    numeratorVariance: input.numeratorVariance / numeratorScale / numeratorScale,
    denominatorVariance: input.denominatorVariance / denominatorScale / denominatorScale,
    covariance: input.covariance / numeratorScale / denominatorScale,
    factor: input.factor,
  };
  const { numerator: a, denominator: b } = scaled;
  const ratio = finiteOrNull((a / b) * unit);
  const variance =
    scaled.numeratorVariance - 2 * (a / b) * scaled.covariance + (a / b) ** 2 * scaled.denominatorVariance;
  return {
    estimate: ratio,
    standardError:
      ratio === null ? null : finiteOrNull((Math.sqrt(Math.max(variance, 0)) / Math.abs(b)) * unit),
    g: finiteOrNull((input.factor ** 2 * scaled.denominatorVariance) / b ** 2),
    set: inUnits(setOf(scaled), unit),
  };
}

/** Estimate with the Fieller set as its interval; null where the set is unbounded. */
export function estimateOfRatio(ratio: Ratio, level: number): Estimate {
  if (ratio.estimate === null) return noEstimate(level);
  const { set } = ratio;
  return {
    estimate: ratio.estimate,
    standardError: ratio.standardError,
    interval: set.kind === "bounded" ? [set.low, set.high] : null,
    level,
  };
}

/** A numerator of 0 known exactly: the ratio is 0, unless the denominator may be 0 as well. */
function exactlyZero({ denominator, denominatorVariance, factor }: RatioOfEstimates): Ratio {
  const g = finiteOrNull((factor ** 2 * denominatorVariance) / denominator ** 2);
  const known = g !== null && g < 1;
  return {
    estimate: denominator === 0 ? null : 0,
    standardError: denominator === 0 ? null : 0,
    g,
    set: known ? { kind: "bounded", low: 0, high: 0 } : { kind: "whole-line" },
  };
}

function setOf({
  numerator: a,
  denominator: b,
  numeratorVariance,
  denominatorVariance,
  covariance,
  factor,
}: RatioOfEstimates): RatioSet {
  const t2 = factor ** 2;
  const leading = b ** 2 - t2 * denominatorVariance;
  const middle = a * b - t2 * covariance;
  const constant = a ** 2 - t2 * numeratorVariance;
  const discriminant =
    t2 *
    (b ** 2 * numeratorVariance -
      2 * a * b * covariance +
      a ** 2 * denominatorVariance -
      t2 * (numeratorVariance * denominatorVariance - covariance ** 2));

  if (leading === 0) return halfLine(middle, constant);
  // With g < 1 the discriminant is not negative but for rounding: a/b itself belongs to the set.
  if (leading < 0 && discriminant <= 0) return { kind: "whole-line" };
  const root = Math.sqrt(Math.max(discriminant, 0));
  const outer = middle + (middle < 0 ? -root : root);
  const first = outer / leading;
  const second = outer === 0 ? -first : constant / outer;
  const low = Math.min(first, second);
  const high = Math.max(first, second);
  return leading > 0 ? { kind: "bounded", low, high } : { kind: "complement", upTo: low, from: high };
}

/** g = 1 to the last digit: −2Bθ + C ≤ 0. */
function halfLine(middle: number, constant: number): RatioSet {
  if (middle === 0) return { kind: "whole-line" };
  const end = constant / (2 * middle);
  return middle > 0
    ? { kind: "complement", upTo: null, from: end }
    : { kind: "complement", upTo: end, from: null };
}

function inUnits(set: RatioSet, unit: number): RatioSet {
  switch (set.kind) {
    case "bounded": {
      const [low, high] = [set.low * unit, set.high * unit];
      // An end beyond what a double holds bounds nothing.
      return Number.isFinite(low) && Number.isFinite(high)
        ? { kind: "bounded", low, high }
        : { kind: "whole-line" };
    }
    case "complement": {
      const upTo = set.upTo === null ? null : finiteOrNull(set.upTo * unit);
      const from = set.from === null ? null : finiteOrNull(set.from * unit);
      return upTo === null && from === null ? { kind: "whole-line" } : { kind: "complement", upTo, from };
    }
    case "whole-line":
      return set;
  }
}

function finiteOrNull(value: number): number | null {
  return Number.isFinite(value) ? value : null;
}

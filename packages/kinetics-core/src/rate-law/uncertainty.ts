import { columnOf, dot, entry } from "kinetics-core/linear-algebra";
import { type Estimate, estimateOf, noEstimate } from "kinetics-core/quantities";
import type { OrdersFit } from "./fit-orders";
import type { BudgetLine } from "./rate-law";
import { blockLoadings } from "./restricted-likelihood";
import { effectOf, loadingOf } from "./shared-errors";

/**
 * Uncertainty of a linear functional L of the coefficients (level at the centre, then the terms), as a sum of
 * independent contributions. With A the gain of the fit (coefficients = A y):
 *   scatter of the runs   s² Σ_j (u_j² + f)(L·A_j)²          m − q degrees of freedom
 *   blocks                s² σ_b² Σ_b (Σ_{j in b} L·A_j)²    blocks less terms degrees of freedom
 *   each shared error     (Σ_j L·A_j b_j)²                   known, no loss of freedom
 *   temperature           L₀² u²
 * s² scales what the runs' own residuals speak of; a stock's stated uncertainty is never shrunk by residuals that
 * happen to be small, since a shared error leaves no trace in them. Without shared errors on some of the runs the first
 * line is s² L(XᵀWX)⁻¹Lᵀ. Effective degrees of freedom by Welch and Satterthwaite (JCGM 100:2008, G.4.1).
 */
export interface UncertaintyOf {
  readonly value: number;
  /** Null with no degree of freedom. */
  readonly standardError: number | null;
  readonly degreesOfFreedom: number | null;
  /** Absolute values in the unit of L; all known contributions, even where the scatter is unknown. */
  readonly lines: readonly BudgetLine[];
}

export function uncertaintyOf(
  fit: OrdersFit,
  functional: readonly number[],
  temperatureRelative: number,
): UncertaintyOf {
  const parts = contributions(fit, functional, temperatureRelative);
  const value = dot(functional, fit.solution.coefficients);
  const lines = parts.map(({ source, signed }) => ({ source, relative: Math.abs(signed) }));
  if (fit.scale === null) return { value, standardError: null, degreesOfFreedom: null, lines };
  const variance = parts.reduce((sum, part) => sum + part.signed ** 2, 0);
  const lost = parts.reduce(
    (sum, part) => sum + (part.degreesOfFreedom === null ? 0 : part.signed ** 4 / part.degreesOfFreedom),
    0,
  );
  return {
    value,
    standardError: Math.sqrt(variance),
    degreesOfFreedom: lost > 0 ? variance ** 2 / lost : fit.degreesOfFreedom,
    lines,
  };
}

export function estimateOfFunctional(uncertainty: UncertaintyOf, offset: number, level: number): Estimate {
  return Number.isFinite(uncertainty.value)
    ? estimateOf(uncertainty.value + offset, uncertainty.standardError, uncertainty.degreesOfFreedom, level)
    : noEstimate(level);
}

/** Covariance of several functionals, everything included; null with no degree of freedom. */
export function covarianceOf(
  fit: OrdersFit,
  functionals: readonly (readonly number[])[],
  temperatureRelative: number,
): readonly (readonly number[])[] | null {
  const { scale } = fit;
  if (scale === null) return null;
  const gains = functionals.map((functional) => gainsOf(fit, functional));
  const sharedParts = functionals.map((functional) =>
    contributions(fit, functional, temperatureRelative)
      .filter((part) => part.degreesOfFreedom === null)
      .map((part) => part.signed),
  );
  const blocks = blockLoadings(fit.betweenBlocks === null ? [] : fit.blocks, fit.runs.length);
  return gains.map((first, a) =>
    gains.map((second, b) => {
      let own = 0;
      fit.ownVariances.forEach((variance, j) => {
        own += variance * (first[j] ?? 0) * (second[j] ?? 0);
      });
      const between = blocks.reduce((sum, z) => sum + dot(z, first) * dot(z, second), 0);
      return (
        scale * (own + (fit.betweenBlocks ?? 0) * between) + dot(sharedParts[a] ?? [], sharedParts[b] ?? [])
      );
    }),
  );
}

interface Contribution {
  readonly source: string;
  /** Standard deviation with the sign of the effect, so that covariances follow. */
  readonly signed: number;
  /** Null where the contribution is stated, not estimated. */
  readonly degreesOfFreedom: number | null;
}

function contributions(
  fit: OrdersFit,
  functional: readonly number[],
  temperatureRelative: number,
): readonly Contribution[] {
  const gains = gainsOf(fit, functional);
  const parts: Contribution[] = [];
  if (fit.scale !== null) {
    const root = Math.sqrt(fit.scale);
    const own = Math.sqrt(
      fit.ownVariances.reduce((sum, variance, j) => sum + variance * (gains[j] ?? 0) ** 2, 0),
    );
    const hasBlocks = fit.betweenBlocks !== null && fit.betweenBlocks > 0;
    const betweenFreedom = Math.max(1, fit.blocks.length - fit.design.terms.columns);
    parts.push({
      source: "Scatter of the runs",
      signed: root * own,
      degreesOfFreedom: hasBlocks ? Math.max(1, fit.degreesOfFreedom - betweenFreedom) : fit.degreesOfFreedom,
    });
    if (hasBlocks) {
      const sums = blockLoadings(fit.blocks, fit.runs.length).reduce((sum, z) => sum + dot(z, gains) ** 2, 0);
      parts.push({
        source: "Blocks",
        signed: root * Math.sqrt((fit.betweenBlocks ?? 0) * sums),
        degreesOfFreedom: betweenFreedom,
      });
    }
  }
  for (const error of fit.shared) {
    const signed =
      error.runs === null
        ? (functional[0] ?? 0) * error.relative * effectOf(error, fit.orders)
        : dot(gains, loadingOf(error, fit.orders, fit.runs.length));
    parts.push({ source: error.source, signed, degreesOfFreedom: null });
  }
  if (temperatureRelative > 0)
    parts.push({
      source: "Temperature",
      signed: (functional[0] ?? 0) * temperatureRelative,
      degreesOfFreedom: null,
    });
  return parts;
}

/** L·A_j for each run j: how far the functional moves per unit of ln v of that run. */
export function gainsOf(fit: OrdersFit, functional: readonly number[]): Float64Array {
  const { gain } = fit.solution;
  return Float64Array.from({ length: gain.columns }, (_, j) => dot(functional, columnOf(gain, j)));
}

/** Functional of the order of one free species. */
export function orderFunctional(fit: OrdersFit, free: number): readonly number[] {
  return [0, ...Array.from({ length: fit.design.rank }, (_, j) => entry(fit.design.basis, free, j))];
}

/** Functional of Σ weight·order over the free species. */
export function combinationFunctional(fit: OrdersFit, weights: readonly number[]): readonly number[] {
  return [
    0,
    ...Array.from({ length: fit.design.rank }, (_, j) =>
      weights.reduce((sum, weight, i) => sum + weight * entry(fit.design.basis, i, j), 0),
    ),
  ];
}

/** Functional of ln k: the level less Σ μ_i n_i over the free species. */
export function logRateConstantFunctional(fit: OrdersFit): readonly number[] {
  const { design } = fit;
  const means = design.free.map((species) => -(design.means[species] ?? 0));
  return [1, ...combinationFunctional(fit, means).slice(1)];
}

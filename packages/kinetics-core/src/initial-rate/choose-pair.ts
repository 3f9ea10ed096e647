import { sum } from "kinetics-core/summation";
import { AVERAGED_WITHIN } from "./constants";
import type { PairFit } from "./estimator-pairs";

/** The slope that a set of pairs agrees on. */
export interface ChosenSlope {
  readonly slope: number;
  readonly standardError: number;
  /** The pair with the greatest weight: its window and curve stand for the average. */
  readonly heaviest: PairFit;
}

/**
 * The rule: a pair's disagreement measures the bias of its lower member, M = se²(lower) + 4(b_lower − b_upper)².
 * The upper members of all pairs with M ≤ 2·M_min are averaged with weights 1/M, and
 * SE² = Σ w(se²_upper + (b_upper − b̄)²) carries both their noise and their disagreement.
 * `pairs`: at least one; with one pair, its upper member comes back as it is.
 */
export function chooseSlope(pairs: readonly PairFit[]): ChosenSlope {
  const least = pairs.reduce((a, b) => (b.criterion < a.criterion ? b : a));
  const near = pairs.filter((pair) => pair.criterion <= AVERAGED_WITHIN * least.criterion);
  const weights = near.map((pair) => least.criterion / pair.criterion);
  const total = sum(weights);
  const slope =
    near.reduce((slopes, pair, i) => slopes + (weights[i] ?? Number.NaN) * pair.upper.slope, 0) / total;
  const variance =
    near.reduce((squares, { upper }, i) => {
      return squares + (weights[i] ?? Number.NaN) * (upper.standardError ** 2 + (upper.slope - slope) ** 2);
    }, 0) / total;
  return { slope, standardError: Math.sqrt(variance), heaviest: least };
}

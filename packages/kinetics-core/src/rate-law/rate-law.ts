import type { ConcentrationUnit, Estimate, Flag, TimeUnit } from "kinetics-core/quantities";

/**
 * The shapes of a rate law found from rates: v = k Π c_i^{n_i}. Field names are those of the public compute API,
 * which is a thin face over `fitRateLaw`.
 */

export interface RateLawRun {
  readonly label: string;
  /** Starting concentration of every species of the law, in `concentrationUnit`; > 0. */
  readonly concentrations: Readonly<Record<string, number>>;
  /** Rate of reaction in concentrationUnit per timeUnit; > 0 for the logarithmic fit. */
  readonly rate: number;
  readonly rateStandardError?: number;
  /** Private part (pipetting) of each concentration's relative standard uncertainty. */
  readonly relativeUncertainty?: Readonly<Record<string, number>>;
  readonly block?: string;
  /** Runs with one `mixture` are re-readings of it and are averaged first. */
  readonly mixture?: string;
}

/** An error that several runs share: a stock, a dilution step, ε·l. */
export interface SharedUncertainty {
  /** Species whose concentrations it moves, all by the same factor. */
  readonly species: readonly string[];
  /** It moves the rates by that factor too (ε·l). */
  readonly onRate?: boolean;
  /** Relative standard uncertainty. */
  readonly relative: number;
  /** Labels of the runs that share it; all runs where absent. */
  readonly runs?: readonly string[];
  /**
   * Where it does not move all by the same factor (a pipette that gives half of one volume and all of another): by run
   * label, then species, how many times `relative` it moves that concentration, with its sign. 1 where absent.
   */
  readonly factors?: Readonly<Record<string, Readonly<Record<string, number>>>>;
  /** How the budget names it; default is made from the species. */
  readonly source?: string;
}

export interface RateLawInput {
  /** Names as the messages should print them. */
  readonly species: readonly string[];
  readonly runs: readonly RateLawRun[];
  readonly shared?: readonly SharedUncertainty[];
  /** A species that is not listed is free. */
  readonly orders?: Readonly<Record<string, "free" | number>>;
  /** Default mol/L. */
  readonly concentrationUnit?: ConcentrationUnit;
  /** Default s. */
  readonly timeUnit?: TimeUnit;
  /** Relative standard uncertainty that temperature brings to k: E_a·u_T/(R·T²). */
  readonly temperatureRelative?: number;
  /** Confidence level of every interval, default 0.95. */
  readonly level?: number;
}

/** `nearest`: the simple order lies outside the interval, or there is no interval; held orders read so too. */
export type SimpleOrderReading = "is" | "consistent" | "nearest" | "undetermined";

export interface RateConstant extends Estimate {
  /** Plain text, "L mol^-1 s^-1". */
  readonly unit: string;
}

/** One line of an uncertainty budget; the squares of all lines add up to the square of the total. */
export interface BudgetLine {
  readonly source: string;
  /** Relative standard uncertainty that this source alone brings. */
  readonly relative: number;
}

/** A linear combination of orders, Σ coefficient·order. */
export type OrderCombination = Readonly<Record<string, number>>;

/** One plot: ln v against ln c of one species with the effect of the others removed. Points are (x, y) about the centre. */
export interface AddedVariable {
  readonly species: string;
  readonly points: readonly {
    readonly label: string;
    /** Concentration of this species and the rate moved to the centre of all other species, not logarithms. */
    readonly concentration: number;
    readonly rateAtCentre: number;
    /** Residual of ln c on the others and of ln v on the others, both weighted; null where ln c does not exist. */
    readonly x: number | null;
    readonly y: number | null;
  }[];
  /** The order: fitted, or held. Null where the runs do not determine it. */
  readonly slope: number | null;
  readonly held: boolean;
}

/** How well the design alone tells one order from the others. */
export interface Separability {
  readonly species: string;
  /** Root-mean-square of ln c about its mean. */
  readonly spread: number;
  /** Root-mean-square of ln c after regression on ln c of the other free species. */
  readonly conditionalSpread: number;
  readonly severity: "blocks" | "weakens" | "holds";
}

/** Replicates against the law: does the law miss more than replicates differ among themselves? */
export interface LackOfFit {
  readonly fStatistic: number;
  readonly degreesOfFreedom: readonly [number, number];
  readonly pValue: number;
}

export interface RateLawFit {
  readonly status: "fitted";
  /** `rate`: some rate is known too poorly for a logarithm, so rates themselves were fitted. */
  readonly scale: "logarithmic" | "rate";
  readonly orders: Readonly<Record<string, Estimate>>;
  /** k at 1 (concentration unit) with the reported orders. */
  readonly rateConstant: RateConstant;
  readonly logRateConstant: Estimate;
  readonly centre: {
    /** Geometric means of the runs' concentrations. */
    readonly concentrations: Readonly<Record<string, number>>;
    readonly rate: Estimate;
    /** Of the rate at the centre. */
    readonly budget: readonly BudgetLine[];
  };
  /**
   * Of ln k, then the orders in the order of `species`; an order that was fixed has zeros. Null where no uncertainty
   * can be given or an order is undetermined.
   */
  readonly covariance: readonly (readonly number[])[] | null;
  /** Of ln k, or of the rate at the centre where ln k is undetermined. */
  readonly budget: readonly BudgetLine[];
  readonly betweenRunStandardDeviation: number | null;
  /** Standard deviation of ln v between blocks; null where there are none or the runs cannot tell. */
  readonly betweenBlockStandardDeviation: number | null;
  /** Runs (after averaging re-readings) less parameters. */
  readonly degreesOfFreedom: number;
  /** Effective (Welch) degrees of freedom behind the interval of ln k; null where there is no interval. */
  readonly rateConstantDegreesOfFreedom: number | null;
  readonly separable: boolean;
  readonly separability: readonly Separability[];
  /** Combinations of orders that the runs leave open, or all but open. */
  readonly undetermined: readonly {
    readonly combination: OrderCombination;
    readonly message: string;
  }[];
  /** Where orders cannot be told apart: the combinations of two or more that are known all the same. */
  readonly determined: readonly {
    readonly combination: OrderCombination;
    readonly value: Estimate;
  }[];
  readonly simpleOrders: {
    /** Held orders as they were held; an undetermined order is absent. */
    readonly orders: Readonly<Record<string, number>>;
    readonly reading: Readonly<Record<string, SimpleOrderReading>>;
    readonly rateConstant: RateConstant;
    readonly logRateConstant: Estimate;
    readonly budget: readonly BudgetLine[];
    /** Relative standard deviation of the runs about the law with simple orders; null with no freedom left. */
    readonly scatter: number | null;
  };
  readonly pairs: readonly {
    readonly runs: readonly [string, string];
    readonly species: string;
    readonly order: Estimate;
  }[];
  /** Runs (after averaging re-readings) in the order fitted, with residual of ln v, weight and leverage. */
  readonly residuals: readonly {
    readonly label: string;
    /** Labels of the readings averaged in it; one for an ordinary run. */
    readonly readings: readonly string[];
    readonly residual: number;
    /** 1/(u² + f), relative to the greatest. */
    readonly weight: number;
    readonly leverage: number;
    /** Deleted studentised residual; null where leverage leaves nothing to check it by. */
    readonly studentised: number | null;
  }[];
  readonly lackOfFit: LackOfFit | null;
  readonly addedVariables: readonly AddedVariable[];
  /** k with simple orders when one run is left out, per run, and the free orders without it; weights kept. */
  readonly leaveOneOut: readonly {
    readonly label: string;
    readonly rateConstant: number | null;
    readonly orders: Readonly<Record<string, number | null>>;
  }[];
  readonly flags: readonly Flag[];
}

export type RateLawResult =
  | RateLawFit
  | {
      readonly status: "too-few-runs" | "no-positive-rates" | "no-species" | "beyond-precision";
      readonly message: string;
      readonly flags: readonly Flag[];
    };

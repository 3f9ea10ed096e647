import type { Estimate, Flag } from "kinetics-core/quantities";

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
  readonly species: readonly string[];
  readonly onRate?: boolean;
  readonly relative: number;
  readonly runs?: readonly string[];
  /** How the budget names it; default is made from the species. */
  readonly source?: string;
}

export interface RateLawInput {
  readonly species: readonly string[];
  readonly runs: readonly RateLawRun[];
  readonly shared?: readonly SharedUncertainty[];
  readonly orders?: Readonly<Record<string, "free" | number>>;
  readonly concentrationUnit?: string;
  readonly timeUnit?: string;
  /** Relative standard uncertainty that temperature brings to k: E_a·u_T/(R·T²). */
  readonly temperatureRelative?: number;
  readonly level?: number;
}

export type SimpleOrderReading = "is" | "consistent" | "nearest" | "undetermined";

export interface RateConstant extends Estimate {
  /** Plain text, "L mol^-1 s^-1". */
  readonly unit: string;
}

/** One plot: ln v against ln c of one species with the effect of the others removed. Points are (x, y) about the centre. */
export interface AddedVariable {
  readonly species: string;
  readonly points: readonly {
    readonly label: string;
    /** Concentration of this species and the rate moved to the centre of all other species, not logarithms. */
    readonly concentration: number;
    readonly rateAtCentre: number;
    /** Residual of ln c on the others and of ln v on the others. */
    readonly x: number;
    readonly y: number;
  }[];
  readonly slope: number | null;
}

export interface RateLawFit {
  readonly status: "fitted";
  readonly orders: Readonly<Record<string, Estimate>>;
  /** k at 1 (concentration unit) with the reported orders. */
  readonly rateConstant: RateConstant;
  readonly logRateConstant: Estimate;
  readonly centre: {
    readonly concentrations: Readonly<Record<string, number>>;
    readonly rate: Estimate;
  };
  /** Of ln k, then the orders in the order of `species`; an order that was fixed has zeros. */
  readonly covariance: readonly (readonly number[])[];
  readonly budget: readonly { readonly source: string; readonly relative: number }[];
  readonly betweenRunStandardDeviation: number | null;
  readonly degreesOfFreedom: number;
  readonly separable: boolean;
  readonly undetermined: readonly {
    readonly combination: Readonly<Record<string, number>>;
    readonly message: string;
  }[];
  readonly simpleOrders: {
    readonly orders: Readonly<Record<string, number>>;
    readonly reading: Readonly<Record<string, SimpleOrderReading>>;
    readonly rateConstant: RateConstant;
    readonly logRateConstant: Estimate;
    readonly budget: readonly { readonly source: string; readonly relative: number }[];
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
    readonly residual: number;
    readonly weight: number;
    readonly leverage: number;
    /** Deleted studentised residual; null where leverage leaves nothing to check it by. */
    readonly studentised: number | null;
  }[];
  readonly addedVariables: readonly AddedVariable[];
  /** k with simple orders when one run is left out, per run. */
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
      readonly status: "too-few-runs" | "no-positive-rates" | "no-species";
      readonly message: string;
      readonly flags: readonly Flag[];
    };

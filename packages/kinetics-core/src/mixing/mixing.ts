import type { Flag, Uncertain } from "kinetics-core/quantities";

/**
 * From what was weighed and pipetted to concentrations at mixing time.
 *
 * A **stock** is made from weighed solutes. A **mixture** is made from portions of stocks, of other mixtures and of pure
 * solvent, either made up to a mark or summed: a dilution step is a mixture that later ones draw from, a run is a mixture
 * that nothing draws from. Concentrations are in mol/L; volumes in one unit of the caller's throughout. Volumes count as
 * additive, as they are in dilute water.
 *
 * Errors are relative standard deviations of independent sources, propagated to first order. What a run has for itself
 * (its own deliveries) and what it shares with others (each solute of each stock, each delivery of a dilution step, the
 * calibration of each device) stay apart, since shared errors move k and never average out over runs.
 */

/** A volume as it was delivered. */
export interface MeasuredVolume {
  /** ≥ 0. */
  readonly volume: number;
  /** Of this one delivery (repeatability of pipette and hand), in the unit of the volume; 0 where absent. */
  readonly standardUncertainty?: number;
  /** Device whose calibration error it carries, by name; exact calibration where absent. */
  readonly device?: string;
}

export interface Portion extends MeasuredVolume {
  /** Name of the stock or mixture drawn from; null for pure solvent. */
  readonly solution: string | null;
}

/** What the portions come to. `mark`: solvent fills up to that volume. `sum`: to their sum and nothing more. */
export type Total = { readonly kind: "sum" } | ({ readonly kind: "mark" } & MeasuredVolume);

/** One substance weighed into a stock; its error moves all its species by the same factor. */
export interface Solute {
  readonly name: string;
  /** Of the substance in the stock, mol/L; its uncertainty is that of weighing, purity and the stock's flask. */
  readonly concentration: Uncertain;
  /** How many of each species one formula unit gives: `{ "Na+": 1, "OH-": 1 }`. Numbers > 0. */
  readonly species: Readonly<Record<string, number>>;
}

export interface Stock {
  readonly kind: "stock";
  readonly name: string;
  readonly solutes: readonly Solute[];
}

/** A dilution step, or a reagent mixed from several stocks. */
export interface MixedSolution {
  readonly kind: "mixture";
  readonly name: string;
  readonly portions: readonly Portion[];
  /** Null where it was not given yet, which is refused. */
  readonly total: Total | null;
}

/** A pipette, burette or flask that is used more than once. */
export interface Device {
  readonly name: string;
  /** Relative standard uncertainty of its calibration, 0 to 1: it delivers this part too much or too little every time. */
  readonly relative: number;
}

export interface RunMixture {
  readonly label: string;
  readonly portions: readonly Portion[];
  readonly total: Total | null;
}

export interface MixingInput {
  readonly solutions: readonly (Stock | MixedSolution)[];
  readonly runs: readonly RunMixture[];
  readonly devices?: readonly Device[];
  /** Charge numbers by species; without them no ionic strength is given. */
  readonly charges?: Readonly<Record<string, number>>;
}

export type MixingRefusal =
  | "name-twice"
  | "bad-concentration"
  | "bad-device"
  | "volume-missing"
  | "volume-negative"
  | "uncertainty-negative"
  | "beyond-precision"
  | "no-total"
  | "above-the-mark"
  | "stock-missing"
  | "device-missing"
  | "made-from-itself"
  | "stock-refused";

/** A row that cannot be computed: the others stand. */
export interface RefusedRow {
  readonly status: "refused";
  /** Label of the run, or name of the solution or device. */
  readonly label: string;
  readonly code: MixingRefusal;
  readonly message: string;
}

/** An error that counts once, however many rows it reaches. */
export interface ErrorSource {
  /** As a budget names it: "Stock NaOH", "Dilution B/10", "Calibration of pipette 1", "Volumes of R03". */
  readonly name: string;
  readonly kind: "stock" | "step" | "device" | "run";
}

export interface Composition {
  /** Sum of the portions or the mark; null for a stock. */
  readonly totalVolume: number | null;
  /** mol/L, for every species of the call; 0 where it is absent. */
  readonly concentrations: Readonly<Record<string, number>>;
  /** Of each concentration, all sources together. */
  readonly standardUncertainties: Readonly<Record<string, number>>;
  /** Change of each concentration (mol/L) for one standard deviation of a source; `source` is its place in `sources`. */
  readonly effects: readonly {
    readonly source: number;
    readonly concentrations: Readonly<Record<string, number>>;
  }[];
  /** mol/L; null without charges of all species that are present. */
  readonly ionicStrength: Uncertain | null;
  readonly flags: readonly Flag[];
}

export interface MixedRow extends Composition {
  readonly status: "mixed";
  readonly label: string;
}

export interface Mixing {
  /** All species of all stocks, in the order of their first appearance. */
  readonly species: readonly string[];
  readonly sources: readonly ErrorSource[];
  /** In the order of the input. */
  readonly runs: readonly (MixedRow | RefusedRow)[];
  readonly solutions: readonly (MixedRow | RefusedRow)[];
  readonly refusedDevices: readonly RefusedRow[];
}

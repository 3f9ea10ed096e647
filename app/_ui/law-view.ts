/**
 * What the frame of a study shows, as plain props: the view files make it, the components draw it and decide nothing.
 * A `prose` string is set by `Prose`: "mol L^-1" raises, "k_0" lowers, "*k*" slants.
 */

/** One factor of a rate law. `order` as it is to be read: "1", "½", "0.97", "*a*"; "" prints no exponent. */
export interface LawFactor {
  readonly symbol: string;
  readonly order: string;
}

/** rate = `constant` × factors. `constant` is prose, "*k*". */
export interface LawView {
  readonly constant: string;
  readonly factors: readonly LawFactor[];
}

/** A number led by its uncertainty, as kinetics-core prints it: value and uncertainty share the power of ten. */
export interface PrintedNumber {
  readonly value: string;
  readonly uncertainty: string | null;
  readonly power: number;
}

export interface ConstantView {
  readonly symbol: string;
  readonly number: PrintedNumber;
  /** Plain text, "L mol^-1 s^-1". */
  readonly unit: string;
}

export interface FactView {
  /** "Evidence". */
  readonly label: string;
  /** "9 runs"; prose. */
  readonly headline: string;
  /** Sets the headline in the law's serif, for a rival law. */
  readonly asLaw?: boolean;
  /** "2 set aside"; prose. */
  readonly detail: string;
  /** Station that answers for it. */
  readonly href: string;
}

export interface StandingLawView {
  /** Changes exactly when the law does: the highlighter wipes and the reader is told once. */
  readonly changeKey: string;
  readonly law:
    | { readonly status: "law"; readonly expression: LawView; readonly constant: ConstantView }
    /** `missing` is a sentence, "Two more levels of B are needed." */
    | { readonly status: "no-law"; readonly missing: string };
  /** Prose behind "Standing law.": interval level, temperature, who A and B are. */
  readonly conditions: string;
  /** Evidence, Nearest rival, Weakest link, Checks. */
  readonly facts: readonly FactView[];
  /** The whole strip in one spoken sentence, without markup. */
  readonly announcement: string;
}

export type StationState = "holds" | "weakens" | "blocks" | "open" | "log";

export interface StationView {
  readonly name: string;
  readonly href: string;
  readonly state: StationState;
  /** One-line yield, "11 runs, 2 set aside"; prose. */
  readonly yield: string;
}

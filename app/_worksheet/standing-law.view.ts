import type { ConstantView, LawFactorView } from "./law-view";
import type { Station } from "./station";

/** The strip at the head of every station: the law as a sentence, its constant, and what could overturn it. */
export type StandingLawView = {
  /** Short sentences beside the law: interval level, temperature, ionic strength, who A and B are. */
  readonly conditions: readonly ConditionView[];
  readonly facts: readonly StandingFactView[];
  /** The whole strip as one plain sentence, for assistive technology and page titles. */
  readonly summary: string;
} & (
  | {
      readonly status: "law";
      readonly factors: readonly LawFactorView[];
      readonly constant: ConstantView | null;
    }
  /** "Two more levels of B are needed." */
  | { readonly status: "no-law"; readonly missing: string }
);

export type ConditionView =
  | { readonly kind: "words"; readonly text: string }
  /** "I = 0.10 mol L⁻¹": an italic symbol, a number, a unit as plain text. */
  | { readonly kind: "quantity"; readonly symbol: string; readonly value: string; readonly unit: string };

export interface StandingFactView {
  readonly name: "Evidence" | "Nearest rival" | "Weakest link" | "Checks";
  readonly value: string;
  readonly detail: string;
  /** The station that says more; null where none is built yet or the reader has no stations (shared page). */
  readonly station: Station | null;
}

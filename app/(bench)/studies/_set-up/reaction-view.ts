import type { ReactionTerm as DrawnTerm } from "@/app/_ui/formula";
import { type Balance, balanceOf } from "@/app/_worksheet/reaction/balance";
import type { Reaction, ReactionTerm } from "@/app/_worksheet/reaction/parse-reaction";
import type { SpeciesForm } from "./set-up-form.schema";

/** A reaction as it is typeset: terms with a note beneath, and the sentence that a screen reader says instead. */
export interface ReactionView {
  readonly left: readonly DrawnTerm[];
  readonly right: readonly DrawnTerm[];
  readonly arrow: "forward" | "reversible";
  readonly spoken: string;
  readonly checks: readonly BalanceCheck[];
}

export interface BalanceCheck {
  readonly severity: "holds" | "weakens" | "note";
  readonly text: string;
}

export function reactionView(reaction: Reaction, species: readonly SpeciesForm[]): ReactionView {
  const rowOf = (term: ReactionTerm) =>
    species.find(
      (row) => (row.formula || row.name) === term.species.text && row.stoichiometricNumber !== 0,
    ) ?? species.find((row) => (row.formula || row.name) === term.species.text);
  const drawn = (terms: readonly ReactionTerm[]) =>
    terms.map((term) => ({
      coefficient: term.coefficient,
      formula: term.species.text,
      note: noteOf(term, rowOf(term)),
    }));
  const spokenSide = (terms: readonly ReactionTerm[]) =>
    terms
      .map(
        (term) =>
          `${term.coefficient === 1 ? "" : `${term.coefficient} `}${rowOf(term)?.name || term.species.text}`,
      )
      .join(" plus ");
  return {
    left: drawn(reaction.left),
    right: drawn(reaction.right),
    arrow: reaction.arrow === "forward" ? "forward" : "reversible",
    spoken: `${spokenSide(reaction.left)} ${reaction.arrow === "forward" ? "gives" : "is in equilibrium with"} ${spokenSide(reaction.right)}`,
    checks: balanceChecks(balanceOf(reaction)),
  };
}

function noteOf(term: ReactionTerm, row: SpeciesForm | undefined): string {
  const symbol = row?.symbol || term.symbol;
  const name =
    symbol !== "" && symbol !== term.species.text
      ? symbol
      : row?.role === "solvent"
        ? "solvent"
        : (row?.name ?? "");
  const shown = name === term.species.text ? "" : name;
  return row?.followed ? [shown, "followed"].filter(Boolean).join(", ") : shown;
}

export function balanceChecks({ atoms, charge }: Balance): BalanceCheck[] {
  if (atoms.status === "not-checked") {
    const names = atoms.names.join(", ");
    return [
      {
        severity: "note",
        text: `Balance not checked: ${names} ${atoms.names.length === 1 ? "is a name" : "are names"} without a formula`,
      },
    ];
  }
  const checks: BalanceCheck[] = [
    atoms.status === "balances"
      ? {
          severity: "holds",
          text: `Atoms balance: ${atoms.counts.map(({ element, count }) => `${element} ${printed(count)}`).join(", ")}`,
        }
      : {
          severity: "weakens",
          text: `Atoms do not balance: ${atoms.differences
            .map(({ element, left, right }) => `${element} ${printed(left)} before, ${printed(right)} after`)
            .join("; ")}`,
        },
  ];
  if (charge.status === "balances") {
    checks.push({ severity: "holds", text: `Charge balances: ${signed(charge.charge)} on each side` });
  } else if (charge.status === "differs") {
    checks.push({
      severity: "weakens",
      text: `Charge does not balance: ${signed(charge.left)} before, ${signed(charge.right)} after`,
    });
  }
  return checks;
}

function printed(count: number): string {
  return String(Number(count.toPrecision(6)));
}

export function signed(number: number): string {
  const size = printed(Math.abs(number));
  return number === 0 ? "0" : `${number < 0 ? "−" : "+"}${size}`;
}

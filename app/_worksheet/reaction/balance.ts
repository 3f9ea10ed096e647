import { compareElements } from "./elements";
import type { Reaction, ReactionTerm } from "./parse-reaction";

/** Whether both sides hold the same atoms and the same charge. Fractional coefficients compare to 1e-9. */
export interface Balance {
  readonly atoms: AtomBalance;
  readonly charge: ChargeBalance;
}

export type AtomBalance =
  | { readonly status: "balances"; readonly counts: readonly ElementCount[] }
  | { readonly status: "differs"; readonly differences: readonly ElementDifference[] }
  /** Some species are named and have no formula. */
  | { readonly status: "not-checked"; readonly names: readonly string[] };

export type ChargeBalance =
  | { readonly status: "balances"; readonly charge: number }
  | { readonly status: "differs"; readonly left: number; readonly right: number }
  | { readonly status: "not-checked"; readonly names: readonly string[] };

export interface ElementCount {
  readonly element: string;
  readonly count: number;
}

export interface ElementDifference {
  readonly element: string;
  readonly left: number;
  readonly right: number;
}

const TOLERANCE = 1e-9;

export function balanceOf(reaction: Reaction): Balance {
  const names = [...reaction.left, ...reaction.right].flatMap(({ species }) =>
    species.kind === "name" ? [species.text] : [],
  );
  if (names.length > 0) {
    const distinct = [...new Set(names)];
    return {
      atoms: { status: "not-checked", names: distinct },
      charge: { status: "not-checked", names: distinct },
    };
  }
  const left = totals(reaction.left);
  const right = totals(reaction.right);
  const elements = [...new Set([...left.atoms.keys(), ...right.atoms.keys()])].sort(compareElements);
  const differences = elements.flatMap((element) => {
    const counts = { left: left.atoms.get(element) ?? 0, right: right.atoms.get(element) ?? 0 };
    return Math.abs(counts.left - counts.right) > TOLERANCE ? [{ element, ...counts }] : [];
  });
  return {
    atoms:
      differences.length > 0
        ? { status: "differs", differences }
        : {
            status: "balances",
            counts: elements.map((element) => ({ element, count: left.atoms.get(element) ?? 0 })),
          },
    charge:
      Math.abs(left.charge - right.charge) > TOLERANCE
        ? { status: "differs", left: left.charge, right: right.charge }
        : { status: "balances", charge: left.charge },
  };
}

function totals(terms: readonly ReactionTerm[]): { atoms: Map<string, number>; charge: number } {
  const atoms = new Map<string, number>();
  let charge = 0;
  for (const { species, coefficient } of terms) {
    if (species.kind === "name") continue;
    charge += coefficient * species.formula.charge;
    for (const [element, count] of species.formula.atoms) {
      atoms.set(element, (atoms.get(element) ?? 0) + coefficient * count);
    }
  }
  return { atoms, charge };
}

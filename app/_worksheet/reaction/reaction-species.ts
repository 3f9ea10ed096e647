import type { SheetSpecies } from "@/db/sheet/sheet.schema";
import { nameOf, roleOf } from "./known-species";
import type { Reaction, ReactionTerm } from "./parse-reaction";

/** A species as the reaction tells it: what the sheet holds but id, unit and position. */
export interface ReadSpecies {
  /** Formula text, or the name where no formula was typed; what two occurrences are told apart by. */
  readonly key: string;
  readonly symbol: string;
  readonly name: string;
  readonly formula: string;
  /** Net of both sides and signed: negative for reactants. */
  readonly stoichiometricNumber: number;
  readonly charge: number;
  readonly role: SheetSpecies["role"];
}

const LETTERS = "ABCDEFGHIJKLMNOQRSTUVWXYZ";

/**
 * The species of a reaction in the order they are written, each once. Reactants and catalysts without a symbol get
 * one, for the law has to name them: a short formula or name stands for itself, a longer one gets the next letter.
 */
export function speciesOfReaction(reaction: Reaction): ReadSpecies[] {
  const gathered = new Map<string, { term: ReactionTerm; symbol: string; net: number }>();
  const gather = (terms: readonly ReactionTerm[], sign: 1 | -1) => {
    for (const term of terms) {
      const known = gathered.get(term.species.text);
      gathered.set(term.species.text, {
        term: known?.term ?? term,
        symbol: known?.symbol || term.symbol,
        net: (known?.net ?? 0) + sign * term.coefficient,
      });
    }
  };
  gather(reaction.left, -1);
  gather(reaction.right, 1);
  const taken = new Set([...gathered.values()].map(({ symbol }) => symbol).filter((symbol) => symbol !== ""));
  return [...gathered].map(([key, { term, symbol, net }]) => {
    const stoichiometricNumber = Math.abs(net) < 1e-9 ? 0 : net;
    const role = roleOf(key, stoichiometricNumber);
    const needsSymbol = role === "reactant" || role === "catalyst";
    return {
      key,
      symbol: symbol || (needsSymbol ? freeSymbol(key, taken) : ""),
      name: term.species.kind === "name" ? key : nameOf(key),
      formula: term.species.kind === "formula" ? key : "",
      stoichiometricNumber,
      charge: term.species.kind === "formula" ? term.species.formula.charge : 0,
      role,
    };
  });
}

const LONGEST_SELF_SYMBOL = 9;

function freeSymbol(key: string, taken: Set<string>): string {
  const candidates = key.length <= LONGEST_SELF_SYMBOL ? [key, ...LETTERS] : [...LETTERS];
  const symbol = candidates.find((candidate) => !taken.has(candidate)) ?? `X${taken.size}`;
  taken.add(symbol);
  return symbol;
}

import { type PowerTerm, startingOrder } from "./law-of-powers";
import type { EquationParameter } from "./rate-equation";

/**
 * Concentration that a constant is started for where the caller knows none, mol L⁻¹: the middle of what solutions
 * for kinetics usually hold.
 */
const USUAL_CONCENTRATION = 0.01;

/** Share of the main term that an added term is started at: seen by the fit, and too small to spoil its first step. */
export const STARTING_SHARE = 0.1;

/** A constant this many times above its start leaves nothing of the term that it competes with. */
const LARGEST_OVER_START = 1e6;

/** Concentration in the middle of the runs, mol L⁻¹, by the species' name; undefined where it is not known. */
export type TypicalConcentration = (species: string) => number | undefined;

export function typicalOf(species: string, typical: TypicalConcentration | undefined): number {
  const concentration = typical?.(species);
  return concentration !== undefined && Number.isFinite(concentration) && concentration > 0
    ? concentration
    : USUAL_CONCENTRATION;
}

/** Π main/Π added at typical concentrations: the weight that makes both terms equal there. */
export function shareOfTypical(
  main: readonly PowerTerm[],
  added: readonly PowerTerm[],
  typical: TypicalConcentration | undefined,
): number {
  return Math.exp(logarithmOf(main, typical) - logarithmOf(added, typical));
}

function logarithmOf(terms: readonly PowerTerm[], typical: TypicalConcentration | undefined): number {
  return terms.reduce(
    (sum, term) => sum + startingOrder(term) * Math.log(typicalOf(term.species, typical)),
    0,
  );
}

export interface ConstantOptions {
  readonly name: string;
  readonly concentrationPower: EquationParameter["concentrationPower"];
  readonly start: number;
  readonly nullValue: number | null;
  /** Least value; default 0. */
  readonly least?: number;
}

export function constantParameter(options: ConstantOptions): EquationParameter {
  const { name, concentrationPower, start, nullValue, least = 0 } = options;
  if (!(Number.isFinite(start) && start > 0)) {
    throw new RangeError(`${name} starts at ${start}; a constant needs a start above zero`);
  }
  return {
    name,
    kind: "constant",
    concentrationPower,
    start,
    bounds: [least, start * LARGEST_OVER_START],
    nullValue,
  };
}

import type { PowerTerm } from "./law-of-powers";
import { powerEquationOf } from "./power-equation";
import type { RateEquation } from "./rate-equation";

export interface CatalystOptions {
  readonly reactants: readonly PowerTerm[];
  /** Enters the rate and is not used up: its concentration is what the run was mixed with. */
  readonly catalyst: PowerTerm;
}

/** v = k Π c_i^{n_i} [cat]^n: the order in a catalyst; at n = 0 it has no effect. */
export function catalystEquation({ reactants, catalyst }: CatalystOptions): RateEquation {
  const equation = powerEquationOf([...reactants, catalyst]);
  const common = { ...equation, form: "catalyst" };
  if (catalyst.order !== "free") return common;
  const parameter = equation.parameters.length - 1;
  return {
    ...common,
    parameters: equation.parameters.map((one, j) => (j === parameter ? { ...one, nullValue: 0 } : one)),
    simpler: [{ parameter, at: 0, equation: powerEquationOf([...reactants, { ...catalyst, order: 0 }]) }],
  };
}

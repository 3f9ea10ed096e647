import {
  constantParameter,
  STARTING_SHARE,
  shareOfTypical,
  type TypicalConcentration,
} from "./constant-parameter";
import { addParameter, type EquationLayout, layOutPowers, type PowerTerm } from "./law-of-powers";
import { powerEquationOf } from "./power-equation";
import type { RateEquation, SimplerLaw } from "./rate-equation";
import { twoPaths } from "./two-paths";

export interface ReversibleOptions {
  readonly forward: readonly PowerTerm[];
  readonly reverse: readonly PowerTerm[];
  /** K = Π products/Π reactants at equilibrium, in powers of mol L⁻¹; a number above zero holds it. */
  readonly equilibriumConstant: "free" | number;
  readonly typical?: TypicalConcentration;
}

/**
 * v = k (Π c_i^{n_i} − Π c_j^{n′_j}/K): the reverse reaction slows the course towards its equilibrium. Fitted is 1/K: f
 * is linear in it, and a reaction that does not turn back has 1/K = 0, an ordinary value, where K has none. The interval
 * of K is the reciprocal of its interval.
 */
export function reversibleEquation(options: ReversibleOptions): RateEquation {
  const { forward, reverse, equilibriumConstant, typical } = options;
  const layout: EquationLayout = { species: [], parameters: [] };
  const first = layOutPowers(forward, layout);
  const second = layOutPowers(reverse, layout, "n′");
  const paths = { first: first.product, second: second.product, sign: -1 } as const;
  const common = {
    form: "reversible",
    reversible: true,
    overallOrder: first.product.overallOrder,
  } as const;
  const forwards = first.text || "1";
  const backwards = second.text || "1";

  if (equilibriumConstant !== "free") {
    if (!(Number.isFinite(equilibriumConstant) && equilibriumConstant > 0)) {
      throw new RangeError(`K is ${equilibriumConstant}; give a number above zero or "free"`);
    }
    return {
      ...common,
      law: `v = k (${forwards} − ${backwards}/${equilibriumConstant})`,
      ...layout,
      evaluate: twoPaths({ ...paths, weight: { held: 1 / equilibriumConstant }, ...layout }),
      simpler: [],
    };
  }
  const parameter = addParameter(
    layout,
    constantParameter({
      name: "1/K",
      concentrationPower: (theta) => first.product.overallOrder(theta) - second.product.overallOrder(theta),
      start: STARTING_SHARE * shareOfTypical(forward, reverse, typical),
      nullValue: 0,
    }),
  );
  const irreversible: SimplerLaw = { parameter, at: 0, equation: powerEquationOf(forward) };
  return {
    ...common,
    law: `v = k (${forwards} − ${backwards}/K)`,
    ...layout,
    evaluate: twoPaths({ ...paths, weight: { parameter }, ...layout }),
    simpler: [irreversible],
  };
}

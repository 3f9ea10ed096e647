import {
  constantParameter,
  STARTING_SHARE,
  shareOfTypical,
  type TypicalConcentration,
} from "./constant-parameter";
import { addParameter, type EquationLayout, layOutPowers, type PowerTerm } from "./law-of-powers";
import { powerEquationOf } from "./power-equation";
import { powerProduct } from "./power-product";
import type { RateEquation } from "./rate-equation";
import { twoPaths } from "./two-paths";

export interface AutocatalyticOptions {
  /** The path that needs no product. */
  readonly uncatalysed: readonly PowerTerm[];
  /** The product that speeds up its own formation. */
  readonly product: PowerTerm;
  readonly typical?: TypicalConcentration;
}

/**
 * v = k Π c_i^{n_i} (1 + κ [P]^m): k is the rate constant of the uncatalysed path, kκ that of the catalysed one. At κ = 0
 * there is no autocatalysis. A reaction that needs seed of its product, without an uncatalysed path, is a law of powers.
 */
export function autocatalyticEquation({ uncatalysed, product, typical }: AutocatalyticOptions): RateEquation {
  if (uncatalysed.some(({ species }) => species === product.species)) {
    throw new RangeError(
      `${product.species} catalyses and cannot be in the uncatalysed path as well; take it out of one of them`,
    );
  }
  const layout: EquationLayout = { species: [], parameters: [] };
  const first = layOutPowers(uncatalysed, layout);
  const catalyst = layOutPowers([product], layout);
  const catalysed = powerProduct([...first.factors, ...catalyst.factors]);
  const parameter = addParameter(
    layout,
    constantParameter({
      name: "κ",
      concentrationPower: (theta) => -catalyst.product.overallOrder(theta),
      start: STARTING_SHARE * shareOfTypical([], [product], typical),
      nullValue: 0,
    }),
  );
  return {
    form: "autocatalytic",
    law: `v = k${first.text && ` ${first.text}`} (1 + κ${catalyst.text && ` ${catalyst.text}`})`,
    ...layout,
    evaluate: twoPaths({
      first: first.product,
      second: catalysed,
      sign: 1,
      weight: { parameter },
      ...layout,
    }),
    reversible: false,
    overallOrder: first.product.overallOrder,
    simpler: [
      { parameter, at: 0, equation: powerEquationOf(uncatalysed) },
      { parameter, at: Number.POSITIVE_INFINITY, equation: powerEquationOf([...uncatalysed, product]) },
    ],
  };
}

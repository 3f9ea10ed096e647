import { type EquationLayout, layOutPowers, type PowerTerm } from "./law-of-powers";
import type { RateEquation } from "./rate-equation";

/**
 * v = k Π c_i^{n_i}. `orders` in the order of `species`: "free" or the held order, zero included; all free where absent.
 * `starts`: where the fit of a free order begins, default 1.
 */
export function powerEquation(
  species: readonly string[],
  orders: readonly ("free" | number)[] = species.map(() => "free"),
  starts: readonly number[] = [],
): RateEquation {
  if (orders.length !== species.length) {
    throw new RangeError(`${species.length} species have ${orders.length} orders; give one for each`);
  }
  const terms = species.map((name, i): PowerTerm => {
    const start = starts[i];
    const order = orders[i] ?? "free";
    return start === undefined ? { species: name, order } : { species: name, order, start };
  });
  return powerEquationOf(terms);
}

export function powerEquationOf(terms: readonly PowerTerm[]): RateEquation {
  const layout: EquationLayout = { species: [], parameters: [] };
  const { product, text } = layOutPowers(terms, layout);
  return {
    form: "power",
    law: text === "" ? "v = k" : `v = k ${text}`,
    ...layout,
    evaluate: product.evaluate,
    reversible: false,
    overallOrder: product.overallOrder,
    simpler: [],
  };
}

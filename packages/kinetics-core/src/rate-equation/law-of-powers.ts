import { type PowerFactor, type PowerProduct, powerProduct } from "./power-product";
import type { EquationParameter } from "./rate-equation";

/** Orders of species that multiply each other, Π c_i^{n_i}: what makers of equations are given. */
export interface PowerTerm {
  readonly species: string;
  /** A number holds the order, zero included: the species then stays in the list and has no effect. */
  readonly order: "free" | number;
  /** Where the fit of a free order begins; default 1. */
  readonly start?: number;
}

/**
 * No law built of elementary steps has an order outside; a fit that ends at such a bound has found no order, and is told
 * so by the bound.
 */
const ORDER_BOUNDS: readonly [number, number] = [-3, 5];

export const START_OF_AN_ORDER = 1;

/** Where the species of an equation stand in c and its parameters in θ, while the equation is put together. */
export interface EquationLayout {
  readonly species: string[];
  readonly parameters: EquationParameter[];
}

/** A product with its text. Adds to the layout what it needs and the layout does not have yet. */
export interface LaidOutPowers {
  readonly factors: readonly PowerFactor[];
  readonly product: PowerProduct;
  /** "[A]^n_A [B]^2"; empty where every order is held at zero. */
  readonly text: string;
}

/** `symbol` tells the orders of a second path from those of the first, n′_A from n_A. */
export function layOutPowers(
  terms: readonly PowerTerm[],
  layout: EquationLayout,
  symbol: "n" | "n′" = "n",
): LaidOutPowers {
  refuseRepeated(terms.map(({ species }) => species));
  const factors = terms.map((term) => layOutPower(term, layout, symbol));
  const texts = terms.flatMap(({ species, order }) => {
    if (order === "free") return [`[${species}]^${symbol}_${species}`];
    return order === 0 ? [] : [powerText(species, order)];
  });
  return { factors, product: powerProduct(factors), text: texts.join(" ") };
}

export function startingOrder({ order, start = START_OF_AN_ORDER }: PowerTerm): number {
  return order === "free" ? start : order;
}

function layOutPower(term: PowerTerm, layout: EquationLayout, symbol: string): PowerFactor {
  const { species, order, start = START_OF_AN_ORDER } = term;
  const place = placeOf(species, layout);
  if (order === "free") {
    return {
      place,
      order: { parameter: addParameter(layout, orderParameter(`${symbol}_${species}`, start)) },
    };
  }
  if (!Number.isFinite(order)) {
    throw new RangeError(`the order of ${species} is ${order}; give a number or "free"`);
  }
  return { place, order: { held: order } };
}

export function orderParameter(name: string, start: number): EquationParameter {
  const [low, high] = ORDER_BOUNDS;
  if (!(start >= low && start <= high)) {
    throw new RangeError(`${name} starts at ${start}; orders are sought from ${low} to ${high}`);
  }
  return { name, kind: "order", concentrationPower: () => 0, start, bounds: ORDER_BOUNDS, nullValue: null };
}

/** Index of the parameter in θ. */
export function addParameter(layout: EquationLayout, parameter: EquationParameter): number {
  return layout.parameters.push(parameter) - 1;
}

/** Index of the species in c. */
export function placeOf(species: string, layout: EquationLayout): number {
  if (species.length === 0)
    throw new RangeError("a species has no name; give every species of a rate law one");
  const place = layout.species.indexOf(species);
  return place < 0 ? layout.species.push(species) - 1 : place;
}

function refuseRepeated(names: readonly string[]): void {
  const repeated = names.find((name, i) => names.indexOf(name) !== i);
  if (repeated !== undefined) {
    throw new RangeError(`${repeated} stands twice in one product of powers; give each species one order`);
  }
}

function powerText(species: string, order: number): string {
  return order === 1 ? `[${species}]` : `[${species}]^${order}`;
}

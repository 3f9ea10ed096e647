import { isFiniteValue } from "./finite-value";
import type { PowerProduct } from "./power-product";
import { type EquationParameter, equationValue, type RateEquation } from "./rate-equation";

/**
 * f = P·g(x; K) of a product of powers and a factor of one concentration x and one constant K. The factor writes g,
 * ∂g/∂x and ∂g/∂K.
 */
export interface ModifiedProduct {
  readonly product: PowerProduct;
  readonly factor: (x: number, constant: number, into: FactorValue) => void;
  /** Index of x in c and of K in θ. */
  readonly place: number;
  readonly parameter: number;
  readonly species: readonly string[];
  readonly parameters: readonly EquationParameter[];
}

export interface FactorValue {
  g: number;
  byConcentration: number;
  byConstant: number;
}

export function modifiedProduct({
  product,
  factor,
  place,
  parameter,
  species,
  parameters,
}: ModifiedProduct): RateEquation["evaluate"] {
  const base = equationValue({ species, parameters });
  const modifier: FactorValue = { g: 0, byConcentration: 0, byConstant: 0 };

  return (c, theta, into) => {
    const x = c[place] ?? Number.NaN;
    if (!(x >= 0) || !product.evaluate(c, theta, base)) return false;
    factor(x, theta[parameter] ?? Number.NaN, modifier);
    const { g } = modifier;
    into.f = base.f * g;
    for (let i = 0; i < species.length; i++) into.byConcentration[i] = (base.byConcentration[i] ?? 0) * g;
    for (let j = 0; j < parameters.length; j++) into.byParameter[j] = (base.byParameter[j] ?? 0) * g;
    into.byConcentration[place] = (into.byConcentration[place] ?? 0) + base.f * modifier.byConcentration;
    into.byParameter[parameter] = base.f * modifier.byConstant;
    return isFiniteValue(into);
  };
}

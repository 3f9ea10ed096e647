import { isFiniteValue } from "./finite-value";
import type { PowerProduct } from "./power-product";
import { type EquationParameter, equationValue, type RateEquation } from "./rate-equation";

/**
 * f = P₁ + s·a·P₂ of two products of powers, s = +1 for a path that runs beside the first and −1 for one that runs
 * against it. a is the parameter that weighs the second path, or held.
 */
export interface TwoPaths {
  readonly first: PowerProduct;
  readonly second: PowerProduct;
  readonly sign: 1 | -1;
  readonly weight: { readonly held: number } | { readonly parameter: number };
  readonly species: readonly string[];
  readonly parameters: readonly EquationParameter[];
}

export function twoPaths({
  first,
  second,
  sign,
  weight,
  species,
  parameters,
}: TwoPaths): RateEquation["evaluate"] {
  const one = equationValue({ species, parameters });
  const other = equationValue({ species, parameters });
  const weightPlace = "parameter" in weight ? weight.parameter : -1;
  const heldWeight = "held" in weight ? weight.held : 0;

  return (c, theta, into) => {
    if (!first.evaluate(c, theta, one) || !second.evaluate(c, theta, other)) return false;
    const factor = sign * (weightPlace < 0 ? heldWeight : (theta[weightPlace] ?? Number.NaN));
    into.f = one.f + factor * other.f;
    for (let i = 0; i < species.length; i++) {
      into.byConcentration[i] = (one.byConcentration[i] ?? 0) + factor * (other.byConcentration[i] ?? 0);
    }
    for (let j = 0; j < parameters.length; j++) {
      into.byParameter[j] = (one.byParameter[j] ?? 0) + factor * (other.byParameter[j] ?? 0);
    }
    if (weightPlace >= 0) into.byParameter[weightPlace] = sign * other.f;
    return isFiniteValue(into);
  };
}

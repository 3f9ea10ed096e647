import {
  constantParameter,
  STARTING_SHARE,
  type TypicalConcentration,
  typicalOf,
} from "./constant-parameter";
import { addParameter, type EquationLayout, layOutPowers, type PowerTerm, placeOf } from "./law-of-powers";
import { type FactorValue, modifiedProduct } from "./modified-product";
import { powerEquationOf } from "./power-equation";
import type { RateEquation } from "./rate-equation";

export interface InhibitedOptions {
  readonly uninhibited: readonly PowerTerm[];
  /** The species that slows the reaction, as a rule its product. */
  readonly inhibitor: string;
  readonly typical?: TypicalConcentration;
}

/**
 * v = k Π c_i^{n_i}/(1 + K_I [P]): P ties up what would react, K_I being the constant of its binding. At K_I = 0 it does
 * not; as K_I grows without end the order in P becomes −1.
 */
export function inhibitedEquation({ uninhibited, inhibitor, typical }: InhibitedOptions): RateEquation {
  if (uninhibited.some(({ species }) => species === inhibitor)) {
    throw new RangeError(
      `${inhibitor} inhibits and cannot have an order as well; take it out of the uninhibited law`,
    );
  }
  const layout: EquationLayout = { species: [], parameters: [] };
  const { product, text } = layOutPowers(uninhibited, layout);
  const place = placeOf(inhibitor, layout);
  const parameter = addParameter(
    layout,
    constantParameter({
      name: "K_I",
      concentrationPower: () => -1,
      start: STARTING_SHARE / typicalOf(inhibitor, typical),
      nullValue: 0,
    }),
  );
  return {
    form: "inhibited",
    law: `v = k${text && ` ${text}`}/(1 + K_I [${inhibitor}])`,
    ...layout,
    evaluate: modifiedProduct({ product, factor: binding, place, parameter, ...layout }),
    reversible: false,
    overallOrder: product.overallOrder,
    simpler: [
      { parameter, at: 0, equation: powerEquationOf(uninhibited) },
      {
        parameter,
        at: Number.POSITIVE_INFINITY,
        equation: powerEquationOf([...uninhibited, { species: inhibitor, order: -1 }]),
      },
    ],
  };
}

/** g = 1/(1 + Kx); ∂g/∂x = −K g²; ∂g/∂K = −x g². */
function binding(x: number, constant: number, into: FactorValue): void {
  const g = 1 / (1 + constant * x);
  into.g = g;
  into.byConcentration = -constant * g * g;
  into.byConstant = -x * g * g;
}

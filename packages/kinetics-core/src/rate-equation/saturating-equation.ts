import { constantParameter, type TypicalConcentration, typicalOf } from "./constant-parameter";
import { addParameter, type EquationLayout, layOutPowers, type PowerTerm, placeOf } from "./law-of-powers";
import { type FactorValue, modifiedProduct } from "./modified-product";
import { powerEquationOf } from "./power-equation";
import type { RateEquation } from "./rate-equation";

export interface SaturatingOptions {
  /** The species in which the rate levels off. */
  readonly saturating: string;
  /** Powers of others that multiply the law, such as the catalyst; none where absent. */
  readonly others?: readonly PowerTerm[];
  readonly typical?: TypicalConcentration;
}

/** Least K over its start: below, the rate has no slope left that readings could see. */
const LEAST_OVER_START = 1e-6;

/**
 * v = k c/(K + c) Π c_i^{n_i}: k is the limiting rate and K the concentration of half of it. The law is of order zero in
 * c at K = 0 and of order one, with rate constant k/K, as K grows without end.
 */
export function saturatingEquation({ saturating, others = [], typical }: SaturatingOptions): RateEquation {
  if (others.some(({ species }) => species === saturating)) {
    throw new RangeError(
      `${saturating} saturates and cannot have an order as well; take it out of the others`,
    );
  }
  const layout: EquationLayout = { species: [], parameters: [] };
  const place = placeOf(saturating, layout);
  const { product, text } = layOutPowers(others, layout);
  const start = typicalOf(saturating, typical);
  const parameter = addParameter(
    layout,
    constantParameter({
      name: "K",
      concentrationPower: () => 1,
      start,
      nullValue: 0,
      least: LEAST_OVER_START * start,
    }),
  );
  const withOrder = (order: number) => powerEquationOf([{ species: saturating, order }, ...others]);
  return {
    form: "saturating",
    law: `v = k [${saturating}]/(K + [${saturating}])${text && ` ${text}`}`,
    ...layout,
    evaluate: modifiedProduct({ product, factor: levellingOff, place, parameter, ...layout }),
    reversible: false,
    overallOrder: product.overallOrder,
    simpler: [
      { parameter, at: 0, equation: withOrder(0) },
      { parameter, at: Number.POSITIVE_INFINITY, equation: withOrder(1) },
    ],
  };
}

/** g = x/(K + x); ∂g/∂x = K/(K + x)²; ∂g/∂K = −x/(K + x)². */
function levellingOff(x: number, constant: number, into: FactorValue): void {
  const sum = constant + x;
  into.g = x / sum;
  into.byConcentration = constant / sum / sum;
  into.byConstant = -x / sum / sum;
}

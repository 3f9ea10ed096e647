import {
  constantParameter,
  STARTING_SHARE,
  shareOfTypical,
  type TypicalConcentration,
} from "./constant-parameter";
import { addParameter, type EquationLayout, layOutPowers, type PowerTerm } from "./law-of-powers";
import { powerEquationOf } from "./power-equation";
import type { RateEquation } from "./rate-equation";
import { twoPaths } from "./two-paths";

export interface BackgroundOptions {
  readonly main: readonly PowerTerm[];
  /** The path that runs beside it; without terms a constant rate. Its free orders are its own, n′. */
  readonly background: readonly PowerTerm[];
  readonly typical?: TypicalConcentration;
}

/**
 * v = k (Π c_i^{n_i} + β Π c_i^{n′_i}): a second path beside the first, such as the uncatalysed beside the catalysed one.
 * kβ is the background's own rate constant. At β = 0 the first path is alone.
 */
export function backgroundEquation({ main, background, typical }: BackgroundOptions): RateEquation {
  const layout: EquationLayout = { species: [], parameters: [] };
  const first = layOutPowers(main, layout);
  const second = layOutPowers(background, layout, "n′");
  const parameter = addParameter(
    layout,
    constantParameter({
      name: "β",
      concentrationPower: (theta) => first.product.overallOrder(theta) - second.product.overallOrder(theta),
      start: STARTING_SHARE * shareOfTypical(main, background, typical),
      nullValue: 0,
    }),
  );
  return {
    form: "background",
    law: `v = k (${first.text || "1"} + β${second.text && ` ${second.text}`})`,
    ...layout,
    evaluate: twoPaths({
      first: first.product,
      second: second.product,
      sign: 1,
      weight: { parameter },
      ...layout,
    }),
    reversible: false,
    overallOrder: first.product.overallOrder,
    simpler: [
      { parameter, at: 0, equation: powerEquationOf(main) },
      { parameter, at: Number.POSITIVE_INFINITY, equation: powerEquationOf(background) },
    ],
  };
}

import type { EquationValue } from "./rate-equation";
import { isMultiplied, wholePower } from "./whole-power";

/**
 * P = Π c_i^{n_i} with its derivatives ∂P/∂c_i = n_i P/c_i and ∂P/∂n_i = P ln c_i. Fitted orders share one exponential,
 * exp(Σ n_i ln c_i); small whole orders that are held are multiplied out, so that a held first order costs neither
 * logarithm nor exponential and returns c itself.
 *
 * At c_i = 0: a factor with n > 0 makes P zero. Its slope there is 0 for n > 1, the product of the others for n = 1 and
 * infinite for 0 < n < 1; the last is written as 0, because a course that has used up the species stays there and must
 * not be divided by. x^n ln x tends to 0, and so does the derivative by n. n < 0 has no value, and a fitted n of exactly
 * 0 no derivative: both are refused.
 */
export interface PowerProduct {
  /**
   * Writes P and its derivatives into `into`; entries of species and parameters that are not its own stay as they
   * are. Returns false where something is not finite.
   */
  evaluate(c: Float64Array, theta: Float64Array, into: EquationValue): boolean;
  overallOrder(theta: ArrayLike<number>): number;
}

export interface PowerFactor {
  /** Index of the species in c. */
  readonly place: number;
  /** The held order, or the index in θ of a fitted one. */
  readonly order: { readonly held: number } | { readonly parameter: number };
}

/** A factor as the loop wants it; `order` and `logarithm` are scratch. */
interface Factor {
  readonly place: number;
  /** −1: held. */
  readonly parameter: number;
  readonly multiplied: boolean;
  order: number;
  logarithm: number;
}

export function powerProduct(powers: readonly PowerFactor[]): PowerProduct {
  // c^0 is 1 whatever c: a held order of zero leaves the product, so that its species may be missing.
  const factors = powers.filter(({ order }) => !("held" in order && order.held === 0)).map(factorOf);

  return {
    evaluate(c, theta, into) {
      let f = 1;
      let exponent = 0;
      for (const factor of factors) {
        const x = c[factor.place] ?? Number.NaN;
        if (!(x > 0)) return x === 0 && evaluateAtZero(factors, c, theta, into);
        if (factor.multiplied) {
          f *= wholePower(x, factor.order);
        } else {
          if (factor.parameter >= 0) factor.order = theta[factor.parameter] ?? Number.NaN;
          factor.logarithm = Math.log(x);
          exponent += factor.order * factor.logarithm;
        }
      }
      if (exponent !== 0) f *= Math.exp(exponent);
      into.f = f;
      // Zero as long as everything is finite, NaN afterwards.
      let probe = f * 0;
      for (const { place, parameter, order, logarithm } of factors) {
        const slope = (f * order) / (c[place] ?? Number.NaN);
        into.byConcentration[place] = slope;
        probe += slope * 0;
        if (parameter >= 0) {
          const byOrder = f * logarithm;
          into.byParameter[parameter] = byOrder;
          probe += byOrder * 0;
        }
      }
      return probe === 0;
    },
    overallOrder: (theta) =>
      factors.reduce(
        (sum, { parameter, order }) => sum + (parameter < 0 ? order : (theta[parameter] ?? Number.NaN)),
        0,
      ),
  };
}

function factorOf({ place, order }: PowerFactor): Factor {
  if (!("held" in order)) {
    return { place, parameter: order.parameter, multiplied: false, order: Number.NaN, logarithm: 0 };
  }
  const { held } = order;
  return { place, parameter: -1, multiplied: isMultiplied(held), order: held, logarithm: 0 };
}

/** Some concentration is zero: P is zero, and at most one slope is not. */
function evaluateAtZero(
  factors: readonly Factor[],
  c: Float64Array,
  theta: Float64Array,
  into: EquationValue,
): boolean {
  let vanishing = 0;
  let others = 1;
  for (const factor of factors) {
    const x = c[factor.place] ?? Number.NaN;
    if (factor.parameter >= 0) factor.order = theta[factor.parameter] ?? Number.NaN;
    if (!(x >= 0) || !Number.isFinite(factor.order)) return false;
    if (x > 0) others *= x ** factor.order;
    else if (factor.order > 0) vanishing++;
    else return false;
  }
  if (!Number.isFinite(others)) return false;
  into.f = 0;
  for (const { place, parameter, order } of factors) {
    const carries = vanishing === 1 && order === 1 && c[place] === 0;
    into.byConcentration[place] = carries ? others : 0;
    if (parameter >= 0) into.byParameter[parameter] = 0;
  }
  return true;
}

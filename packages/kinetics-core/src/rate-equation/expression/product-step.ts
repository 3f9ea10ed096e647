import { isMultiplied, wholePower } from "../whole-power";
import type { Factor, ProductInstruction } from "./expression-program";

/**
 * y = constant · Π x_i^{e_i} and its derivatives ∂y/∂x_i = y e_i/x_i and ∂y/∂e_i = y ln x_i. Powers at zero are those of
 * the built-in laws: 0^e is 0 for e > 0, with its slope written as 0 where it is infinite, and has no value for e ≤ 0. A
 * negative x has whole powers only. What has no value becomes NaN and is found at the end of the run.
 */
export interface ProductStep {
  readonly kind: "product";
  readonly target: number;
  readonly constant: number;
  readonly factors: readonly StepFactor[];
}

/** `exponent` and `logarithm` are scratch; the exponent is kept where it is held. */
interface StepFactor {
  readonly slot: number;
  /** −1: held. */
  readonly exponentSlot: number;
  readonly multiplied: boolean;
  exponent: number;
  logarithm: number;
}

export function productStep({ constant, factors }: ProductInstruction, target: number): ProductStep {
  return { kind: "product", target, constant, factors: factors.map(stepFactor) };
}

function stepFactor({ slot, exponent }: Factor): StepFactor {
  return "held" in exponent
    ? {
        slot,
        exponentSlot: -1,
        multiplied: isMultiplied(exponent.held),
        exponent: exponent.held,
        logarithm: 0,
      }
    : { slot, exponentSlot: exponent.slot, multiplied: false, exponent: Number.NaN, logarithm: 0 };
}

export function productDown({ target, constant, factors }: ProductStep, values: Float64Array): void {
  let product = constant;
  let logarithm = 0;
  for (const factor of factors) {
    const x = values[factor.slot] ?? Number.NaN;
    if (factor.multiplied) {
      product *= wholePower(x, factor.exponent);
      continue;
    }
    if (factor.exponentSlot >= 0) factor.exponent = values[factor.exponentSlot] ?? Number.NaN;
    if (x > 0) {
      factor.logarithm = Math.log(x);
      logarithm += factor.exponent * factor.logarithm;
    } else {
      factor.logarithm = Number.NaN;
      product *= powerOfNonPositive(x, factor.exponent);
    }
  }
  values[target] = logarithm === 0 ? product : product * Math.exp(logarithm);
}

function powerOfNonPositive(x: number, exponent: number): number {
  if (x === 0) return exponent > 0 ? 0 : Number.NaN;
  return x ** exponent;
}

export function productUp(
  { target, factors, constant }: ProductStep,
  values: Float64Array,
  slopes: Float64Array,
): void {
  const slope = slopes[target] ?? 0;
  const y = values[target] ?? 0;
  if (y === 0) {
    upFromZero(factors, constant * slope, values, slopes);
    return;
  }
  const weight = slope * y;
  for (const { slot, exponentSlot, exponent, logarithm } of factors) {
    slopes[slot] = (slopes[slot] ?? 0) + (weight * exponent) / (values[slot] ?? 0);
    if (exponentSlot >= 0) slopes[exponentSlot] = (slopes[exponentSlot] ?? 0) + weight * logarithm;
  }
}

/** At most one slope is not zero: that of a factor to the first power which alone makes the product zero. */
function upFromZero(
  factors: readonly StepFactor[],
  scale: number,
  values: Float64Array,
  slopes: Float64Array,
): void {
  let vanishing: StepFactor | null = null;
  let others = scale;
  for (const factor of factors) {
    const x = values[factor.slot] ?? Number.NaN;
    if (x !== 0) others *= x ** factor.exponent;
    else if (vanishing !== null) return;
    else vanishing = factor;
  }
  if (vanishing?.exponent === 1) slopes[vanishing.slot] = (slopes[vanishing.slot] ?? 0) + others;
}

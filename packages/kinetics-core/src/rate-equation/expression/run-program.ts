import { isFiniteValue } from "../finite-value";
import type { RateEquation } from "../rate-equation";
import { wholePower } from "../whole-power";
import type { ExpressionProgram } from "./expression-program";
import {
  EXPONENTIAL,
  LOGARITHM,
  MULTIPLIED,
  PLAIN,
  PRODUCT,
  type ProgramTape,
  programTape,
  SUM,
} from "./program-tape";

/**
 * Runs a program whose inputs are `species` concentrations and then the parameters. Slots and derivatives are made once,
 * so that nothing is allocated in a run.
 *
 * A product y = constant · Π x_i^{e_i} has ∂y/∂x_i = y e_i/x_i and ∂y/∂e_i = y ln x_i. Powers at zero are those of the
 * built-in laws: 0^e is 0 for e > 0, with its slope written as 0 where it is infinite, and has no value for e ≤ 0. A
 * negative x has whole powers only. What has no value becomes NaN and is found at the end of the run.
 */
export function runProgram(program: ExpressionProgram, species: number): RateEquation["evaluate"] {
  const tape = programTape(program);
  const { inputs, result } = tape;
  const slots = inputs + tape.operation.length;
  const values = new Float64Array(slots);
  /** ∂f/∂slot. */
  const slopes = new Float64Array(slots);
  const logarithms = new Float64Array(tape.slot.length);

  return (c, theta, into) => {
    for (let i = 0; i < species; i++) {
      const x = c[i] ?? Number.NaN;
      if (!(x >= 0)) return false;
      values[i] = x;
    }
    for (let j = species; j < inputs; j++) values[j] = theta[j - species] ?? Number.NaN;
    valuesDown(tape, values, logarithms);
    into.f = values[result] ?? Number.NaN;

    for (let i = 0; i < slots; i++) slopes[i] = 0;
    slopes[result] = 1;
    slopesUp(tape, values, logarithms, slopes);
    for (let i = 0; i < species; i++) into.byConcentration[i] = slopes[i] ?? Number.NaN;
    for (let j = species; j < inputs; j++) into.byParameter[j - species] = slopes[j] ?? Number.NaN;
    return isFiniteValue(into);
  };
}

function valuesDown(tape: ProgramTape, values: Float64Array, logarithms: Float64Array): void {
  const { inputs, operation, constant, first, slot, weight } = tape;
  for (let step = 0; step < operation.length; step++) {
    const start = first[step] ?? 0;
    const end = first[step + 1] ?? 0;
    const kind = operation[step];
    let value = constant[step] ?? 0;
    if (kind === SUM) {
      for (let i = start; i < end; i++) value += (weight[i] ?? 0) * (values[slot[i] ?? 0] ?? 0);
    } else if (kind === PRODUCT) {
      value = productOf(tape, value, start, end, values, logarithms);
    } else {
      const x = values[slot[start] ?? 0] ?? 0;
      value = kind === EXPONENTIAL ? Math.exp(x) : Math.log(x);
    }
    values[inputs + step] = value;
  }
}

function productOf(
  tape: ProgramTape,
  constant: number,
  start: number,
  end: number,
  values: Float64Array,
  logarithms: Float64Array,
): number {
  const { slot, power, exponentSlot, weight } = tape;
  let product = constant;
  let logarithm = 0;
  for (let i = start; i < end; i++) {
    const x = values[slot[i] ?? 0] ?? 0;
    const kind = power[i];
    if (kind === PLAIN) {
      product *= x;
    } else if (kind === MULTIPLIED) {
      product *= wholePower(x, weight[i] ?? 0);
    } else {
      const own = exponentSlot[i] ?? -1;
      if (own >= 0) weight[i] = values[own] ?? 0;
      const exponent = weight[i] ?? 0;
      const ofX = x > 0 ? Math.log(x) : Number.NaN;
      logarithms[i] = ofX;
      if (x > 0) logarithm += exponent * ofX;
      else product *= powerOfNonPositive(x, exponent);
    }
  }
  return logarithm === 0 ? product : product * Math.exp(logarithm);
}

function powerOfNonPositive(x: number, exponent: number): number {
  if (x === 0) return exponent > 0 ? 0 : Number.NaN;
  return x ** exponent;
}

function slopesUp(
  tape: ProgramTape,
  values: Float64Array,
  logarithms: Float64Array,
  slopes: Float64Array,
): void {
  const { inputs, operation, constant, first, slot, exponentSlot, weight } = tape;
  for (let step = operation.length - 1; step >= 0; step--) {
    const start = first[step] ?? 0;
    const end = first[step + 1] ?? 0;
    const kind = operation[step];
    const value = values[inputs + step] ?? 0;
    const slope = slopes[inputs + step] ?? 0;
    if (kind === PRODUCT && value === 0) {
      slopesUpFromZero(tape, (constant[step] ?? 0) * slope, start, end, values, slopes);
      continue;
    }
    for (let i = start; i < end; i++) {
      const place = slot[i] ?? 0;
      const own = exponentSlot[i] ?? -1;
      const local = localSlope(kind ?? SUM, value, weight[i] ?? 0, values[place] ?? 0);
      slopes[place] = (slopes[place] ?? 0) + slope * local;
      if (own >= 0) slopes[own] = (slopes[own] ?? 0) + slope * value * (logarithms[i] ?? 0);
    }
  }
}

/** ∂value/∂x of one operand. */
function localSlope(kind: number, value: number, weight: number, x: number): number {
  if (kind === PRODUCT) return (value * weight) / x;
  if (kind === SUM) return weight;
  return kind === LOGARITHM ? 1 / x : value;
}

/** At most one slope is not zero: that of a factor to the first power which alone makes the product zero. */
function slopesUpFromZero(
  { slot, weight }: ProgramTape,
  scale: number,
  start: number,
  end: number,
  values: Float64Array,
  slopes: Float64Array,
): void {
  let vanishing = -1;
  let others = scale;
  for (let i = start; i < end; i++) {
    const x = values[slot[i] ?? 0] ?? 0;
    if (x !== 0) others *= x ** (weight[i] ?? 0);
    else if (vanishing >= 0) return;
    else vanishing = i;
  }
  if (vanishing < 0 || weight[vanishing] !== 1) return;
  const place = slot[vanishing] ?? 0;
  slopes[place] = (slopes[place] ?? 0) + others;
}

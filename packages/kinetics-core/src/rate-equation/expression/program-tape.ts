import { isMultiplied } from "../whole-power";
import type { Exponent, ExpressionProgram, Instruction } from "./expression-program";

/**
 * A program laid out in flat arrays, over which one loop runs without calls or objects. Of step s: `operation[s]`, the
 * slot that it fills `inputs + s`, `constant[s]`, and its operands `first[s]` up to, not including, `first[s + 1]`.
 */
export interface ProgramTape {
  readonly inputs: number;
  readonly result: number;
  readonly operation: Uint8Array;
  readonly constant: Float64Array;
  readonly first: Int32Array;
  /** Of each operand: the slot it is read from, */
  readonly slot: Int32Array;
  /** how its power is taken, */
  readonly power: Uint8Array;
  /** the slot of its exponent, −1 where that is held, */
  readonly exponentSlot: Int32Array;
  /** and its weight in a sum or its exponent in a product. */
  readonly weight: Float64Array;
}

export const SUM = 0;
export const PRODUCT = 1;
export const EXPONENTIAL = 2;
export const LOGARITHM = 3;

/** The factor itself; by multiplication; through its logarithm. */
export const PLAIN = 0;
export const MULTIPLIED = 1;
const THROUGH_LOGARITHM = 2;

interface Operand {
  readonly slot: number;
  readonly exponent: Exponent;
}

export function programTape({ inputs, instructions, result }: ExpressionProgram): ProgramTape {
  const operands = instructions.map(operandsOf);
  const all = operands.flat();
  let count = 0;
  return {
    inputs,
    result,
    operation: Uint8Array.from(instructions, operationOf),
    constant: Float64Array.from(instructions, (one) => ("constant" in one ? one.constant : 0)),
    first: Int32Array.from([0, ...operands.map((list) => (count += list.length))]),
    slot: Int32Array.from(all, ({ slot }) => slot),
    power: Uint8Array.from(all, ({ exponent }) => powerOf(exponent)),
    exponentSlot: Int32Array.from(all, ({ exponent }) => ("slot" in exponent ? exponent.slot : -1)),
    weight: Float64Array.from(all, ({ exponent }) => ("held" in exponent ? exponent.held : Number.NaN)),
  };
}

function operationOf({ kind }: Instruction): number {
  return { sum: SUM, product: PRODUCT, exp: EXPONENTIAL, ln: LOGARITHM }[kind];
}

function operandsOf(instruction: Instruction): readonly Operand[] {
  switch (instruction.kind) {
    case "sum":
      return instruction.terms.map(({ slot, weight }) => ({ slot, exponent: { held: weight } }));
    case "product":
      return instruction.factors;
    default:
      return [{ slot: instruction.slot, exponent: { held: 1 } }];
  }
}

function powerOf(exponent: Exponent): number {
  if (!("held" in exponent) || !isMultiplied(exponent.held)) return THROUGH_LOGARITHM;
  return exponent.held === 1 ? PLAIN : MULTIPLIED;
}

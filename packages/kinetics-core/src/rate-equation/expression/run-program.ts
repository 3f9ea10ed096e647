import { isFiniteValue } from "../finite-value";
import type { RateEquation } from "../rate-equation";
import type { ExpressionProgram, Instruction } from "./expression-program";
import { type ProductStep, productDown, productStep, productUp } from "./product-step";

/**
 * Runs a program whose inputs are `species` concentrations and then the parameters. The slots and their derivatives are
 * made once, so that nothing is allocated in a run.
 */
export function runProgram(program: ExpressionProgram, species: number): RateEquation["evaluate"] {
  const { inputs, result } = program;
  const steps = program.instructions.map((instruction, i) => stepOf(instruction, inputs + i));
  const upwards = steps.toReversed();
  const values = new Float64Array(inputs + steps.length);
  /** ∂f/∂slot. */
  const slopes = new Float64Array(inputs + steps.length);

  return (c, theta, into) => {
    for (let i = 0; i < species; i++) {
      const x = c[i] ?? Number.NaN;
      if (!(x >= 0)) return false;
      values[i] = x;
    }
    for (let j = species; j < inputs; j++) values[j] = theta[j - species] ?? Number.NaN;
    for (const step of steps) down(step, values);
    into.f = values[result] ?? Number.NaN;

    slopes.fill(0);
    slopes[result] = 1;
    for (const step of upwards) up(step, values, slopes);
    for (let i = 0; i < species; i++) into.byConcentration[i] = slopes[i] ?? Number.NaN;
    for (let j = species; j < inputs; j++) into.byParameter[j - species] = slopes[j] ?? Number.NaN;
    return isFiniteValue(into);
  };
}

type Step =
  | ProductStep
  | {
      readonly kind: "sum";
      readonly target: number;
      readonly constant: number;
      readonly slots: Int32Array;
      readonly weights: Float64Array;
    }
  | { readonly kind: "exp" | "ln"; readonly target: number; readonly slot: number };

function stepOf(instruction: Instruction, target: number): Step {
  switch (instruction.kind) {
    case "product":
      return productStep(instruction, target);
    case "sum": {
      const { constant, terms } = instruction;
      const slots = Int32Array.from(terms, ({ slot }) => slot);
      return {
        kind: "sum",
        target,
        constant,
        slots,
        weights: Float64Array.from(terms, ({ weight }) => weight),
      };
    }
    default:
      return { kind: instruction.kind, target, slot: instruction.slot };
  }
}

function down(step: Step, values: Float64Array): void {
  switch (step.kind) {
    case "product":
      productDown(step, values);
      break;
    case "sum": {
      let sum = step.constant;
      const { slots, weights } = step;
      for (let i = 0; i < slots.length; i++) sum += (weights[i] ?? 0) * (values[slots[i] ?? 0] ?? 0);
      values[step.target] = sum;
      break;
    }
    case "exp":
      values[step.target] = Math.exp(values[step.slot] ?? Number.NaN);
      break;
    case "ln":
      values[step.target] = Math.log(values[step.slot] ?? Number.NaN);
      break;
  }
}

function up(step: Step, values: Float64Array, slopes: Float64Array): void {
  const slope = slopes[step.target] ?? 0;
  switch (step.kind) {
    case "product":
      productUp(step, values, slopes);
      break;
    case "sum": {
      const { slots, weights } = step;
      for (let i = 0; i < slots.length; i++) {
        const slot = slots[i] ?? 0;
        slopes[slot] = (slopes[slot] ?? 0) + slope * (weights[i] ?? 0);
      }
      break;
    }
    case "exp":
      slopes[step.slot] = (slopes[step.slot] ?? 0) + slope * (values[step.target] ?? 0);
      break;
    case "ln":
      slopes[step.slot] = (slopes[step.slot] ?? 0) + slope / (values[step.slot] ?? 0);
      break;
  }
}

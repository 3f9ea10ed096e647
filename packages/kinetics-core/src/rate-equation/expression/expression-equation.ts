import { type TypicalConcentration, typicalOf } from "../constant-parameter";
import { START_OF_AN_ORDER } from "../law-of-powers";
import { powerProduct } from "../power-product";
import type { RateEquation } from "../rate-equation";
import { compileExpression, type NamedSlots, type ParameterPlace } from "./compile-expression";
import { type ExpressionFault, faultAt } from "./expression-fault";
import { MOST_PARAMETERS } from "./expression-limits";
import { type ExpressionNode, parameterNamed, parametersIn, speciesIn } from "./expression-node";
import { expressionParameter } from "./expression-parameter";
import { isNeverNegative, parametersInExponents } from "./expression-sign";
import { expressionUnits } from "./expression-units";
import { parseExpression } from "./parse-expression";
import { powersInProgram } from "./powers-in-program";
import { printExpression } from "./print-expression";
import { type RateConstantOf, rateConstantOf } from "./rate-constant-of";
import { runProgram } from "./run-program";

export interface ExpressionOptions {
  /** Species of the reaction: [A] and A mean one of them, every other name is a parameter. */
  readonly species: readonly string[];
  readonly typical?: TypicalConcentration;
  /** Where the fit of a parameter begins, by its name; undefined leaves it to the kind of the parameter. */
  readonly start?: (parameter: string) => number | undefined;
}

export type ExpressionEquation =
  | {
      readonly status: "equation";
      readonly equation: RateEquation;
      readonly rateConstant: RateConstantOf;
    }
  | ExpressionFault;

/**
 * The rate law that a user wrote, such as `k [A]^a/(1 + K [P])`: read by a grammar of its own, never run as code. Which
 * parameter is the rate constant: see `rateConstantOf`.
 */
export function expressionEquation(text: string, options: ExpressionOptions): ExpressionEquation {
  const node = parseExpression(text, options.species);
  if ("status" in node) return node;
  const written = parametersIn(node);
  const tooMany = tooManyParameters(node, written);
  if (tooMany !== null) return tooMany;
  const rateConstant = rateConstantOf(node, written);
  if ("status" in rateConstant) return rateConstant;

  const used = speciesIn(node);
  const species = options.species.filter((name) => used.has(name));
  const fitted = written.filter((name) => name !== rateConstant.name);
  const program = compileExpression(node, slotsOf(species, fitted, rateConstant.name));
  if ("withoutValue" in program) return withoutValue(program.withoutValue);
  const powers = powersInProgram(program, species.length);
  const units = expressionUnits(node, fitted);
  const exponents = parametersInExponents(node);
  const atStart = {
    concentrations: species.map((name) => typicalOf(name, options.typical)),
    theta: fitted.map(() => START_OF_AN_ORDER),
  };
  const law = printExpression(node);
  return {
    status: "equation",
    rateConstant,
    equation: {
      form: "expression",
      law: rateConstant.written ? `v = ${law}` : `v = k (${law})`,
      species,
      parameters: fitted.map((name, j) => {
        const isRatio = rateConstant.ratios.includes(name);
        return expressionParameter(
          {
            name: isRatio ? `${name}/${rateConstant.name}` : name,
            isExponent: exponents.has(name),
            concentrationPower: units.parameters[j] ?? null,
            start: options.start?.(name),
          },
          atStart,
        );
      }),
      evaluate: powers === null ? runProgram(program, species.length) : powerProduct(powers).evaluate,
      reversible: !isNeverNegative(node, exponents),
      overallOrder: units.whole,
      simpler: [],
    },
  };
}

function slotsOf(species: readonly string[], fitted: readonly string[], rateConstant: string): NamedSlots {
  return {
    species: new Map(species.map((name, i) => [name, i])),
    parameters: new Map<string, ParameterPlace>([
      ...fitted.map((name, j) => [name, { slot: species.length + j }] as const),
      [rateConstant, { held: 1 }],
    ]),
  };
}

function tooManyParameters(node: ExpressionNode, written: readonly string[]): ExpressionFault | null {
  const surplus = written[MOST_PARAMETERS];
  if (surplus === undefined) return null;
  return faultAt(
    "too-many-names",
    parameterNamed(node, surplus) ?? node,
    `The expression has ${written.length} parameters; up to ${MOST_PARAMETERS} are read. Give numbers for those that are known.`,
  );
}

function withoutValue(node: ExpressionNode): ExpressionFault {
  return faultAt(
    "constant-without-value",
    node,
    "This part has no finite value: it divides by zero, or takes a logarithm or root of what has none. Correct the numbers in it.",
  );
}

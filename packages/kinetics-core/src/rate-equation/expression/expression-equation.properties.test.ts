import fc from "fast-check";
import { derivative, parse } from "mathjs";
import { describe, expect, it } from "vitest";
import { equationValue } from "../rate-equation";
import { expressionEquation } from "./expression-equation";
import type { ExpressionFunction, ExpressionNode, ExpressionOperator } from "./expression-node";
import { parseExpression } from "./parse-expression";
import { printExpression } from "./print-expression";

fc.configureGlobal({ seed: 1864 });

const SPECIES = ["A", "B"];
const PARAMETERS = ["a", "b"];
const NAMES = [...SPECIES, ...PARAMETERS];

/** Expressions in all that the grammar knows, as trees. */
function expression(numbers: readonly number[]): fc.Arbitrary<ExpressionNode> {
  return fc.letrec<{ node: ExpressionNode; leaf: ExpressionNode }>((tie) => ({
    leaf: fc.oneof(
      fc.constantFrom(...SPECIES).map((name): ExpressionNode => ({ kind: "species", name, ...NOWHERE })),
      fc.constantFrom(...PARAMETERS).map((name): ExpressionNode => ({ kind: "parameter", name, ...NOWHERE })),
      fc.constantFrom(...numbers).map((value): ExpressionNode => ({ kind: "number", value, ...NOWHERE })),
    ),
    node: fc.oneof(
      { maxDepth: 5, depthSize: "medium" },
      tie("leaf"),
      fc.tuple(fc.constantFrom<ExpressionOperator>("+", "-", "*", "/", "^"), tie("node"), tie("node")).map(
        ([operator, left, right]): ExpressionNode => ({
          kind: "operation",
          operator,
          left,
          right,
          ...NOWHERE,
        }),
      ),
      tie("node").map((of): ExpressionNode => ({ kind: "negative", of, ...NOWHERE })),
      fc
        .tuple(fc.constantFrom<ExpressionFunction>("exp", "ln", "log10", "sqrt"), tie("node"))
        .map(([name, of]): ExpressionNode => ({ kind: "function", name, of, ...NOWHERE })),
    ),
  })).node;
}

const NOWHERE = { position: 0, length: 1 };

const point = fc.tuple(...NAMES.map(() => fc.double({ min: 0.2, max: 3, noNaN: true })));

describe("a printed expression", () => {
  it("reads as the same expression", () => {
    fc.assert(
      fc.property(expression([0.5, 1, 2, 3, 1e-7, 2.5e21]), (node) => {
        const text = printExpression(node);
        const again = parseExpression(text, SPECIES);
        if ("status" in again) throw new Error(`${text}: ${again.message}`);
        expect(forMathjs(again)).toBe(forMathjs(node));
      }),
      { numRuns: 500 },
    );
  });
});

describe("an expression as a rate equation", () => {
  it("agrees with mathjs in value and in every derivative", () => {
    let compared = 0;
    fc.assert(
      fc.property(expression([0.5, 1, 2, 3]), point, (node, values) => {
        const ours = valuesOf(node, values);
        if (ours === null) return;
        const expected = valuesByMathjs(node, ours.names, values);
        // How far a change of the inputs by 1e-13 carries: what cancels is known no better than that.
        const moved = valuesByMathjs(
          node,
          ours.names,
          values.map((value) => value * (1 + 1e-13)),
        );
        if (expected === null || moved === null) return;
        ours.values.forEach((value, i) => {
          const one = expected[i] ?? Number.NaN;
          const blurred = 100 * Math.abs((moved[i] ?? Number.NaN) - one);
          expect(Math.abs(value - one)).toBeLessThanOrEqual(1e-11 * Math.abs(one) + blurred + 1e-13);
        });
        compared++;
      }),
      { numRuns: 200 },
    );
    expect(compared).toBeGreaterThan(50);
  });
});

/** f and its derivatives by what the expression holds; null where there is no equation or no value. */
function valuesOf(node: ExpressionNode, values: readonly number[]) {
  const read = expressionEquation(`k (${printExpression(node)})`, { species: SPECIES });
  if (read.status !== "equation") return null;
  const { equation } = read;
  const names = [...equation.species, ...equation.parameters.map(({ name }) => name)];
  const numbers = names.map((name) => values[NAMES.indexOf(name)] ?? Number.NaN);
  const into = equationValue(equation);
  const c = Float64Array.from(numbers.slice(0, equation.species.length));
  const theta = Float64Array.from(numbers.slice(equation.species.length));
  if (!equation.evaluate(c, theta, into)) return null;
  return { names, values: [into.f, ...into.byConcentration, ...into.byParameter] };
}

/** Null where a value is not finite, or a complex number lies on the way. */
function valuesByMathjs(node: ExpressionNode, names: readonly string[], values: readonly number[]) {
  const scope = Object.fromEntries(NAMES.map((name, i) => [name, values[i] ?? Number.NaN]));
  const tree = parse(forMathjs(node));
  const nodes = [tree, ...names.map((name) => derivative(tree, name, { simplify: false }))];
  const numbers: unknown[] = nodes.map((one) => one.evaluate(scope));
  return numbers.every((value) => typeof value === "number" && Number.isFinite(value))
    ? numbers.map(Number)
    : null;
}

function forMathjs(node: ExpressionNode): string {
  switch (node.kind) {
    case "number":
      return String(node.value);
    case "species":
    case "parameter":
      return node.name;
    case "negative":
      return `(-${forMathjs(node.of)})`;
    case "function":
      return `${node.name === "ln" ? "log" : node.name}(${forMathjs(node.of)})`;
    default:
      return `(${forMathjs(node.left)} ${node.operator} ${forMathjs(node.right)})`;
  }
}

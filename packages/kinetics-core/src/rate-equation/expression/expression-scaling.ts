import type { ExpressionNode } from "./expression-node";

/**
 * How an expression scales when its parts do, so that it says what its rate constant is and in which unit. A degree is a
 * linear form: entry 0 is the power of concentration, entry j + 1 how often parameter j enters as a factor. Sums demand
 * that both sides have one degree, functions and exponents that their argument has none; these demands are kept as rows
 * that must vanish.
 */
export interface ExpressionScaling {
  readonly degree: Degree;
  readonly demands: readonly Demand[];
}

export type Degree = Float64Array<ArrayBuffer>;

/** The degree that must vanish, and the part of the expression that asks for it. */
export interface Demand {
  readonly degree: Degree;
  readonly of: ExpressionNode;
}

/** `values`: of the parameters, where they are exponents. A parameter that is not listed counts as a plain number. */
export function expressionScaling(
  node: ExpressionNode,
  parameters: readonly string[],
  values: (parameter: string) => number,
): ExpressionScaling {
  const demands: Demand[] = [];
  const none = () => new Float64Array(parameters.length + 1);

  function degreeOf(node: ExpressionNode): Degree {
    switch (node.kind) {
      case "number":
        return none();
      case "species":
        return none().fill(1, 0, 1);
      case "parameter": {
        const place = parameters.indexOf(node.name) + 1;
        return place === 0 ? none() : none().fill(1, place, place + 1);
      }
      case "negative":
        return degreeOf(node.of);
      case "function":
        return node.name === "sqrt" ? degreeOf(node.of).map((power) => power / 2) : withoutDegree(node.of);
      default:
        return degreeOfOperation(node);
    }
  }

  function degreeOfOperation(node: Extract<ExpressionNode, { kind: "operation" }>): Degree {
    const { operator } = node;
    if (operator === "^") return degreeOfPower(node.left, node.right);
    const left = degreeOf(node.left);
    const right = degreeOf(node.right);
    if (operator === "*") return left.map((power, i) => power + (right[i] ?? 0));
    const difference = left.map((power, i) => power - (right[i] ?? 0));
    if (operator === "/") return difference;
    demands.push({ degree: difference, of: node });
    return left;
  }

  function degreeOfPower(base: ExpressionNode, exponent: ExpressionNode): Degree {
    withoutDegree(exponent);
    const value = numberIn(exponent, values);
    if (value === null) return withoutDegree(base);
    return degreeOf(base).map((power) => power * value);
  }

  function withoutDegree(node: ExpressionNode): Degree {
    demands.push({ degree: degreeOf(node), of: node });
    return none();
  }

  return { degree: degreeOf(node), demands };
}

/** Numbers between 1 and 2 of which no two are alike: what holds for such exponents holds for all. */
export function genericValues(parameters: readonly string[]): (parameter: string) => number {
  return (parameter) => 1 + (((parameters.indexOf(parameter) + 1) * Math.SQRT2) % 1);
}

/** Value of a part without species; null where there are some. */
function numberIn(node: ExpressionNode, values: (parameter: string) => number): number | null {
  switch (node.kind) {
    case "number":
      return node.value;
    case "species":
      return null;
    case "parameter":
      return values(node.name);
    case "negative":
    case "function": {
      const of = numberIn(node.of, values);
      return of === null ? null : node.kind === "negative" ? -of : FUNCTIONS[node.name](of);
    }
    default: {
      const left = numberIn(node.left, values);
      const right = numberIn(node.right, values);
      return left === null || right === null ? null : OPERATIONS[node.operator](left, right);
    }
  }
}

const FUNCTIONS = { exp: Math.exp, ln: Math.log, log10: Math.log10, sqrt: Math.sqrt } as const;

const OPERATIONS = {
  "+": (left: number, right: number) => left + right,
  "-": (left: number, right: number) => left - right,
  "*": (left: number, right: number) => left * right,
  "/": (left: number, right: number) => left / right,
  "^": (left: number, right: number) => left ** right,
} as const;

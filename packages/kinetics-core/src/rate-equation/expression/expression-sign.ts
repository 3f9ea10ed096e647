import type { ExpressionNode } from "./expression-node";

/**
 * Whether an expression cannot be negative at concentrations and constants that are not: told by its form alone, so that
 * false means 'may be'. Parameters among `signed` may have either sign.
 */
export function isNeverNegative(node: ExpressionNode, signed: ReadonlySet<string>): boolean {
  switch (node.kind) {
    case "number":
      return node.value >= 0;
    case "species":
      return true;
    case "parameter":
      return !signed.has(node.name);
    case "negative":
      return false;
    case "function":
      return node.name === "exp" || node.name === "sqrt";
    default: {
      if (node.operator === "-") return false;
      const isEven = node.operator === "^" && node.right.kind === "number" && node.right.value % 2 === 0;
      const base = isEven || isNeverNegative(node.left, signed);
      return base && (node.operator === "^" || isNeverNegative(node.right, signed));
    }
  }
}

/** Parameters within exponents: those may be negative. */
export function parametersInExponents(node: ExpressionNode, inside = false): ReadonlySet<string> {
  switch (node.kind) {
    case "parameter":
      return new Set(inside ? [node.name] : []);
    case "negative":
    case "function":
      return parametersInExponents(node.of, inside);
    case "operation":
      return new Set([
        ...parametersInExponents(node.left, inside),
        ...parametersInExponents(node.right, inside || node.operator === "^"),
      ]);
    default:
      return new Set();
  }
}

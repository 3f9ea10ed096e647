import type { ExpressionNode, ExpressionOperator } from "./expression-node";

/**
 * An expression as plain text, "k [A]^a/(1 + K [P])", with parentheses where they are needed and nowhere else. Reading
 * the text again gives the same expression.
 */
export function printExpression(node: ExpressionNode): string {
  switch (node.kind) {
    case "number":
      return String(node.value).replace(/^-/, "−");
    case "species":
      return `[${node.name}]`;
    case "parameter":
      return node.name;
    case "function":
      return `${node.name}(${printExpression(node.of)})`;
    case "negative":
      return `−${enclosed(node.of, STRENGTH["*"] + 1)}`;
    default:
      return printOperation(node.operator, node.left, node.right);
  }
}

const STRENGTH: Readonly<Record<ExpressionOperator, number>> = { "+": 1, "-": 1, "*": 2, "/": 2, "^": 4 };
const STRENGTH_OF_A_SIGN = 3;
const STRENGTH_OF_AN_OPERAND = 5;

function printOperation(operator: ExpressionOperator, left: ExpressionNode, right: ExpressionNode): string {
  const strength = STRENGTH[operator];
  switch (operator) {
    case "^":
      return `${enclosed(left, strength + 1)}^${enclosed(right, strength + 1)}`;
    case "*":
      return printProduct(left, right);
    case "/":
      return printDivision(left, right);
    default:
      return `${enclosed(left, strength)} ${operator === "-" ? "−" : "+"} ${enclosed(right, strength + 1)}`;
  }
}

/** Side by side where that is clear: not before a number or a sign, and not after a division. */
function printProduct(left: ExpressionNode, right: ExpressionNode): string {
  const first = enclosed(left, STRENGTH["*"]);
  const second = enclosed(right, STRENGTH["*"] + 1);
  const isDivision = left.kind === "operation" && left.operator === "/";
  return isDivision || /^[\d−]/.test(second) ? `${first} · ${second}` : `${first} ${second}`;
}

/** [A]^2/3 would be refused: a power whose exponent is a number is enclosed before a number. */
function printDivision(left: ExpressionNode, right: ExpressionNode): string {
  const divisor = enclosed(right, STRENGTH["/"] + 1);
  const isUnclear = /^\d/.test(divisor) && endsWithNumberedPower(left);
  const divided = isUnclear ? `(${printExpression(left)})` : enclosed(left, STRENGTH["/"]);
  return `${divided}/${divisor}`;
}

function endsWithNumberedPower(node: ExpressionNode): boolean {
  if (node.kind !== "operation") return false;
  return node.operator === "^"
    ? node.right.kind === "number"
    : node.operator === "*" && endsWithNumberedPower(node.right);
}

function enclosed(node: ExpressionNode, strength: number): string {
  const text = printExpression(node);
  return strengthOf(node) < strength ? `(${text})` : text;
}

function strengthOf(node: ExpressionNode): number {
  switch (node.kind) {
    case "operation":
      return STRENGTH[node.operator];
    case "negative":
      return STRENGTH_OF_A_SIGN;
    case "number":
      // Held values may be negative or in powers of ten, neither of which stands as a base or an exponent.
      return node.value < 0 ? STRENGTH_OF_A_SIGN : STRENGTH_OF_AN_OPERAND;
    default:
      return STRENGTH_OF_AN_OPERAND;
  }
}

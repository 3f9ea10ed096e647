import { type ExpressionFault, faultAt, quoted, type Span } from "./expression-fault";
import { DEEPEST_NESTING, MOST_STEPS } from "./expression-limits";
import {
  EXPRESSION_FUNCTIONS,
  type ExpressionFunction,
  type ExpressionNode,
  type ExpressionOperator,
} from "./expression-node";
import { canonicalName, readTokens, type Token } from "./read-tokens";

/**
 * Reads a rate law by operator precedence (Pratt, Proc. 1st ACM Symp. Principles of Programming Languages (1973)
 * 41-51). From loose to tight: + −; × / and products without a sign, k[A][B]; a leading minus; ^ from right to left.
 * What two chemists would read in two ways is refused: a product without sign after a division, a/b c, and a number
 * divided in an exponent, [A]^1/2.
 */
const STRENGTH: Readonly<Record<ExpressionOperator, number>> = {
  "+": 10,
  "-": 10,
  "*": 20,
  "/": 20,
  "^": 40,
};
const STRENGTH_OF_A_LEADING_SIGN = 30;

/** Names with a meaning elsewhere: read as those of parameters, they would be a product that nobody meant. */
const INSTEAD: ReadonlyMap<string, string> = new Map([
  ["e", "exp( )"],
  ["log", "ln( ) or log10( )"],
  ["pi", "3.14159"],
  ["π", "3.14159"],
  ..."abs acos acosh asin asinh atan atan2 atanh cbrt ceil cos cosh erf exp10 expm1 floor log1p log2 max min mod pow root round sign sin sinh tan tanh"
    .split(" ")
    .map((name) => [name, "exp, ln, log10, sqrt or a power"] as const),
]);

type Read = ExpressionNode | ExpressionFault;

export function parseExpression(text: string, species: readonly string[]): Read {
  const tokens = readTokens(text);
  if ("status" in tokens) return tokens;
  const reader = new ExpressionReader(text, tokens, species);
  return reader.whole();
}

class ExpressionReader {
  private next = 0;
  private depth = 0;
  private steps = 0;
  /** Nodes that stood in parentheses, so that nothing about them is open. */
  private readonly enclosed = new Set<ExpressionNode>();
  private readonly speciesByName: ReadonlyMap<string, string>;

  constructor(
    private readonly text: string,
    private readonly tokens: readonly Token[],
    private readonly species: readonly string[],
  ) {
    this.speciesByName = new Map(species.map((name) => [canonicalName(name), name]));
  }

  whole(): Read {
    const [first, second] = this.tokens;
    if (
      first?.kind === "name" &&
      (first.name === "v" || first.name === "rate") &&
      second?.kind === "equals"
    ) {
      this.next = 2;
    }
    if (this.next >= this.tokens.length) {
      return faultAt("empty", this.end(), "There is no expression. Write one, such as k [A]^a [B]^b.");
    }
    const node = this.expression(0);
    if ("status" in node) return node;
    const left = this.tokens[this.next];
    return left === undefined ? node : this.leftOver(left);
  }

  /** An expression of operators that bind tighter than `strength`. */
  private expression(strength: number): Read {
    this.depth++;
    let left = this.tooDeep() ?? this.operand();
    while (!("status" in left)) {
      const token = this.tokens[this.next];
      const operator = token === undefined ? null : operatorOf(token);
      if (token === undefined || operator === null || STRENGTH[operator] <= strength) break;
      left = this.unclear(operator, token, left) ?? this.operation(operator, token, left);
    }
    this.depth--;
    return left;
  }

  private operation(operator: ExpressionOperator, token: Token, left: ExpressionNode): Read {
    if (token.kind === "superscript") {
      this.next++;
      return this.node(
        { kind: "operation", operator, left, right: numberNode(token, token.value) },
        left,
        token,
      );
    }
    if (token.kind === "operator") this.next++;
    // One less for ^: what stands to its right may be a power again.
    const right = this.expression(operator === "^" ? STRENGTH["^"] - 1 : STRENGTH[operator]);
    if ("status" in right) return right;
    return this.node({ kind: "operation", operator, left, right }, left, right);
  }

  private operand(): Read {
    const token = this.tokens[this.next];
    if (token === undefined) {
      return faultAt(
        "something-missing",
        this.end(),
        "The expression ends too early. Write what comes after it, or take away its last sign.",
      );
    }
    this.next++;
    switch (token.kind) {
      case "number":
        return this.node(numberNode(token, token.value), token, token);
      case "name":
        return this.named(token, token.name);
      case "bracketed":
        return this.bracketed(token, token.name);
      case "open":
        return this.parenthesis(token);
      default:
        return token.kind === "operator" && (token.operator === "-" || token.operator === "+")
          ? this.signed(token, token.operator)
          : this.misplaced(token);
    }
  }

  private signed(token: Token, operator: "-" | "+"): Read {
    const of = this.expression(STRENGTH_OF_A_LEADING_SIGN);
    if ("status" in of || operator === "+") return of;
    return this.node({ kind: "negative", of }, token, of);
  }

  private named(token: Token, name: string): Read {
    const known = EXPRESSION_FUNCTIONS.find((one) => one === name);
    if (known !== undefined) return this.call(token, known);
    const species = name === "k" ? undefined : this.speciesByName.get(name);
    if (species !== undefined) return this.node({ kind: "species", name: species }, token, token);
    const instead = INSTEAD.get(name);
    if (instead === undefined) return this.node({ kind: "parameter", name }, token, token);
    return faultAt(
      "function-unknown",
      token,
      `${quoted(name)} is not read, since it means a function or a number elsewhere. Write ${instead} instead, or choose another name.`,
    );
  }

  private call(token: Token, name: ExpressionFunction): Read {
    const open = this.tokens[this.next];
    if (open?.kind !== "open") {
      return faultAt(
        "function-without-argument",
        token,
        `After ${name} its argument is missing. Write it in parentheses, ${name}( ).`,
      );
    }
    this.next++;
    const of = this.parenthesis(open);
    if ("status" in of) return of;
    const call = this.node({ kind: "function", name, of }, token, this.tokens[this.next - 1] ?? of);
    if (!("status" in call)) this.enclosed.add(call);
    return call;
  }

  private bracketed(token: Token, name: string): Read {
    const species = this.species.find((one) => one === name) ?? this.speciesByName.get(canonicalName(name));
    if (species !== undefined) return this.node({ kind: "species", name: species }, token, token);
    return faultAt("species-unknown", token, `There is no species ${quoted(name)}. ${known(this.species)}`);
  }

  /** After "(" and up to its ")". */
  private parenthesis(open: Token): Read {
    const inner = this.expression(0);
    if ("status" in inner) return inner;
    const close = this.tokens[this.next];
    if (close === undefined) {
      return faultAt("bracket-not-closed", open, "The parenthesis ( is not closed. Write ) where it ends.");
    }
    if (close.kind !== "close") return this.leftOver(close);
    this.next++;
    const grouped = { ...inner, ...between(open, close) };
    this.enclosed.add(grouped);
    return grouped;
  }

  /** What the eye could group in two ways. */
  private unclear(operator: ExpressionOperator, token: Token, left: ExpressionNode): ExpressionFault | null {
    if (token.kind !== "operator" && operator === "*") {
      const what = quoted(this.textOf(token));
      if (token.kind === "number") {
        return faultAt(
          "unclear-product",
          token,
          `The number ${what} follows without a sign. Write × for a product or ^ for a power before it.`,
        );
      }
      if (this.isOpen(left, "/") && !this.enclosed.has(left.right)) {
        return faultAt(
          "unclear-division",
          token,
          `It is not clear whether ${what} belongs to what is divided by. Write × before it, or parentheses around the divisor.`,
        );
      }
    }
    const power = this.lastFactor(left);
    const divisor = this.tokens[this.next + 1];
    if (
      operator === "/" &&
      divisor?.kind === "number" &&
      this.isOpen(power, "^") &&
      this.isBareNumber(power.right)
    ) {
      return faultAt(
        "unclear-division",
        between(power.right, divisor),
        "It is not clear what is divided, the exponent or the power. Write parentheses, [A]^(1/2) or ([A]^2)/3.",
      );
    }
    return null;
  }

  private isOpen(
    node: ExpressionNode,
    operator: ExpressionOperator,
  ): node is Extract<ExpressionNode, { kind: "operation" }> {
    return node.kind === "operation" && node.operator === operator && !this.enclosed.has(node);
  }

  private isBareNumber(node: ExpressionNode): boolean {
    return node.kind === "number" && !this.enclosed.has(node);
  }

  private lastFactor(node: ExpressionNode): ExpressionNode {
    return this.isOpen(node, "*") ? this.lastFactor(node.right) : node;
  }

  private node(made: Unplaced, from: Span, to: Span): Read {
    this.steps++;
    const node = { ...made, ...between(from, to) };
    if (this.steps <= MOST_STEPS) return node;
    return faultAt(
      "too-many-steps",
      to,
      `The expression has more than ${MOST_STEPS} numbers, names and operations. Shorten it.`,
    );
  }

  private tooDeep(): ExpressionFault | null {
    if (this.depth <= DEEPEST_NESTING) return null;
    return faultAt(
      "too-deep",
      this.tokens[this.next] ?? this.end(),
      `Parentheses, signs and exponents are nested more than ${DEEPEST_NESTING} deep. Take away those that are not needed.`,
    );
  }

  private leftOver(token: Token): ExpressionFault {
    if (token.kind === "close") {
      return faultAt(
        "bracket-not-opened",
        token,
        "The parenthesis ) closes none. Take it away, or write ( where it begins.",
      );
    }
    return this.misplaced(token);
  }

  private misplaced(token: Token): ExpressionFault {
    if (token.kind === "equals") {
      return faultAt(
        "equals-sign",
        token,
        "An equals sign stands only after v at the beginning. Write the right-hand side of the rate law alone.",
      );
    }
    const before = this.tokens[this.tokens.indexOf(token) - 1];
    const where = before === undefined ? "at the beginning" : `after ${quoted(this.textOf(before))}`;
    return faultAt(
      "something-missing",
      token,
      `A number, a name or a species is missing ${where}. Write it before ${quoted(this.textOf(token))}, or take one of the signs away.`,
    );
  }

  private textOf({ position, length }: Span): string {
    return this.text.slice(position, position + length);
  }

  private end(): Span {
    return { position: this.text.trimEnd().length, length: 1 };
  }
}

type Unplaced = ExpressionNode extends infer Node
  ? Node extends ExpressionNode
    ? Omit<Node, keyof Span>
    : never
  : never;

function operatorOf(token: Token): ExpressionOperator | null {
  switch (token.kind) {
    case "operator":
      return token.operator;
    case "superscript":
      return "^";
    case "number":
    case "name":
    case "bracketed":
    case "open":
      return "*";
    default:
      return null;
  }
}

function numberNode({ position, length }: Span, value: number): ExpressionNode {
  return { kind: "number", value, position, length };
}

function between(from: Span, to: Span): Span {
  return { position: from.position, length: to.position + to.length - from.position };
}

const MOST_NAMES_IN_A_MESSAGE = 12;

function known(species: readonly string[]): string {
  if (species.length === 0) return "The reaction has none yet: add it to the reaction first.";
  const shown = species.slice(0, MOST_NAMES_IN_A_MESSAGE).map((name) => `[${name}]`);
  return `The reaction has ${shown.join(", ")}${species.length > shown.length ? " and others" : ""}: write one of them, or add it to the reaction first.`;
}

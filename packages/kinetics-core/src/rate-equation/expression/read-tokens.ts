import { type ExpressionFault, faultAt, quoted, type Span } from "./expression-fault";
import { LONGEST_EXPRESSION, LONGEST_NAME } from "./expression-limits";
import type { ExpressionOperator } from "./expression-node";

/** The smallest parts of an expression. Positions are those of the text as given. */
export type Token = Span &
  (
    | { readonly kind: "number"; readonly value: number }
    /** A bare name: species, parameter or function. */
    | { readonly kind: "name"; readonly name: string }
    /** What stands between [ and ]. */
    | { readonly kind: "bracketed"; readonly name: string }
    | { readonly kind: "operator"; readonly operator: ExpressionOperator }
    /** A raised number, ², which is an exponent without a sign for it. */
    | { readonly kind: "superscript"; readonly value: number }
    | { readonly kind: "open" | "close" | "equals" }
  );

/** What chemists type for an operation, beside the plain signs. */
const OPERATORS: ReadonlyMap<string, ExpressionOperator> = new Map([
  ["+", "+"],
  ...[..."-−–‐‑﹣－"].map((sign) => [sign, "-"] as const),
  ...[..."*×·⋅∙∗•"].map((sign) => [sign, "*"] as const),
  ...[..."/÷∕⁄"].map((sign) => [sign, "/"] as const),
  ["^", "^"],
]);

const FRACTIONS: ReadonlyMap<string, number> = new Map([
  ["½", 1 / 2],
  ["⅓", 1 / 3],
  ["⅔", 2 / 3],
  ["¼", 1 / 4],
  ["¾", 3 / 4],
]);

const SUPERSCRIPTS = "⁰¹²³⁴⁵⁶⁷⁸⁹";

const NUMBER = /(?:\d+(?:\.\d*)?|\.\d+)(?:[eE][+\-−]?\d+)?/y;
const NAME = /\p{L}[\p{L}\p{M}\p{Nd}₀-₉_′']*/uy;
const SUPERSCRIPT = /[⁺⁻]?[⁰¹²³⁴⁵⁶⁷⁸⁹]+/y;
const SPACE = /\s+/y;

export function readTokens(text: string): readonly Token[] | ExpressionFault {
  if (text.length > LONGEST_EXPRESSION) {
    return faultAt(
      "too-long",
      { position: LONGEST_EXPRESSION, length: text.length - LONGEST_EXPRESSION },
      `The expression has ${text.length} characters; up to ${LONGEST_EXPRESSION} are read. Shorten it.`,
    );
  }
  const tokens: Token[] = [];
  let position = 0;
  while (position < text.length) {
    position += matched(SPACE, text, position).length;
    if (position >= text.length) break;
    const token = tokenAt(text, position);
    if ("status" in token) return token;
    tokens.push(token);
    position += token.length;
  }
  return tokens;
}

function tokenAt(text: string, position: number): Token | ExpressionFault {
  const letter = String.fromCodePoint(text.codePointAt(position) ?? 0);
  const span = { position, length: letter.length };
  const number = matched(NUMBER, text, position);
  if (number !== "") return numberToken(number, text, position);
  const fraction = FRACTIONS.get(letter);
  if (fraction !== undefined) return { kind: "number", value: fraction, ...span };
  const superscript = matched(SUPERSCRIPT, text, position);
  if (superscript !== "") return superscriptToken(superscript, position);
  const name = matched(NAME, text, position);
  if (name !== "") return nameToken(name, position);
  if (letter === "[") return bracketToken(text, position);
  if (letter === "*" && text[position + 1] === "*") {
    return { kind: "operator", operator: "^", position, length: 2 };
  }
  const operator = OPERATORS.get(letter);
  if (operator !== undefined) return { kind: "operator", operator, ...span };
  if (letter === "(") return { kind: "open", ...span };
  if (letter === ")") return { kind: "close", ...span };
  if (letter === "=") return { kind: "equals", ...span };
  return strayCharacter(letter, span);
}

function numberToken(digits: string, text: string, position: number): Token | ExpressionFault {
  const span = { position, length: digits.length };
  const end = position + digits.length;
  if (/^,\d/.test(text.slice(end, end + 2))) {
    return faultAt(
      "decimal-comma",
      { position: end, length: 1 },
      `A comma stands in a number after ${quoted(digits)}. Write decimals with a point, 0.5.`,
    );
  }
  const value = Number(digits.replace("−", "-"));
  const isNothing = value === 0 && /[1-9]/.test(digits.replace(/[eE].*/, ""));
  if (!Number.isFinite(value) || isNothing) {
    return faultAt(
      "number-out-of-range",
      span,
      `${quoted(digits)} is too ${isNothing ? "small" : "large"} to compute with. Numbers from 1e-300 to 1e300 are read.`,
    );
  }
  return { kind: "number", value, ...span };
}

function superscriptToken(raised: string, position: number): Token {
  const digits = [...raised].map((letter) => {
    const digit = SUPERSCRIPTS.indexOf(letter);
    return digit >= 0 ? String(digit) : letter === "⁻" ? "-" : "+";
  });
  return { kind: "superscript", value: Number(digits.join("")), position, length: raised.length };
}

function nameToken(name: string, position: number): Token | ExpressionFault {
  const span = { position, length: name.length };
  if (name.length > LONGEST_NAME) {
    return faultAt(
      "name-too-long",
      span,
      `The name ${quoted(name)} has ${name.length} characters; up to ${LONGEST_NAME} are read. Choose a shorter one, such as k_1.`,
    );
  }
  return { kind: "name", name: canonicalName(name), ...span };
}

/** k₁ and k1, the two signs for micro: what looks alike is one name. */
export function canonicalName(name: string): string {
  return name.normalize("NFKC").trim();
}

/** Species may have brackets of their own, [[Fe(CN)6]3−]. */
function bracketToken(text: string, position: number): Token | ExpressionFault {
  let depth = 0;
  for (let i = position; i < text.length; i++) {
    if (text[i] === "[") depth++;
    else if (text[i] === "]") depth--;
    if (depth === 0) {
      const name = text.slice(position + 1, i).trim();
      const span = { position, length: i + 1 - position };
      return name === ""
        ? faultAt(
            "something-missing",
            span,
            "No species stands between the brackets. Write its name there, [A].",
          )
        : { kind: "bracketed", name, ...span };
    }
  }
  return faultAt(
    "bracket-not-closed",
    { position, length: 1 },
    "The bracket [ is not closed. Write ] after the name of the species.",
  );
}

function strayCharacter(letter: string, span: Span): ExpressionFault {
  if (letter === "]") {
    return faultAt(
      "bracket-not-opened",
      span,
      "The bracket ] closes none. Write [ before the name of the species.",
    );
  }
  const code = (letter.codePointAt(0) ?? 0).toString(16).toUpperCase().padStart(4, "0");
  const what = /[\p{C}\p{M}\p{Z}]/u.test(letter) ? `the character U+${code}` : `${quoted(letter)}`;
  return faultAt(
    "unknown-character",
    span,
    `An expression cannot hold ${what}. It is made of numbers, names, [species], + − * / ^, parentheses, exp, ln, log10 and sqrt.`,
  );
}

/** What the sticky pattern finds at the position; empty where it finds nothing. */
function matched(pattern: RegExp, text: string, position: number): string {
  pattern.lastIndex = position;
  return pattern.exec(text)?.[0] ?? "";
}

import { type Formula, parseFormula } from "./formula";

/**
 * A reaction as typed on one line: "CH3CO2C6H4NO2 [A] + 2 OH- [B] -> CH3CO2- + NO2C6H4O- [P] + H2O".
 * Terms are joined by a plus; the symbol a species has in the law follows it in brackets. A species without a
 * formula is named: dye [D], "methyl orange" [M]. A sign that touches a formula is its charge, so ions are joined
 * by a plus with spaces: H+ + OH-.
 */
export interface Reaction {
  readonly left: readonly ReactionTerm[];
  readonly right: readonly ReactionTerm[];
  readonly arrow: "forward" | "equilibrium";
}

export interface ReactionTerm {
  /** Unsigned, as typed. */
  readonly coefficient: number;
  readonly species: TermSpecies;
  /** Text in the brackets; empty where none was typed. */
  readonly symbol: string;
  readonly position: number;
  readonly length: number;
}

export type TermSpecies =
  | { readonly kind: "formula"; readonly text: string; readonly formula: Formula }
  /** Without a composition: the balance of atoms cannot be checked. */
  | { readonly kind: "name"; readonly text: string };

export type ReactionReading =
  | { readonly status: "read"; readonly reaction: Reaction }
  | { readonly status: "empty" }
  /** Characters counted from 0 in the typed text. */
  | {
      readonly status: "unreadable";
      readonly position: number;
      readonly length: number;
      readonly message: string;
    };

export const LONGEST_REACTION = 400;
const MOST_TERMS = 24;
const LONGEST_SYMBOL = 12;
const LARGEST_COEFFICIENT = 99;

/** Reads a reaction in time linear in its length; never throws. */
export function parseReaction(typed: string): ReactionReading {
  if (typed.trim() === "") return { status: "empty" };
  if (typed.length > LONGEST_REACTION) {
    return failure(LONGEST_REACTION, 1, `A reaction is read up to ${LONGEST_REACTION} characters.`);
  }
  const arrows = findArrows(typed);
  const [arrow, second] = arrows;
  if (!arrow) return failure(typed.length, 0, "An arrow is missing: write -> between the two sides.");
  if (second) return failure(second.position, second.length, "A reaction has one arrow; this is the second.");
  const left = readSide(typed, 0, arrow.position, "before");
  if ("status" in left) return left;
  const right = readSide(typed, arrow.position + arrow.length, typed.length, "after");
  if ("status" in right) return right;
  const all = [...left, ...right];
  const over = all[MOST_TERMS];
  if (over) return failure(over.position, over.length, `A reaction is read up to ${MOST_TERMS} species.`);
  const clash = clashingSymbol(all);
  if (clash) {
    return failure(clash.position, clash.length, `Two different species cannot both be [${clash.symbol}].`);
  }
  return {
    status: "read",
    reaction: { left: placeholders(left, all), right: placeholders(right, all), arrow: arrow.kind },
  };
}

type Failure = Extract<ReactionReading, { status: "unreadable" }>;

function failure(position: number, length: number, message: string): Failure {
  return { status: "unreadable", position, length, message };
}

interface Arrow {
  readonly position: number;
  readonly length: number;
  readonly kind: "forward" | "equilibrium";
}

/** Outside quotes. A minus before "->" is a charge where it touches a formula: OH-->X is OH⁻ → X. */
function findArrows(typed: string): Arrow[] {
  const arrows: Arrow[] = [];
  const pattern = /"[^"]*"|<=>|<->|⇌|⇄|⟷|↔|(?:(?<=\s|^)-{1,3})?->|=>|→|⟶|(?<=\s)={1,2}(?=\s)/g;
  for (const match of typed.matchAll(pattern)) {
    if (match[0].startsWith('"')) continue;
    const both = /^[<⇌⇄⟷↔]/.test(match[0]);
    arrows.push({ position: match.index, length: match[0].length, kind: both ? "equilibrium" : "forward" });
  }
  return arrows;
}

function readSide(
  typed: string,
  from: number,
  to: number,
  where: "before" | "after",
): ReactionTerm[] | Failure {
  if (typed.slice(from, to).trim() === "") {
    return failure(from, Math.max(to - from, 1), `No species stands ${where} the arrow.`);
  }
  const terms: ReactionTerm[] = [];
  for (const [start, end] of splitTerms(typed, from, to)) {
    const term = readTerm(typed, start, end);
    if ("status" in term) return term;
    terms.push(term);
  }
  return terms;
}

/**
 * A plus joins two species unless it is a charge. It is a charge where it touches what stands before it and is
 * followed by a space, an end, a bracket or another plus: "H+ + I-", "Na+ [M]", "Fe3++Cl-"; "H2+I2" joins.
 */
function splitTerms(typed: string, from: number, to: number): [number, number][] {
  const ranges: [number, number][] = [];
  let start = from;
  let quoted = false;
  let depth = 0;
  for (let at = from; at < to; at += 1) {
    const character = typed.charAt(at);
    if (character === '"') quoted = !quoted;
    if (quoted) continue;
    if (character === "[" || character === "(") depth += 1;
    if (character === "]" || character === ")") depth = Math.max(0, depth - 1);
    if (character !== "+" || depth > 0 || isCharge(typed, start, at, to)) continue;
    ranges.push([start, at]);
    start = at + 1;
  }
  ranges.push([start, to]);
  return ranges;
}

function isCharge(typed: string, start: number, at: number, to: number): boolean {
  const before = at > start ? typed.charAt(at - 1) : " ";
  const after = at + 1 < to ? typed.charAt(at + 1) : " ";
  if (before === "^" || after === "^") return true;
  // "Ce 4+ + …": a number set apart from its formula, with the sign at its end.
  if (/\d/.test(before) && /\S\s+\d+$/.test(typed.slice(start, at)) && /\s/.test(after)) return true;
  if (/\s/.test(before) || typed.slice(start, at).trim() === "") return false;
  if (/[\s[+)\]]/.test(after) || /^\((?:aq|s|l|g|ads)\)/.test(typed.slice(at + 1, at + 6))) return true;
  return /\^$|\^\(?$/.test(typed.slice(start, at));
}

function readTerm(typed: string, start: number, end: number): ReactionTerm | Failure {
  const whole = typed.slice(start, end);
  const lead = whole.length - whole.trimStart().length;
  const position = start + lead;
  const text = whole.trim();
  if (text === "") {
    return failure(start, Math.max(end - start, 1), "A species is missing beside this plus.");
  }
  const coefficient = readCoefficient(text);
  if ("message" in coefficient) return failure(position, coefficient.length, coefficient.message);
  const afterCoefficient = text.slice(coefficient.length);
  const symbolMatch = /(?<=\S)\s*\[([^[\]]*)\]\s*$/.exec(afterCoefficient);
  const isComplex =
    symbolMatch !== null &&
    !/\s$|\s\[/.test(afterCoefficient.slice(symbolMatch.index, symbolMatch.index + 2));
  const symbol = symbolMatch && !isComplex ? symbolMatch : null;
  const body = symbol ? afterCoefficient.slice(0, symbol.index) : afterCoefficient;
  const bodyPosition = position + coefficient.length;
  const species = readSpecies(body, bodyPosition);
  if ("status" in species) return species;
  const symbolText = (symbol?.[1] ?? "").trim();
  if (symbol && (symbolText === "" || symbolText.length > LONGEST_SYMBOL)) {
    const at = bodyPosition + symbol.index;
    return failure(at, symbol[0].length, `A symbol has 1 to ${LONGEST_SYMBOL} characters, as in [A].`);
  }
  return { coefficient: coefficient.value, species, symbol: symbolText, position, length: text.length };
}

/** "2 ", "2", "1/2 ", "0.5 ", "0,5 "; a number before quotes or letters. 1 where none is written. */
function readCoefficient(
  text: string,
): { value: number; length: number } | { message: string; length: number } {
  const match = /^(\d{1,6})(?:\s*\/\s*(\d{1,6})|[.,](\d{1,6}))?\s*(?=[\p{L}"[(•˙])/u.exec(text);
  if (!match) {
    return /^\d/.test(text)
      ? {
          message: "After the number a species is missing; a name that starts with a digit stands in quotes.",
          length: text.length,
        }
      : { value: 1, length: 0 };
  }
  const value =
    match[2] !== undefined ? Number(match[1]) / Number(match[2]) : Number(`${match[1]}.${match[3] ?? "0"}`);
  if (!Number.isFinite(value) || value <= 0 || value > LARGEST_COEFFICIENT) {
    return {
      message: `A stoichiometric number is above 0 and at most ${LARGEST_COEFFICIENT}.`,
      length: match[0].trimEnd().length,
    };
  }
  return { value, length: match[0].length };
}

const SINGLE_LETTER = /^[A-Z]$/;

function readSpecies(body: string, position: number): TermSpecies | Failure {
  const text = body.trim();
  const lead = body.length - body.trimStart().length;
  if (text.startsWith('"')) {
    const close = text.indexOf('"', 1);
    const name = text.slice(1, close).trim();
    if (close < 0) return failure(position + lead, 1, "The quotes that open here are not closed.");
    if (close !== text.length - 1 || name === "") {
      return failure(
        position + lead,
        text.length,
        "Quotes hold one name and nothing follows them but [its symbol].",
      );
    }
    return { kind: "name", text: name };
  }
  const reading = parseFormula(text);
  if (reading.status === "read")
    return { kind: "formula", text: reading.formula.text, formula: reading.formula };
  if (looksLikeName(text)) return { kind: "name", text: text.replace(/\s+/g, " ") };
  return failure(
    position + lead + reading.position,
    reading.length,
    `${reading.message} A name instead of a formula stands in quotes.`,
  );
}

/** A word starts small, or holds four small letters in a row, or is one capital that is no element. */
function looksLikeName(text: string): boolean {
  if (/[[\](){}"^]/.test(text) && !/^[^[\]{}"^]*$/.test(text)) return false;
  return /^\p{Ll}/u.test(text) || /\p{Ll}{4}/u.test(text) || SINGLE_LETTER.test(text);
}

/** "A + 2 B -> P" has no boron or phosphorus in it: with single capitals throughout they are names. */
function placeholders(terms: readonly ReactionTerm[], all: readonly ReactionTerm[]): ReactionTerm[] {
  const onlyCapitals = all.every((term) => SINGLE_LETTER.test(term.species.text));
  if (!onlyCapitals) return [...terms];
  return terms.map((term) => ({ ...term, species: { kind: "name", text: term.species.text } }));
}

function clashingSymbol(terms: readonly ReactionTerm[]): ReactionTerm | undefined {
  const owners = new Map<string, string>();
  return terms.find((term) => {
    if (term.symbol === "") return false;
    const owner = owners.get(term.symbol);
    if (owner !== undefined && owner !== term.species.text) return true;
    owners.set(term.symbol, term.species.text);
    return false;
  });
}

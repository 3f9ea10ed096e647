import { isElement } from "./elements";

/**
 * A formula as a chemist types it: "CH3CO2-", "S2O8^2-", "[Fe(CN)6]3-", "CuSO4·5H2O", "SO4 2-". Digits before a
 * sign are read the usual way: part of the charge where nothing else makes sense, otherwise a subscript. What was
 * understood is typeset beside the box, so a reading that was not meant is seen at once; "^" settles it.
 */
export interface Formula {
  /** As typed, without state and spaces, in plain characters: "SO4^2-". Reads again as the same formula. */
  readonly text: string;
  /** Atoms of each element in one formula unit. */
  readonly atoms: ReadonlyMap<string, number>;
  readonly charge: number;
}

export type FormulaReading =
  | { readonly status: "read"; readonly formula: Formula }
  /** `position` and `length` point into the text that was given. */
  | {
      readonly status: "unreadable";
      readonly position: number;
      readonly length: number;
      readonly message: string;
    };

/** Deeper nesting and larger counts do not occur in chemistry; refusing them keeps hostile text cheap. */
const DEEPEST_NESTING = 6;
const LARGEST_COUNT = 9999;
const LARGEST_CHARGE = 9;

const CLOSING: Readonly<Record<string, string>> = { "(": ")", "[": "]", "{": "}" };
const STATE = /\((?:aq|s|l|g|ads)\)$/;
const HYDRATE_DOT = /[·⋅∙*.]/;
const RADICAL = /^[•˙]|[•˙](?=[+-]?$)/;

/** Reads one formula. Never throws; text that is no formula comes back with the place and the reason. */
export function parseFormula(typed: string): FormulaReading {
  const plain = plainCharacters(typed);
  const trimmed = plain.replace(/\s+$/, "").replace(STATE, "");
  const body = trimmed.replace(/\s+$/, "");
  if (body.trim() === "") return unreadable(0, 1, "A formula is missing here.");
  if (body === "e-" || body === "e^-") {
    return { status: "read", formula: { text: "e-", atoms: new Map(), charge: -1 } };
  }
  const split = splitCharge(body);
  if ("message" in split) return unreadable(split.position, split.length, split.message);
  const reader = new Reader(split.body);
  const atoms = reader.whole();
  if (reader.failure) return { status: "unreadable", ...reader.failure };
  const core = split.body.replace(/\s+/g, "");
  return {
    status: "read",
    formula: { text: core + chargeText(core, split.charge), atoms, charge: split.charge },
  };
}

function unreadable(position: number, length: number, message: string): FormulaReading {
  return { status: "unreadable", position, length, message };
}

const SUBSCRIPTS = "₀₁₂₃₄₅₆₇₈₉";
const SUPERSCRIPTS = "⁰¹²³⁴⁵⁶⁷⁸⁹";

/** One character for one, so that positions stay those of the typed text. */
function plainCharacters(typed: string): string {
  let plain = "";
  let raised = false;
  for (const character of typed) {
    const lowered = SUBSCRIPTS.indexOf(character);
    const lifted = SUPERSCRIPTS.indexOf(character);
    if (lowered >= 0) plain += String(lowered);
    else if (lifted >= 0) plain += raised ? String(lifted) : RAISED_DIGITS.charAt(lifted);
    else if (character === "⁺") plain += "+";
    else if (character === "⁻" || character === "−" || character === "–") plain += "-";
    else plain += character;
    raised = lifted >= 0;
  }
  return plain;
}

/** A superscript digit can only be charge: kept apart from typed digits by a private range until the charge is split. */
const RAISED_DIGITS = "\uE000\uE001\uE002\uE003\uE004\uE005\uE006\uE007\uE008\uE009";

type ChargeSplit =
  | { readonly body: string; readonly charge: number }
  | { readonly position: number; readonly length: number; readonly message: string };

function splitCharge(text: string): ChargeSplit {
  const raised = /([\uE000-\uE009])?([+-])$/u.exec(text);
  if (raised?.[1] !== undefined) {
    const size = RAISED_DIGITS.indexOf(raised[1]);
    return charged(text.slice(0, raised.index), size, raised[2] ?? "+", raised.index);
  }
  const lost = /[\uE000-\uE009]/u.exec(text);
  if (lost) {
    return {
      position: lost.index,
      length: 1,
      message: "A superscript is read as a charge and needs its sign.",
    };
  }
  const caret = /\^\s*\(?(?:(\d+)\s*([+-])|([+-])\s*(\d*))\)?$/.exec(text);
  if (caret) {
    const digits = caret[1] ?? caret[4] ?? "";
    return charged(
      text.slice(0, caret.index),
      digits === "" ? 1 : Number(digits),
      caret[2] ?? caret[3] ?? "+",
      caret.index,
    );
  }
  const repeated = /([+-])\1+$/.exec(text);
  if (repeated)
    return charged(text.slice(0, repeated.index), repeated[0].length, repeated[1] ?? "+", repeated.index);
  const spaced = /\s+(\d*)([+-])$/.exec(text);
  if (spaced) {
    const digits = spaced[1] ?? "";
    return charged(
      text.slice(0, spaced.index),
      digits === "" ? 1 : Number(digits),
      spaced[2] ?? "+",
      spaced.index,
    );
  }
  const attached = /(\d*)([+-])$/.exec(text);
  if (!attached) return { body: text, charge: 0 };
  const before = text.slice(0, attached.index);
  const digits = attached[1] ?? "";
  const ofCharge = chargeDigits(before, digits, attached[2] ?? "+");
  const subscript = digits.slice(0, digits.length - ofCharge);
  return charged(
    before + subscript,
    ofCharge === 0 ? 1 : Number(digits.slice(digits.length - ofCharge)),
    attached[2] ?? "+",
    attached.index,
  );
}

function charged(body: string, size: number, sign: string, position: number): ChargeSplit {
  if (size < 1 || size > LARGEST_CHARGE) {
    return {
      position,
      length: 1,
      message: `A charge of ${size} is not read; from 1 to ${LARGEST_CHARGE} it is.`,
    };
  }
  return { body, charge: sign === "-" ? -size : size };
}

/**
 * How many of the digits before a sign belong to the charge.
 * After a closed bracket all do: [Fe(CN)6]3-. A lone cation carries it: Fe3+, and so does a lone chalcogenide: S2-;
 * other lone anions are polyatomic: I3-, N3-. Of two digits the last is charge, SO42-, unless that would leave a
 * subscript of 1 or the atom is carbon or hydrogen, whose counts run to two digits: C6H12+.
 */
function chargeDigits(before: string, digits: string, sign: string): number {
  if (digits === "") return 0;
  if (before.endsWith("]")) return digits.length;
  const last = /[A-Z][a-z]?$/.exec(before)?.[0] ?? "";
  if (/^[CHDT]$/.test(last)) return 0;
  if (digits.length === 1) {
    const lone = last === before;
    return lone && (sign === "+" || /^(?:S|Se|Te)$/.test(last)) ? 1 : 0;
  }
  return digits.length === 2 && digits.startsWith("1") ? 0 : 1;
}

/** The sign always follows a caret where a digit stands before it, so that the text reads back the same way. */
function chargeText(core: string, charge: number): string {
  if (charge === 0) return "";
  const sign = charge < 0 ? "-" : "+";
  const size = Math.abs(charge);
  if (size > 1) return `^${size}${sign}`;
  return /\d$/.test(core) && chargeDigits(core.replace(/\d+$/, ""), /\d+$/.exec(core)?.[0] ?? "", sign) > 0
    ? `^${sign}`
    : sign;
}

class Reader {
  failure: { position: number; length: number; message: string } | null = null;
  private at = 0;

  constructor(private readonly text: string) {}

  /** Parts joined by a hydrate dot, each with its own leading number: CuSO4·5H2O. */
  whole(): Map<string, number> {
    const atoms = new Map<string, number>();
    const leadingRadical = RADICAL.exec(this.text);
    if (leadingRadical?.index === 0) this.at = 1;
    for (;;) {
      const times = this.at === 0 ? 1 : this.count();
      this.add(atoms, this.group(0), times);
      if (this.failure || this.at >= this.text.length) return atoms;
      if (!HYDRATE_DOT.test(this.text.charAt(this.at))) {
        this.fail(this.at, 1, unexpected(this.text.charAt(this.at)));
        return atoms;
      }
      this.at += 1;
    }
  }

  private group(depth: number): Map<string, number> {
    const atoms = new Map<string, number>();
    const start = this.at;
    while (this.at < this.text.length && !this.failure) {
      const character = this.text.charAt(this.at);
      const closing = CLOSING[character];
      if (closing !== undefined) {
        if (depth >= DEEPEST_NESTING) {
          this.fail(this.at, 1, `Brackets are nested more than ${DEEPEST_NESTING} deep here.`);
          return atoms;
        }
        const opened = this.at;
        this.at += 1;
        const inner = this.group(depth + 1);
        if (this.failure) return atoms;
        if (this.text.charAt(this.at) !== closing) {
          this.fail(opened, 1, `The bracket ${character} is not closed by ${closing}.`);
          return atoms;
        }
        this.at += 1;
        this.add(atoms, inner, this.count());
      } else if (/[A-Z]/.test(character)) {
        this.element(atoms);
      } else if (character === "•" || character === "˙") {
        this.at += 1;
      } else {
        break;
      }
    }
    if (this.at === start && !this.failure) {
      const found = this.text.charAt(this.at);
      this.fail(this.at, 1, found === "" ? "A formula is missing here." : unexpected(found));
    }
    return atoms;
  }

  private element(atoms: Map<string, number>): void {
    const two = this.text.slice(this.at, this.at + 2);
    const symbol = /^[A-Z][a-z]$/.test(two) ? two : two.charAt(0);
    if (!isElement(symbol)) {
      this.fail(this.at, symbol.length, `${symbol} is not the symbol of an element.`);
      return;
    }
    this.at += symbol.length;
    const single = new Map([[symbol, 1]]);
    this.add(atoms, single, this.count());
  }

  /** A subscript, or a hydrate's number; 1 where none is written. */
  private count(): number {
    const digits = /^\d+/.exec(this.text.slice(this.at, this.at + 8))?.[0] ?? "";
    if (digits === "") return 1;
    const count = Number(digits);
    if (count < 1 || count > LARGEST_COUNT) {
      this.fail(this.at, digits.length, `A count from 1 to ${LARGEST_COUNT} is read here, not ${digits}.`);
    }
    this.at += digits.length;
    return count;
  }

  private add(into: Map<string, number>, from: ReadonlyMap<string, number>, times: number): void {
    for (const [symbol, count] of from) into.set(symbol, (into.get(symbol) ?? 0) + count * times);
  }

  private fail(position: number, length: number, message: string): void {
    this.failure ??= { position, length, message };
  }
}

function unexpected(character: string): string {
  return character.trim() === ""
    ? "A formula has no space inside; between two species stands a plus with a space on both sides."
    : `${character} is not part of a formula here.`;
}

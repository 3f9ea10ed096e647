/**
 * Lines of `(X++(Y..Y))` into numbers: an abscissa, then ordinates written out (AFFN), packed behind their signs (PAC),
 * with their sign and first digit squeezed into a letter (SQZ), as differences from the one before (DIF), and with
 * repeats counted (DUP). A line that follows differences begins with the last ordinate again, as a check on it.
 */
export interface OrdinateLine {
  /** As it stands in the line; to be multiplied by XFACTOR. */
  readonly abscissa: number;
  /** To be multiplied by YFACTOR; NaN where the file says `?`: no reading. */
  readonly ordinates: readonly number[];
  readonly line: number;
  /** The line began with the last ordinate again, to which its abscissa then belongs. */
  readonly checked: boolean;
}

export type Ordinates =
  | { readonly status: "read"; readonly lines: readonly OrdinateLine[] }
  | { readonly status: "fault"; readonly line: number; readonly message: string };

/** `first`: the file's line of the first of `lines`. At most `most` ordinates are read, whatever repeats are claimed. */
export function readOrdinates(lines: readonly string[], first: number, most: number): Ordinates {
  const read: OrdinateLine[] = [];
  let check: number | null = null;
  let count = 0;
  for (const [index, text] of lines.entries()) {
    if (text.trim() === "") continue;
    const line = first + index;
    const tokens = tokensOf(text);
    if (tokens === null) return fault(line, `“${text.trim().slice(0, 40)}” is no line of numbers`);
    const [head, ...rest] = tokens;
    if (head === undefined || head.kind !== "value")
      return fault(line, "the line does not begin with an abscissa");
    const decoded = decode(rest, most - count);
    if (typeof decoded === "string") return fault(line, decoded);
    const { ordinates, differences } = decoded;
    const checked = check !== null;
    if (checked) {
      const again = ordinates.shift();
      if (again !== check) {
        return fault(
          line,
          `the line begins with ${again ?? "nothing"} where the last ordinate before it was ${check}`,
        );
      }
    }
    check = differences ? (ordinates.at(-1) ?? check) : null;
    count += ordinates.length;
    if (count > most) return fault(line, `more than ${most} ordinates`);
    read.push({ abscissa: head.value, ordinates, line, checked });
  }
  return { status: "read", lines: read };
}

interface Token {
  readonly kind: "value" | "difference" | "repeat" | "none";
  readonly value: number;
}

const SQUEEZED = "@ABCDEFGHI";
const SQUEEZED_MINUS = "abcdefghi";
const DIFFERENCE = "%JKLMNOPQR";
const DIFFERENCE_MINUS = "jklmnopqr";
const REPEAT = "STUVWXYZs";

/** E and a sign make an exponent; E and a digit alone are the squeezed 5. */
const TOKEN = /([+-]?(?:\d+\.?\d*|\.\d+)(?:[Ee][+-]\d{1,3})?)|([@A-Ia-i%J-Rj-rS-Zs])(\d*)|(\?)|[\s,;]+/y;

/** null where the line holds anything else. */
function tokensOf(text: string): Token[] | null {
  const tokens: Token[] = [];
  TOKEN.lastIndex = 0;
  while (TOKEN.lastIndex < text.length) {
    const found = TOKEN.exec(text);
    if (found === null) return null;
    const [, plain, letter, digits = "", none] = found;
    if (plain !== undefined) tokens.push({ kind: "value", value: Number(plain) });
    else if (none !== undefined) tokens.push({ kind: "none", value: Number.NaN });
    else if (letter !== undefined) tokens.push(packed(letter, digits));
  }
  return tokens;
}

function packed(letter: string, digits: string): Token {
  const of = (alphabet: string, offset: number) => {
    const at = alphabet.indexOf(letter);
    return at < 0 ? null : Number(`${at + offset}${digits}`);
  };
  const value = of(SQUEEZED, 0);
  if (value !== null) return { kind: "value", value };
  const minus = of(SQUEEZED_MINUS, 1);
  if (minus !== null) return { kind: "value", value: -minus };
  const up = of(DIFFERENCE, 0);
  if (up !== null) return { kind: "difference", value: up };
  const down = of(DIFFERENCE_MINUS, 1);
  if (down !== null) return { kind: "difference", value: -down };
  return { kind: "repeat", value: of(REPEAT, 1) ?? Number.NaN };
}

/** A sentence where the tokens make no ordinates. */
function decode(
  tokens: readonly Token[],
  most: number,
): { readonly ordinates: number[]; readonly differences: boolean } | string {
  const ordinates: number[] = [];
  let last: Token | null = null;
  for (const token of tokens) {
    if (token.kind === "repeat") {
      if (last === null) return "a repeat stands before any ordinate";
      // "T" says: twice in all.
      if (ordinates.length + token.value - 1 > most + 1) return `more than ${most} ordinates`;
      for (let i = 1; i < token.value; i++) ordinates.push(next(ordinates, last));
      continue;
    }
    if (token.kind === "difference" && ordinates.length === 0)
      return "a difference stands before any ordinate";
    ordinates.push(next(ordinates, token));
    last = token;
  }
  return { ordinates, differences: last?.kind === "difference" };
}

function next(ordinates: readonly number[], token: Token): number {
  return token.kind === "difference" ? (ordinates.at(-1) ?? Number.NaN) + token.value : token.value;
}

function fault(line: number, message: string): Ordinates {
  return { status: "fault", line, message };
}

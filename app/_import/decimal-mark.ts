import { type DecimalMark, isGrouped, looksNumeric } from "./number";
import type { Guess } from "./reading";
import type { Row, Separator } from "./rows";

/**
 * Decimal point or decimal comma, from the numbers themselves. "0,021" shows a comma; "1,234" could be either one and
 * a bit or a thousand and more, and is asked about, never guessed.
 */

export interface DecimalMarkGuess {
  /** `value` null: the file leaves it open. */
  readonly guess: Guess<DecimalMark | null>;
  /** The question to a person, with the numbers that raise it; null when there is none. */
  readonly question: null | {
    readonly line: number;
    readonly column: number;
    readonly message: string;
    /** Choices in words; `null` is 'export the file again'. */
    readonly choices: readonly { readonly mark: DecimalMark; readonly label: string }[];
  };
}

interface Sighting {
  readonly line: number;
  readonly column: number;
  readonly text: string;
}

export function guessDecimalMark(rows: readonly Row[], separator: Separator): DecimalMarkGuess {
  const seen = collect(rows);
  const point = seen.point[0];
  const comma = seen.comma[0];
  if (point && comma) {
    const [few, many] =
      seen.point.length < seen.comma.length ? [seen.point, seen.comma] : [seen.comma, seen.point];
    const mark: DecimalMark = many === seen.comma ? "," : ".";
    // A stray cell is that cell's issue, not the file's.
    if (few.length * 20 <= many.length) return certain(mark, many[0]);
    return {
      guess: { value: null, reason: "both marks occur", basis: "assumed" },
      question: {
        line: comma.line,
        column: comma.column,
        message: `“${comma.text}” on line ${comma.line} has a decimal comma and “${point.text}” on line ${point.line} a decimal point. Which is it?`,
        choices: [
          { mark: "either", label: "Read both as decimal marks" },
          { mark: ",", label: "Decimal comma" },
          { mark: ".", label: "Decimal point" },
        ],
      },
    };
  }
  if (separator === "," && !comma) {
    const split = splitDecimals(rows);
    if (split !== null && !point) return split;
    if (!point && seen.open.every((sighting) => sighting.text.includes("."))) {
      return point || seen.open.length > 0
        ? certain(".", seen.open[0], "commas separate the columns")
        : whole();
    }
  }
  if (point) return certain(".", point);
  if (comma) return certain(",", comma);
  const open = seen.open[0];
  if (!open) return whole();
  const asDecimal = open.text.replace(",", ".");
  const asWhole = open.text.replace(/[.,]/, "");
  const [decimal, grouping]: [DecimalMark, DecimalMark] = open.text.includes(",") ? [",", "."] : [".", ","];
  return {
    guess: { value: null, reason: "every mark stands before exactly three digits", basis: "assumed" },
    question: {
      line: open.line,
      column: open.column,
      message: `“${open.text}” on line ${open.line} can be ${asDecimal} or ${asWhole}, and no other number in the file decides it.`,
      choices: [
        { mark: decimal, label: `Read as ${asDecimal}` },
        { mark: grouping, label: `Read as ${asWhole}` },
      ],
    },
  };
}

function certain(mark: "." | ",", sighting: Sighting | undefined, reason?: string): DecimalMarkGuess {
  const shown = sighting ? `as in “${sighting.text}” on line ${sighting.line}` : "";
  return { guess: { value: mark, reason: reason ?? shown, basis: "file" }, question: null };
}

function whole(): DecimalMarkGuess {
  return {
    guess: { value: ".", reason: "whole numbers only, so it makes no difference", basis: "file" },
    question: null,
  };
}

const MOST_CELLS = 40_000;

function collect(rows: readonly Row[]) {
  const seen: { point: Sighting[]; comma: Sighting[]; open: Sighting[] } = { point: [], comma: [], open: [] };
  let looked = 0;
  for (const row of rows) {
    // Enough to know, and wide files have very many cells.
    if (looked > MOST_CELLS) break;
    looked += row.cells.length;
    for (const [column, cell] of row.cells.entries()) {
      if (!/[.,]/.test(cell) || !looksNumeric(cell)) continue;
      const text = cell.replace(/^[+\-−]/, "").replace(/[ \u00a0\u202f'’]/g, "");
      const sighting = { line: row.line, column, text };
      const points = text.split(".").length - 1;
      const commas = text.split(",").length - 1;
      if (points > 0 && commas > 0) {
        seen[text.lastIndexOf(".") > text.lastIndexOf(",") ? "point" : "comma"].push(sighting);
      } else if (points > 1 || commas > 1) {
        // Several equal marks only group; dates and version numbers group nothing.
        if (isGrouped(text, points > 1 ? "." : ",")) seen[points > 1 ? "comma" : "point"].push(sighting);
      } else if (isGrouped(text, points > 0 ? "." : ",")) seen.open.push(sighting);
      else seen[points > 0 ? "point" : "comma"].push(sighting);
    }
  }
  return seen;
}

/**
 * "0,5,0,021": the comma separates columns and is the decimal mark too, so that nobody can tell the cells apart.
 * It shows in rows of whole numbers with leading zeros, or with more cells than the line of names has.
 */
function splitDecimals(rows: readonly Row[]): DecimalMarkGuess | null {
  const data = rows.filter(
    (row) => row.cells.length > 1 && row.cells.every((cell) => /^[-−]?\d*$/.test(cell)),
  );
  if (data.length < 2) return null;
  const suspicious = data.filter((row) => row.cells.some((cell) => /^0\d+$/.test(cell)));
  const first = data[0];
  const names = rows.find((row) => first && row.line < first.line && row.cells.length > 1);
  const widths = new Set(data.map((row) => row.cells.length));
  const wider = names !== undefined && first !== undefined && first.cells.length > names.cells.length;
  const shown = suspicious[0] ?? first;
  if (!shown || (suspicious.length === 0 && !(wider && widths.size > 1))) return null;
  return {
    guess: { value: null, reason: "commas seem to be both separator and decimal mark", basis: "assumed" },
    question: {
      line: shown.line,
      column: shown.cells.findIndex((cell) => /^0\d+$/.test(cell)),
      message: `Line ${shown.line}, “${shown.cells.join(",").slice(0, 60)}”: the comma seems to separate the columns and to be the decimal mark as well, and the two cannot be told apart. Export again with semicolons or tabs between the columns, or with a decimal point.`,
      choices: [{ mark: ".", label: "They are whole numbers: read on" }],
    },
  };
}

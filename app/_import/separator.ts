import { looksNumeric } from "./number";
import type { Guess } from "./reading";
import { firstRows, isBlank, type Row, type RowFormat, SEPARATOR_NAMES, type Separator } from "./rows";

/**
 * Which character separates the columns. A separator shows itself by rows of numbers that all have the same number
 * of cells. Commas come last: they occur inside numbers and sentences, tabs, semicolons and bars hardly ever do.
 */

export interface SeparatorGuess {
  readonly guess: Guess<Separator>;
  /** Others that divide the file just as well, so that a person has to say. */
  readonly rivals: readonly Separator[];
}

const SAMPLE_ROWS = 400;

export function guessSeparator(text: string, quotes: RowFormat["quotes"]): SeparatorGuess {
  const all = (["\t", ";", "|", ","] as const).map((separator) => score(text, { separator, quotes }));
  const blank = score(text, { separator: " ", quotes: "plain" });
  // Numbers with blanks inside, where blanks alone divide every line evenly, were not meant as one cell.
  const candidates = all.filter(
    (candidate) => candidate.columns > 1 && !(candidate.torn >= 0.5 && blank.regular >= 0.5),
  );
  if (candidates.length === 0 && blank.columns > 1 && blank.regular >= 0.5) candidates.push(blank);
  const strong = candidates.filter((candidate) => candidate.separator !== "," && candidate.regular >= 0.5);
  const best = [...(strong.length > 0 ? strong : candidates)].sort((a, b) => b.points - a.points)[0];
  if (!best) {
    return {
      guess: { value: ",", reason: "no separator divides the lines into columns", basis: "assumed" },
      rivals: [],
    };
  }
  return {
    guess: {
      value: best.separator,
      reason: `the ${SEPARATOR_NAMES[best.separator]} divides the lines of numbers into ${best.columns} cells each`,
      basis: "file",
    },
    rivals: strong
      .filter((other) => other !== best && other.points > 0.9 * best.points)
      .map((other) => other.separator),
  };
}

interface Score {
  readonly separator: Separator;
  readonly columns: number;
  /** Part of the non-blank rows that have the usual number of cells and are mostly numbers. */
  readonly regular: number;
  readonly points: number;
  /** Part of the rows in which a cell holds two numbers apart. */
  readonly torn: number;
}

function score(text: string, format: RowFormat): Score {
  const rows = firstRows(text, format, SAMPLE_ROWS).filter((row) => !isBlank(row));
  const numeric = rows.map(numericShare);
  const counts = new Map<number, number>();
  for (const [i, row] of rows.entries()) {
    const weight = numeric[i] ?? 0;
    if (row.cells.length > 1 && weight > 0) {
      counts.set(row.cells.length, (counts.get(row.cells.length) ?? 0) + weight);
    }
  }
  const [columns, points] = [...counts].sort((a, b) => b[1] - a[1])[0] ?? [1, 0];
  const regular = rows.filter((row, i) => row.cells.length === columns && (numeric[i] ?? 0) >= 0.5).length;
  return {
    separator: format.separator,
    columns,
    regular: rows.length === 0 ? 0 : regular / rows.length,
    points,
    torn: rows.length === 0 ? 0 : rows.filter(({ cells }) => cells.some(isTorn)).length / rows.length,
  };
}

/** "0 0,010": numbers with a blank between that groups no thousands. */
function isTorn(cell: string): boolean {
  return /\d\s+[+\-−]?[\d.,]/.test(cell) && !/^[+\-−]?\d{1,3}(\s\d{3})+([.,]\d*)?$/.test(cell);
}

function numericShare(row: Row): number {
  const filled = row.cells.filter((cell) => cell !== "");
  return filled.length === 0 ? 0 : filled.filter(looksNumeric).length / filled.length;
}

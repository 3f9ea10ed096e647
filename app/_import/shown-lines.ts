import type { Frame } from "./frame";
import type { Gathered } from "./gathered";
import type { Issue, ShownLine } from "./reading";
import type { RecipeLine } from "./recipes";
import { eachRow, firstRows, isBlank, type Row, type RowFormat } from "./rows";

/** The lines worth showing: what stands above the data, its first and last lines, and the lines about every issue. */

const ABOVE = 24;
const FIRST = 4;
const LAST = 2;
const ISSUES = 24;
const MOST_CELLS = 60;

export function shownLines(file: {
  readonly text: string;
  readonly rowFormat: RowFormat;
  readonly frame: Frame;
  readonly recipes: readonly RecipeLine[];
  readonly found: Gathered;
  readonly total: number;
  readonly issues: readonly Issue[];
}): ShownLine[] {
  const { frame, found, total } = file;
  const from = frame.firstDataLine.value;
  const wanted = new Set<number>();
  const want = (first: number, last: number) => {
    for (let line = Math.max(1, first); line <= Math.min(last, total); line++) wanted.add(line);
  };
  want(from - ABOVE, from + FIRST);
  want(found.lastDataLine - LAST + 1, found.lastDataLine + 2);
  const faulty = file.issues.filter((issue) => issue.line !== null && issue.severity !== "settled");
  for (const issue of faulty.slice(0, ISSUES)) want((issue.line ?? 1) - 1, (issue.line ?? 1) + 1);

  const last = Math.max(...wanted);
  const recipeLines = new Set(file.recipes.map((recipe) => recipe.line));
  const shown: ShownLine[] = [];
  eachWantedRow(file, wanted, (row) => {
    if (wanted.has(row.line)) {
      const kind = (): ShownLine["kind"] => {
        if (row.line === frame.headerLine.value) return "header";
        if (row.line === frame.unitLine.value) return "unit";
        if (recipeLines.has(row.line)) return "recipe";
        if (row.line < from) return "preamble";
        return isBlank(row) || row.line > found.lastDataLine ? "skipped" : "data";
      };
      shown.push({
        line: row.line,
        kind: kind(),
        cells: row.cells
          .slice(0, MOST_CELLS)
          .map((cell) => (cell.length > 60 ? `${cell.slice(0, 57)}…` : cell)),
      });
    }
    return row.line < last;
  });
  return shown;
}

/** Without quoting a line is a row, so that the others need not be divided into cells again. */
function eachWantedRow(
  { text, rowFormat }: { readonly text: string; readonly rowFormat: RowFormat },
  wanted: ReadonlySet<number>,
  visit: (row: Row) => boolean,
): void {
  if (text.includes('"')) {
    eachRow(text, rowFormat, visit);
    return;
  }
  let line = 1;
  for (let from = 0; from <= text.length; line += 1) {
    const end = text.indexOf("\n", from);
    const until = end < 0 ? text.length : end;
    let more = true;
    if (wanted.has(line)) {
      const [row] = firstRows(text.slice(from, until), rowFormat, 1);
      more = visit({ cells: row?.cells ?? [""], brokenQuotes: false, line });
    }
    if (!more) return;
    from = until + 1;
  }
}

import type { Corrections } from "./corrections";
import type { Gathered, LineFinding } from "./gathered";
import type { Issue, Repair } from "./reading";
import type { Separator } from "./rows";
import { counted, lineList, lines, quoted } from "./words";

/**
 * Lines that are unlike the others: longer, shorter, without a time, words, statistics, left out by hand, blanks, and
 * what stands below the data.
 */
export function lineIssues(
  found: Gathered,
  width: number,
  totalLines: number,
  corrections: Corrections,
  separator: Separator,
): Issue[] {
  return [
    found.brokenQuotes === null ? null : brokenQuotes(found.brokenQuotes),
    longLine(found, width),
    shortLine(found, width, separator),
    noTime(found),
    lineOfWords(found),
    summaryRow(found),
    ...(corrections.linesLeftOut ?? []).map(lineLeftOut),
    blankLines(found),
    belowTheData(found, totalLines),
  ].filter((issue) => issue !== null);
}

type LineIssue = Pick<Issue, "code" | "severity" | "place" | "message"> & Partial<Issue>;

function issueOf(issue: LineIssue): Issue {
  return { line: null, column: null, repairs: [], ...issue };
}

/** Only where every one of them was kept by number. */
function leaveOut(kept: readonly LineFinding[], count: number): Repair[] {
  if (count > kept.length) return [];
  return [
    {
      label: count === 1 ? `Leave line ${kept[0]?.line} out` : `Leave these ${count} lines out`,
      change: { kind: "leave-lines-out", lines: kept.map(({ line }) => line) },
    },
  ];
}

function placeOf(kept: readonly LineFinding[], count: number): string {
  return lineList(
    kept.map(({ line }) => line),
    count,
  );
}

function longLine({ longLines, longLineCount: count }: Gathered, width: number): Issue | null {
  const [first] = longLines;
  if (first === undefined) return null;
  const which =
    count === 1
      ? `Line ${first.line} has`
      : `${counted(count, "line")}, the first of them line ${first.line}, have`;
  return issueOf({
    code: "long-line",
    severity: "blocks",
    line: first.line,
    place: `line ${first.line}`,
    message: `${which} ${first.cells} cells where ${width} are expected: ${quoted(first.text)}. A number may be split by a separator inside it.`,
    repairs: leaveOut(longLines, count),
  });
}

/** Between blanks nothing shows which cell is missing, and the ones after it move to its place. */
function shortLine(
  { shortLines, shortLineCount: count }: Gathered,
  width: number,
  separator: Separator,
): Issue | null {
  const [first] = shortLines;
  if (first === undefined) return null;
  const shifted = separator === " ";
  const which =
    count === 1
      ? `This line has ${first.cells} cells where ${width} are expected`
      : `These lines have fewer cells than the ${width} expected`;
  return issueOf({
    code: "short-line",
    severity: shifted ? "blocks" : "weakens",
    line: first.line,
    place: placeOf(shortLines, count),
    message: `${which}; ${shifted ? "which of them is missing cannot be seen. Leave the line out, or export again with a separator" : "the missing ones count as no reading"}.`,
    repairs: shifted ? leaveOut(shortLines, count) : [],
  });
}

function noTime({ timeless, timelessCount: count }: Gathered): Issue | null {
  const [first] = timeless;
  if (first === undefined) return null;
  return issueOf({
    code: "no-time",
    severity: "blocks",
    line: first.line,
    place: placeOf(timeless, count),
    message: `${count === 1 ? "There is a reading here" : "There are readings here"} but no time: ${quoted(first.text)}.`,
    repairs: leaveOut(timeless, count),
  });
}

function lineOfWords({ wordLines, wordLineCount }: Gathered): Issue | null {
  const [first] = wordLines;
  if (first === undefined) return null;
  return issueOf({
    code: "line-of-words",
    severity: "note",
    line: first.line,
    place: placeOf(wordLines, wordLineCount),
    message: `No number stands here: ${quoted(first.text)}. Skipped, kept in the raw file.`,
  });
}

function summaryRow({ summaries, summaryCount }: Gathered): Issue | null {
  const [first] = summaries;
  if (first === undefined) return null;
  return issueOf({
    code: "summary-row",
    severity: "note",
    line: first.line,
    place: placeOf(summaries, summaryCount),
    message: `A statistic of the columns and no reading: ${quoted(first.text)}. Skipped, kept in the raw file.`,
  });
}

function lineLeftOut(line: number): Issue {
  return issueOf({
    code: "line-left-out",
    severity: "settled",
    line,
    place: `line ${line}`,
    message: "Left out by hand; the raw file keeps it.",
    repairs: [{ label: "Take it in", change: { kind: "take-line-in", line } }],
  });
}

function blankLines({ blankLineCount }: Gathered): Issue | null {
  if (blankLineCount === 0) return null;
  return issueOf({
    code: "blank-lines",
    severity: "settled",
    place: counted(blankLineCount, "line"),
    message: "Empty lines among the data, skipped.",
  });
}

function belowTheData({ tooManyPoints, lastDataLine, tail }: Gathered, totalLines: number): Issue | null {
  if (tooManyPoints || lastDataLine <= 0 || lastDataLine >= totalLines) return null;
  const [first] = tail;
  return issueOf({
    code: "tail",
    severity: first ? "note" : "settled",
    line: lastDataLine + 1,
    place: lines(lastDataLine + 1, totalLines),
    message: first
      ? `Below the data, skipped and kept in the raw file: line ${first.line}, ${quoted(first.text)}.`
      : "Empty lines at the end, skipped.",
  });
}

export function brokenQuotes(line: number): Issue {
  return {
    code: "broken-quotes",
    severity: "blocks",
    line,
    column: null,
    place: `line ${line}`,
    message:
      "A quotation mark is opened on this line and not closed where a cell ends, so that the cells after it cannot be told apart.",
    repairs: [
      {
        label: "Read quotation marks as plain characters",
        change: { kind: "set", values: { quotes: "plain" } },
      },
    ],
  };
}

import type { Corrections } from "./corrections";
import type { Gathered } from "./gathered";
import type { Issue } from "./reading";
import type { Separator } from "./rows";
import { counted, lineList, lines, quoted } from "./words";

/** Lines that are unlike the others: longer, shorter, without a time, words, blanks, and what stands below the data. */
export function lineIssues(
  found: Gathered,
  width: number,
  totalLines: number,
  corrections: Corrections,
  separator: Separator,
): Issue[] {
  const issues: Issue[] = [];
  const add = (issue: Partial<Issue> & Pick<Issue, "code" | "severity" | "place" | "message">) =>
    issues.push({ line: null, column: null, repairs: [], ...issue });

  if (found.brokenQuotes !== null) issues.push(brokenQuotes(found.brokenQuotes));
  const long = found.longLines[0];
  if (long) {
    add({
      code: "long-line",
      severity: "blocks",
      line: long.line,
      place: `line ${long.line}`,
      message: `${found.longLineCount === 1 ? `Line ${long.line} has` : `${counted(found.longLineCount, "line")}, the first of them line ${long.line}, have`} ${long.cells} cells where ${width} are expected: ${quoted(long.text)}. A number may be split by a separator inside it.`,
      repairs:
        found.longLineCount <= found.longLines.length
          ? [
              {
                label:
                  found.longLineCount === 1
                    ? `Leave line ${long.line} out`
                    : `Leave these ${found.longLineCount} lines out`,
                change: { kind: "leave-lines-out", lines: found.longLines.map(({ line }) => line) },
              },
            ]
          : [],
    });
  }
  const short = found.shortLines[0];
  if (short) {
    add({
      code: "short-line",
      // Between blanks nothing shows which cell is missing, and the ones after it move to its place.
      severity: separator === " " ? "blocks" : "weakens",
      line: short.line,
      place: lineList(
        found.shortLines.map(({ line }) => line),
        found.shortLineCount,
      ),
      message: `${found.shortLineCount === 1 ? "This line has" : "These lines have"} ${found.shortLineCount === 1 ? short.cells : "fewer"} cells${found.shortLineCount === 1 ? ` where ${width} are expected` : ` than the ${width} expected`}; ${separator === " " ? "which of them is missing cannot be seen. Leave the line out, or export again with a separator" : "the missing ones count as no reading"}.`,
      repairs:
        separator === " " && found.shortLineCount <= found.shortLines.length
          ? [
              {
                label: found.shortLineCount === 1 ? `Leave line ${short.line} out` : "Leave these lines out",
                change: { kind: "leave-lines-out", lines: found.shortLines.map(({ line }) => line) },
              },
            ]
          : [],
    });
  }
  const timeless = found.timeless[0];
  if (timeless) {
    add({
      code: "no-time",
      severity: "blocks",
      line: timeless.line,
      place: lineList(
        found.timeless.map(({ line }) => line),
        found.timelessCount,
      ),
      message: `${found.timelessCount === 1 ? "There is a reading here" : "There are readings here"} but no time: ${quoted(timeless.text)}.`,
      repairs:
        found.timelessCount <= found.timeless.length
          ? [
              {
                label:
                  found.timelessCount === 1
                    ? `Leave line ${timeless.line} out`
                    : `Leave these ${found.timelessCount} lines out`,
                change: { kind: "leave-lines-out", lines: found.timeless.map(({ line }) => line) },
              },
            ]
          : [],
    });
  }
  const words = found.wordLines[0];
  if (words) {
    add({
      code: "line-of-words",
      severity: "note",
      line: words.line,
      place: lineList(
        found.wordLines.map(({ line }) => line),
        found.wordLineCount,
      ),
      message: `No number stands here: ${quoted(words.text)}. Skipped, kept in the raw file.`,
    });
  }
  const summary = found.summaries[0];
  if (summary) {
    add({
      code: "summary-row",
      severity: "note",
      line: summary.line,
      place: lineList(
        found.summaries.map(({ line }) => line),
        found.summaryCount,
      ),
      message: `A statistic of the columns and no reading: ${quoted(summary.text)}. Skipped, kept in the raw file.`,
    });
  }
  for (const line of corrections.linesLeftOut ?? []) {
    add({
      code: "line-left-out",
      severity: "settled",
      line,
      place: `line ${line}`,
      message: "Left out by hand; the raw file keeps it.",
      repairs: [{ label: "Take it in", change: { kind: "take-line-in", line } }],
    });
  }
  if (found.blankLineCount > 0) {
    add({
      code: "blank-lines",
      severity: "settled",
      place: counted(found.blankLineCount, "line"),
      message: "Empty lines among the data, skipped.",
    });
  }
  if (!found.tooManyPoints && found.lastDataLine > 0 && found.lastDataLine < totalLines) {
    const first = found.tail[0];
    add({
      code: "tail",
      severity: first ? "note" : "settled",
      line: found.lastDataLine + 1,
      place: lines(found.lastDataLine + 1, totalLines),
      message: first
        ? `Below the data, skipped and kept in the raw file: line ${first.line}, ${quoted(first.text)}.`
        : "Empty lines at the end, skipped.",
    });
  }
  return issues;
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

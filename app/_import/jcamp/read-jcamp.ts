import { CONTAINER_FORMAT, type TableTextReading } from "../container";
import type { Encoding } from "../decode";
import type { Guess, Issue } from "../reading";
import { timeUnitOf } from "../units";
import { counted, quoted } from "../words";
import { type DataBlock, dataBlocks, labelledRecords, recordNumber, recordText } from "./labelled-records";
import { readOrdinates } from "./ordinates";

/**
 * A JCAMP-DX file of courses in time into the text of a table: one time column where all blocks share their times, else
 * a time column for each. Everything that the file says twice (last abscissa, number of points, check ordinates) is
 * compared, and a file that contradicts itself is not half read.
 */

const MOST_POINTS = 4_000_000;

interface Course {
  readonly title: string;
  readonly unit: string;
  readonly ordinateUnits: string;
  readonly time: readonly number[];
  readonly signal: readonly number[];
  readonly issues: readonly Issue[];
}

type CourseReading = Course | { readonly refused: string };

export function readJcamp(text: string, encoding: Guess<Encoding>): TableTextReading {
  const blocks = dataBlocks(labelledRecords(text));
  if (blocks.length === 0) {
    return refused("This JCAMP-DX file holds no XYDATA or XYPOINTS record, so there is no course to read.");
  }
  const courses: Course[] = [];
  for (const block of blocks) {
    const course = courseOf(block);
    if ("refused" in course) return refused(course.refused);
    courses.push(course);
  }
  return {
    status: "text",
    text: tableOf(courses),
    encoding,
    container: "jcamp-dx",
    format: CONTAINER_FORMAT,
    sheet: null,
    issues: [
      {
        code: "jcamp-dx",
        severity: "settled",
        line: null,
        column: null,
        place: "file",
        message: `A JCAMP-DX file with ${counted(courses.length, "course")}; the lines shown are those of the table made of it.`,
        repairs: [],
      },
      ...courses.flatMap(({ issues }) => issues),
    ],
  };
}

function courseOf(block: DataBlock): CourseReading {
  const { records } = block;
  const title = block.title === "" ? "untitled" : block.title;
  const xUnits = recordText(records, "XUNITS");
  const unit = timeUnitOf(xUnits);
  if (unit === null) {
    return {
      refused: `${quoted(title)} in this JCAMP-DX file runs along ${xUnits === "" ? "an axis without a unit" : xUnits.toLowerCase()}, not along time. A course in time (XUNITS of seconds, minutes or hours) is needed; a scan belongs to the standards.`,
    };
  }
  const points = pointsOf(block, title);
  if ("refused" in points) return points;
  const stated = recordNumber(records, "NPOINTS");
  if (stated !== null && stated !== points.signal.length) {
    return {
      refused: `${quoted(title)} in this JCAMP-DX file states ${counted(stated, "point")} (line ${records.get("NPOINTS")?.line}) and holds ${points.signal.length}. The file is incomplete or was changed; export it again.`,
    };
  }
  return {
    title,
    unit,
    ordinateUnits: recordText(records, "YUNITS"),
    ...points,
    issues: ordinateIssues(title, recordText(records, "YUNITS")),
  };
}

interface Points {
  readonly time: readonly number[];
  readonly signal: readonly number[];
}

function pointsOf(block: DataBlock, title: string): Points | { readonly refused: string } {
  const even = block.records.get("XYDATA");
  if (even) return evenPoints(block, title, even.lines, even.line);
  const pairs = block.records.get("XYPOINTS");
  if (pairs) return pairedPoints(block, title, pairs.lines, pairs.line);
  return {
    refused: `${quoted(title)} in this JCAMP-DX file is neither XYDATA nor XYPOINTS, which are the forms read here. Export it as one of them, or as CSV.`,
  };
}

/** `(X++(Y..Y))`: evenly spaced, from FIRSTX to LASTX or by DELTAX. */
function evenPoints(
  { records }: DataBlock,
  title: string,
  lines: readonly string[],
  labelLine: number,
): Points | { readonly refused: string } {
  const [form = "", ...data] = lines;
  if (form.replace(/\s/g, "").toUpperCase() !== "(X++(Y..Y))") {
    return {
      refused: `Line ${labelLine} of this JCAMP-DX file: the form ${quoted(form)} of XYDATA is not read here.`,
    };
  }
  const read = readOrdinates(data, labelLine + 1, MOST_POINTS);
  if (read.status === "fault") {
    return { refused: `Line ${read.line} of this JCAMP-DX file: ${read.message}. Export it again.` };
  }
  const xFactor = recordNumber(records, "XFACTOR") ?? 1;
  const yFactor = recordNumber(records, "YFACTOR") ?? 1;
  const signal = read.lines.flatMap(({ ordinates }) => ordinates.map((value) => value * yFactor));
  const first = recordNumber(records, "FIRSTX") ?? (read.lines[0]?.abscissa ?? Number.NaN) * xFactor;
  const last = recordNumber(records, "LASTX");
  const step =
    last !== null && signal.length > 1
      ? (last - first) / (signal.length - 1)
      : recordNumber(records, "DELTAX");
  if (step === null || !Number.isFinite(first)) {
    return {
      refused: `${quoted(title)} in this JCAMP-DX file gives neither LASTX nor DELTAX, so its times are not known.`,
    };
  }
  let index = 0;
  for (const { abscissa, ordinates, line, checked } of read.lines) {
    const due = first + index * step;
    const found = abscissa * xFactor;
    // Rounded to its own digits; half a step off, the line belongs elsewhere. Writers differ in whether a check
    // ordinate has the abscissa or the one after it.
    const off = Math.min(
      Math.abs(found - due),
      checked ? Math.abs(found - (due - step)) : Number.POSITIVE_INFINITY,
    );
    if (off > 0.5 * Math.abs(step) + 1e-9 * Math.abs(first)) {
      return {
        refused: `Line ${line} of this JCAMP-DX file begins at ${found} where ${Number(due.toPrecision(8))} is due. Readings are missing or doubled; export it again.`,
      };
    }
    index += ordinates.length;
  }
  // FIRSTX + i·DELTAX as the nearest short number, so that 0.1·3 is 0.3.
  const time = signal.map((_, i) => Number((first + i * step).toPrecision(12)));
  return { time, signal: signal.map((value) => Number(value.toPrecision(15))) };
}

/** `(XY..XY)`: pairs, divided by semicolons, line ends or blanks. */
function pairedPoints(
  { records }: DataBlock,
  title: string,
  lines: readonly string[],
  labelLine: number,
): Points | { readonly refused: string } {
  const xFactor = recordNumber(records, "XFACTOR") ?? 1;
  const yFactor = recordNumber(records, "YFACTOR") ?? 1;
  const time: number[] = [];
  const signal: number[] = [];
  for (const [index, text] of lines.slice(1).entries()) {
    const numbers = text.split(/[\s,;]+/).filter((cell) => cell !== "");
    if (numbers.length % 2 !== 0 || numbers.some((cell) => cell !== "?" && !Number.isFinite(Number(cell)))) {
      return {
        refused: `Line ${labelLine + 1 + index} of this JCAMP-DX file: ${quoted(text.trim())} is no row of pairs.`,
      };
    }
    for (let i = 0; i < numbers.length; i += 2) {
      time.push(Number(numbers[i]) * xFactor);
      signal.push(numbers[i + 1] === "?" ? Number.NaN : Number(numbers[i + 1]) * yFactor);
    }
    if (time.length > MOST_POINTS)
      return { refused: `${quoted(title)} holds more than ${MOST_POINTS} points.` };
  }
  return { time, signal };
}

function ordinateIssues(title: string, units: string): Issue[] {
  if (units === "" || /^(absorbance|arbitrary units?)$/i.test(units)) return [];
  return [
    {
      code: "ordinate-unit",
      severity: "weakens",
      line: null,
      column: null,
      place: title,
      message: `The file says that ${quoted(title)} is in ${units.toLowerCase()}. Check that this is the signal of the set-up.`,
      repairs: [],
    },
  ];
}

function tableOf(courses: readonly Course[]): string {
  const [first] = courses;
  const shared = courses.every(
    ({ unit, time }) =>
      unit === first?.unit && time.length === first.time.length && time.every((t, i) => t === first.time[i]),
  );
  const columns = courses.flatMap(({ title, unit, time, signal }, i) => [
    ...(shared && i > 0 ? [] : [{ head: `t / ${unit}`, cells: time }]),
    { head: title.replace(/\s+/g, " "), cells: signal },
  ]);
  const rows = Math.max(...columns.map(({ cells }) => cells.length));
  const lines = [columns.map(({ head }) => head).join("\t")];
  for (let i = 0; i < rows; i++) {
    lines.push(columns.map(({ cells }) => (Number.isFinite(cells[i]) ? String(cells[i]) : "")).join("\t"));
  }
  return lines.join("\n");
}

function refused(message: string): TableTextReading {
  return { status: "refused", message };
}

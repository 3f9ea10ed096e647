import { printNumber } from "kinetics-core/quantities";
import type { DisplayScale } from "@/app/_worksheet/display-units";
import { calibratedStandards } from "@/app/_worksheet/standards/calibrated-standards";
import { standardsInUnit } from "@/app/_worksheet/standards/standards-flags";
import { parseNumber } from "@/app/_worksheet/typed-number/parse-number";
import { uncertainText } from "@/app/_worksheet/uncertain-text";
import type { Sheet } from "@/db/sheet/sheet.schema";

/** A concentration read from the line. */
export interface ReadingView {
  readonly typed: string;
  /** "29.8 ± 0.3 µmol L^-1", or in a few words why there is none. */
  readonly answer: string;
  readonly detail: string;
}

const MOST_READINGS = 40;

/** @param typed signals of one unknown, parted by blanks or semicolons; null where nothing was asked. */
export function inverseReading(
  sheet: Sheet,
  typed: string,
  { unit, factor }: DisplayScale,
): ReadingView | null {
  const parts = typed.split(/[;\s]+/).filter((part) => part !== "");
  if (parts.length === 0) return null;
  const readings = parts.slice(0, MOST_READINGS).map((part) => parseNumber(part));
  const wrong = readings.findIndex((reading) => reading.status !== "number");
  if (wrong >= 0 || parts.length > MOST_READINGS)
    return {
      typed,
      answer: "Not read",
      detail:
        wrong >= 0
          ? `“${parts[wrong]}” is no number. Type the signals of one solution, parted by blanks: 0.547 0.551.`
          : `There are ${parts.length} signals; at most ${MOST_READINGS} are read together.`,
    };
  const signals = readings.flatMap((reading) => (reading.status === "number" ? [reading.value] : []));
  const shown = standardsInUnit(sheet, factor);
  const line = calibratedStandards(shown, [signals]);
  if (line.status === "no-line") return { typed, answer: "No line", detail: line.message };
  const [read] = line.calibration.readings;
  if (read === undefined || read.estimate === null)
    return { typed, answer: "Not known", detail: "The line has no slope to read from." };
  const stock = Math.abs(read.estimate) * sheet.calibration.stockRelative;
  const error = read.standardError === null ? null : Math.hypot(read.standardError, stock);
  return {
    typed,
    answer: `${uncertainText(read.estimate, error)} ${unit}`,
    detail: [
      signals.length === 1 ? "One reading." : `Mean of ${signals.length} readings.`,
      sourcesOf(read.standardError, stock),
      read.interval === null
        ? "There is no interval: the slope is too poorly known."
        : `95 % interval of readings and line ${printNumber(read.interval[0], 3)} to ${printNumber(read.interval[1], 3)} ${unit}, by Fieller’s theorem.`,
      ...ownFlags(shown, line.calibration.flags),
    ]
      .filter((part) => part !== "")
      .join(" "),
  };
}

function sourcesOf(line: number | null, stock: number): string {
  if (line === null) return "";
  const parts = `Standard uncertainty from readings and line (${printNumber(line, 2)})`;
  return stock === 0 ? `${parts}.` : `${parts} and the standard stock (${printNumber(stock, 2)}).`;
}

/** What is said of the reading and not of the line itself, which the margin says. */
function ownFlags(
  shown: Parameters<typeof calibratedStandards>[0],
  flags: readonly { readonly code: string; readonly message: string }[],
): readonly string[] {
  const alone = calibratedStandards(shown);
  const known = new Set(alone.status === "calibrated" ? alone.calibration.flags.map(({ code }) => code) : []);
  return flags.filter(({ code }) => !known.has(code)).map(({ message }) => message);
}

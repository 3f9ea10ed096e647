import { concentrationToMolar, molarTo } from "kinetics-core/quantities";
import { parseNumber } from "@/app/_worksheet/typed-number/parse-number";
import { parseUncertain } from "@/app/_worksheet/typed-number/parse-uncertain";
import { typedNumber, typedUncertain } from "@/app/_worksheet/typed-number/print-typed";
import type { ConcentrationUnit, Sheet, SheetStandard } from "@/db/sheet/sheet.schema";

/**
 * Standards as lines of text, the way they stand in a notebook or come from a spreadsheet: label, concentration,
 * readings. "S1  5.0 ± 0.1  0.100  0.109  0.108". A label that begins with "blank" makes a blank. Written out and read
 * back, nothing changes.
 */
export interface StandardFault {
  /** 1-based. */
  readonly line: number;
  readonly message: string;
}

export type StandardLines =
  | { readonly status: "read"; readonly standards: readonly SheetStandard[] }
  | { readonly status: "faults"; readonly faults: readonly StandardFault[] };

/** `known` gives lines of a known label their id, remark and whether they are set aside. */
export function readStandardLines(
  text: string,
  unit: ConcentrationUnit,
  known: readonly SheetStandard[],
  newId: () => string,
): StandardLines {
  const faults: StandardFault[] = [];
  const standards: SheetStandard[] = [];
  const lines = text.replace(/\r\n?/g, "\n").split("\n");
  for (const [index, line] of lines.entries()) {
    if (line.trim() === "") continue;
    if (standards.length === 0 && faults.length === 0 && isHeading(cellsOf(line))) continue;
    const fault = (message: string) => faults.push({ line: index + 1, message });
    const [first = "", ...rest] = cellsOf(line);
    // A line of numbers alone is a standard without a name.
    const isNamed = parseUncertain(first).status !== "uncertain";
    const label = isNamed ? first.slice(0, 40) : nextLabel([...known, ...standards]);
    const [concentrationText = "", ...signalTexts] = isNamed ? rest : [first, ...rest];
    const concentration = parseUncertain(concentrationText);
    if (concentration.status !== "uncertain" || concentration.value < 0) {
      fault(
        concentration.status === "not-readable"
          ? `${label}: ${concentration.message}`
          : `${label} has no concentration of 0 or more. Write label, concentration and readings, such as S1 5.0 ± 0.1 0.100 0.109.`,
      );
      continue;
    }
    const signals = signalTexts.map((cell) => parseNumber(cell));
    const bad = signals.findIndex((reading) => reading.status !== "number");
    if (bad >= 0) {
      fault(`${label}: reading ${bad + 1}, “${signalTexts[bad]}”, is no number.`);
      continue;
    }
    if (signals.length > MOST_READINGS) {
      fault(`${label} has ${signals.length} readings; at most ${MOST_READINGS} are kept.`);
      continue;
    }
    if (standards.some((one) => one.label === label)) {
      fault(`${label} stands here twice. Write all its readings on one line.`);
      continue;
    }
    const before = known.find((one) => one.label === label);
    standards.push({
      id: before?.id ?? newId(),
      label,
      position: standards.length,
      concentration: {
        value: concentrationToMolar(concentration.value, unit),
        standardUncertainty: concentrationToMolar(concentration.standardUncertainty, unit),
      },
      signals: signals.flatMap((reading) => (reading.status === "number" ? [reading.value] : [])),
      isBlank: /^blank/i.test(label),
      setAside: before?.setAside ?? null,
      remark: before?.remark ?? "",
    });
  }
  return faults.length > 0 ? { status: "faults", faults } : { status: "read", standards };
}

export function printStandardLines(standards: Sheet["standards"], unit: ConcentrationUnit): string {
  return standards
    .map(({ label, concentration, signals }) =>
      [
        label,
        typedUncertain({
          value: molarTo(concentration.value, unit),
          standardUncertainty: molarTo(concentration.standardUncertainty, unit),
        }),
        ...signals.map(typedNumber),
      ].join("\t"),
    )
    .join("\n");
}

const MOST_READINGS = 40;

/** Tabs and semicolons part cells; without either, blanks do, but for those about ±. */
function cellsOf(line: string): string[] {
  const closed = line.trim().replace(/\s*(±|\+\/-|\+-)\s*/g, "±");
  const cells = /[\t;]/.test(closed) ? closed.split(/[\t;]/) : closed.split(/\s+/);
  const trimmed = cells.map((cell) => cell.trim());
  while (trimmed.at(-1) === "") trimmed.pop();
  return trimmed;
}

/** Two cells or more and none of them a number: the heading of a pasted table. */
function isHeading(cells: readonly string[]): boolean {
  return cells.length > 1 && cells.every((cell) => parseUncertain(cell).status !== "uncertain");
}

function nextLabel(standards: readonly { readonly label: string }[]): string {
  const used = new Set(standards.map(({ label }) => label));
  let number = 1;
  while (used.has(`S${number}`)) number += 1;
  return `S${number}`;
}

import type { TimeUnit } from "@/db/sheet/sheet.schema";
import type { Corrections } from "./corrections";
import type { ColumnReading, Guess, Issue, SignalUnit, StudyContext } from "./reading";
import {
  concentrationUnitOf,
  type ImportedTimeUnit,
  importedConcentrationToMolar,
  isAbsorbanceUnit,
  isThousandthOf,
  timeUnitOf,
} from "./units";
import { unitWords } from "./words";

/** Units of the time and signal columns: what the file says, else what the study uses, said as an assumption. */

export function timeUnitOfTable(
  columns: readonly ColumnReading[],
  studyUnit: TimeUnit,
  stated: Corrections["timeUnit"],
): Guess<ImportedTimeUnit> {
  if (columns.some((column) => column.role === "time" && column.clock !== null)) {
    return { value: "s", reason: "clock times become seconds", basis: "file" };
  }
  if (stated) return { value: stated, reason: "chosen by hand", basis: "stated" };
  for (const column of columns) {
    const unit = column.role === "time" ? timeUnitOf(column.unit) : null;
    if (unit !== null)
      return { value: unit, reason: `“${column.unit}” at column ${column.index + 1}`, basis: "file" };
  }
  return { value: studyUnit, reason: "the study's unit; the file names none", basis: "assumed" };
}

/** The signal's unit, and what a person should know when file and set-up disagree. */
export function signalUnitOfTable(
  columns: readonly ColumnReading[],
  signal: StudyContext["signal"],
  stated: Corrections["signalUnit"],
): { readonly guess: Guess<SignalUnit>; readonly issues: readonly Issue[] } {
  if (stated && stated !== "as-set-up" && stated !== "thousandths" && signal?.kind === "concentration") {
    return { guess: { value: stated, reason: "chosen by hand", basis: "stated" }, issues: [] };
  }
  if ((stated === "as-set-up" || stated === "thousandths") && signal?.kind === "calibrated") {
    return { guess: { value: stated, reason: "chosen by hand", basis: "stated" }, issues: [] };
  }
  const named = columns.find((column) => column.role === "signal" && column.unit !== "");
  if (signal?.kind === "concentration") {
    const unit = named ? concentrationUnitOf(named.unit) : null;
    if (named && unit !== null) {
      return {
        guess: { value: unit, reason: `“${named.unit}” at column ${named.index + 1}`, basis: "file" },
        issues: [],
      };
    }
    return {
      guess: { value: signal.unit, reason: "the set-up's unit; the file names none", basis: "assumed" },
      issues: named ? [disagreement(named, `a concentration in ${unitWords(signal.unit)}`)] : [],
    };
  }
  if (signal === null) {
    return {
      guess: {
        value: "as-set-up",
        reason: "the set-up does not say yet what the signal is",
        basis: "assumed",
      },
      issues: [],
    };
  }
  if (named && isThousandthOf(named.unit, signal.unit)) {
    return {
      guess: { value: "thousandths", reason: `“${named.unit}” at column ${named.index + 1}`, basis: "file" },
      issues: [],
    };
  }
  const agrees =
    !named ||
    named.unit === signal.unit ||
    (isAbsorbanceUnit(named.unit) && isAbsorbanceUnit(signal.unit || "1"));
  return {
    guess: {
      value: "as-set-up",
      reason:
        named && agrees
          ? `“${named.unit}” at column ${named.index + 1}`
          : "as in the set-up; the file names none",
      basis: named && agrees ? "file" : "assumed",
    },
    issues: agrees
      ? []
      : [
          disagreement(
            named,
            `${signal.quantity}${signal.unit === "" || signal.unit === "1" ? "" : ` in ${signal.unit}`}`,
          ),
        ],
  };
}

function disagreement(column: ColumnReading, setUp: string): Issue {
  return {
    code: "signal-unit",
    severity: "weakens",
    line: null,
    column: column.index,
    place: `column ${column.index + 1}`,
    message: `The file gives the unit “${column.unit}”, the set-up says that the signal is ${setUp}. The numbers are stored as they stand; correct the unit here or the signal in Set-up if that is wrong.`,
    repairs: [],
  };
}

/** One signal value in the unit that the study keeps. */
export function importedSignal(value: number, unit: SignalUnit): number {
  if (unit === "as-set-up") return value;
  if (unit === "thousandths") return value / 1000;
  return importedConcentrationToMolar(value, unit);
}

import { readFileSync } from "node:fs";
import path from "node:path";
import { applyChange } from "./change";
import type { Corrections } from "./corrections";
import { readTable } from "./read-file";
import type { FileReading, Issue, StudyContext } from "./reading";
import { textTable } from "./table-text";
import { EMPTY_STUDY } from "./testing-context";

/** Files of corpus/, written by hand for the reader's tests, and short ways to ask what was read from them. */

export function bytesOf(file: string): Uint8Array {
  return readFileSync(path.join(import.meta.dirname, "corpus", file));
}

export function read(
  file: string,
  corrections: Corrections = {},
  context: StudyContext = EMPTY_STUDY,
): FileReading {
  const reading = readTable(textTable(bytesOf(file), corrections), context, corrections);
  if (reading.status !== "read") throw new Error(`${file} was refused: ${reading.message}`);
  return reading;
}

export function refusal(file: string): string {
  const reading = readTable(textTable(bytesOf(file), {}), EMPTY_STUDY, {});
  return reading.status === "refused" ? reading.message : "not refused";
}

export function traces(reading: FileReading) {
  return Object.fromEntries(
    reading.traces.map((trace) => [trace.label, [[...trace.timeSeconds], [...trace.signal]]]),
  );
}

export function issue(reading: FileReading, code: string): Issue {
  const found = reading.issues.find((one) => one.code === code);
  if (!found) throw new Error(`no issue ${code} among ${reading.issues.map((one) => one.code).join(", ")}`);
  return found;
}

export function blocking(reading: FileReading): string[] {
  return reading.issues.filter((one) => one.severity === "blocks").map((one) => one.code);
}

export function repaired(file: string, code: string, label: string | RegExp): FileReading {
  const repair = issue(read(file), code).repairs.find((one) =>
    typeof label === "string" ? one.label === label : label.test(one.label),
  );
  if (!repair) throw new Error(`no repair ${label} for ${code} in ${file}`);
  return read(file, applyChange({}, repair.change));
}

/** What most of the files say, whatever their dress. */
export const TWO_RUNS = {
  R1: [
    [0, 1, 2.5, 4],
    [0.01, 0.015, 0.019, 0.022],
  ],
  R2: [
    [0, 1, 2.5, 4],
    [0.02, 0.031, 0.04, 0.048],
  ],
};

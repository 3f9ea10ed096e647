import { concentrationToMolar, molarTo } from "kinetics-core/quantities";
import { parseNumber } from "@/app/_worksheet/typed-number/parse-number";
import { parseUncertain } from "@/app/_worksheet/typed-number/parse-uncertain";
import { typedNumber, typedUncertain } from "@/app/_worksheet/typed-number/print-typed";
import type { NewRun, RunEdit } from "@/db/run/run.commands";
import { isMixed } from "@/db/sheet/mixed-run";
import type { SheetRun, SheetSpecies } from "@/db/sheet/sheet.schema";
import type { RowEdit } from "./schema";

/**
 * A run as a row of texts and back. The same reading decides in the page, while typing, and on the server, which
 * has the last word. Only cells that changed are read, so that what nobody touched keeps every digit.
 */
export interface RowShape {
  readonly species: readonly Pick<SheetSpecies, "id" | "symbol" | "unit">[];
  /** From mol L⁻¹ s⁻¹ to the unit in which rates are shown. */
  readonly rateFactor: number;
  /** Ids of species that some stock holds: where a run has volumes, their concentrations follow from those. */
  readonly stocked: readonly string[];
}

export type Cells = Readonly<Record<string, string>>;

export const CONCENTRATION = "c:";

export function cellsOf(run: SheetRun, { species, rateFactor }: RowShape): Record<string, string> {
  const concentrations = species.map((one): [string, string] => {
    const amount = run.concentrations[one.id];
    if (amount === undefined) return [CONCENTRATION + one.id, ""];
    const value = molarTo(amount.molar, one.unit);
    const uncertain = { value, standardUncertainty: value * amount.relativeUncertainty };
    return [CONCENTRATION + one.id, typedUncertain(uncertain)];
  });
  return {
    label: run.label,
    ...Object.fromEntries(concentrations),
    temperature: run.temperatureKelvin === null ? "" : celsius(run.temperatureKelvin),
    block: run.block ?? "",
    rate:
      run.enteredRate === null
        ? ""
        : typedUncertain({
            value: run.enteredRate.molarPerSecond * rateFactor,
            standardUncertainty: (run.enteredRate.standardError ?? 0) * rateFactor,
          }),
    remark: run.remark,
  };
}

/** To a tenth at least, as thermometers are read. */
function celsius(kelvin: number): string {
  const text = typedNumber(kelvin - ZERO_CELSIUS);
  return /[.e]/.test(text) ? text : `${text}.0`;
}

export interface RowReading {
  /** By column id: what is wrong, with the way out. Empty where all cells were read. */
  readonly faults: Readonly<Record<string, string>>;
  readonly edit: RunEdit;
}

const ZERO_CELSIUS = 273.15;

/** `cells` holds the texts that changed; `before` the run as it is, null for a new one. */
export function readCells(cells: Cells, before: SheetRun | null, shape: RowShape): RowReading {
  const faults: Record<string, string> = {};
  const concentrations = { ...before?.concentrations };
  let edit: RunEdit = {};
  for (const [column, text] of Object.entries(cells)) {
    const fault = (message: string) => {
      faults[column] = message;
    };
    if (column === "label") edit = { ...edit, ...readLabel(text, fault) };
    else if (column === "temperature") edit = { ...edit, ...readTemperature(text, fault) };
    else if (column === "block") edit = { ...edit, ...readShort("block", text, 60, fault) };
    else if (column === "remark") edit = { ...edit, ...readShort("remark", text, 300, fault) };
    else if (column === "rate") edit = { ...edit, ...readRate(text, shape, fault) };
    else {
      const species = shape.species.find(({ id }) => CONCENTRATION + id === column);
      if (species === undefined) fault("This column is not part of the sheet any more. Load the page again.");
      else if (before !== null && isMixed(before) && shape.stocked.includes(species.id))
        fault(
          `[${species.symbol}]₀ of ${before.label} follows from its volumes. Change them on the mixing table.`,
        );
      else readConcentration(text, species, concentrations, fault);
    }
  }
  const touchesConcentrations = Object.keys(cells).some((column) => column.startsWith(CONCENTRATION));
  return { faults, edit: touchesConcentrations ? { ...edit, concentrations } : edit };
}

type Fault = (message: string) => void;

function readLabel(text: string, fault: Fault): RunEdit {
  const label = text.trim();
  if (label === "") fault("A run needs a label, such as R12.");
  if (label.length > 40) fault("A label has at most 40 characters.");
  return { label };
}

function readTemperature(text: string, fault: Fault): RunEdit {
  const reading = parseNumber(text);
  if (reading.status === "not-a-number") fault(reading.message);
  if (reading.status !== "number") return { temperatureKelvin: null };
  const temperatureKelvin = Number((reading.value + ZERO_CELSIUS).toPrecision(12));
  if (temperatureKelvin <= 0) fault(`${text} °C is below absolute zero.`);
  return { temperatureKelvin };
}

function readShort(field: "block" | "remark", text: string, most: number, fault: Fault): RunEdit {
  const short = text.trim();
  if (short.length > most) fault(`At most ${most} characters fit here.`);
  return field === "block" ? { block: short === "" ? null : short } : { remark: short };
}

function readRate(text: string, { rateFactor }: RowShape, fault: Fault): RunEdit {
  const reading = parseUncertain(text);
  if (reading.status === "not-readable") fault(reading.message);
  if (reading.status !== "uncertain") return { enteredRate: null };
  return {
    enteredRate: {
      molarPerSecond: reading.value / rateFactor,
      standardError: reading.standardUncertainty === 0 ? null : reading.standardUncertainty / rateFactor,
    },
  };
}

function readConcentration(
  text: string,
  species: RowShape["species"][number],
  concentrations: SheetRun["concentrations"],
  fault: Fault,
): void {
  const reading = parseUncertain(text);
  if (reading.status === "empty") {
    delete concentrations[species.id];
    return;
  }
  if (reading.status === "not-readable") {
    fault(reading.message);
    return;
  }
  const { value, standardUncertainty } = reading;
  if (value < 0) fault("A concentration is not negative.");
  else if (standardUncertainty > value) fault(`The uncertainty is larger than the concentration itself.`);
  concentrations[species.id] = {
    molar: Number(concentrationToMolar(value, species.unit).toPrecision(12)),
    relativeUncertainty: value > 0 ? Number(Math.min(1, standardUncertainty / value).toPrecision(12)) : 0,
  };
}

/** A new run from its row; faults where the row cannot become one yet. */
export function newRunOf(
  row: RowEdit,
  id: string,
  shape: RowShape,
): { faults: RowReading["faults"]; run: NewRun } {
  const { faults, edit } = readCells({ label: "", ...row.cells }, null, shape);
  return {
    faults,
    run: {
      id,
      label: edit.label ?? "",
      concentrations: edit.concentrations ?? {},
      temperatureKelvin: edit.temperatureKelvin ?? null,
      block: edit.block ?? null,
      enteredRate: edit.enteredRate ?? null,
      remark: edit.remark ?? "",
    },
  };
}

/** The label after the last: R12 after R11, and R01 to begin with. */
export function nextLabel(taken: Iterable<string>): string {
  const labels = new Set(taken);
  let highest = 0;
  let width = 2;
  let prefix = "R";
  for (const label of labels) {
    const match = /^(.*?)(\d{1,6})$/.exec(label);
    if (match && Number(match[2]) >= highest) {
      highest = Number(match[2]);
      width = match[2]?.length ?? 2;
      prefix = match[1] ?? "R";
    }
  }
  for (let next = highest + 1; ; next += 1) {
    const label = `${prefix}${String(next).padStart(width, "0")}`;
    if (!labels.has(label)) return label;
  }
}

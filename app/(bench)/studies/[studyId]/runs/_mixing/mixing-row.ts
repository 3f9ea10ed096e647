import { parseNumber } from "@/app/_worksheet/typed-number/parse-number";
import { typedNumber } from "@/app/_worksheet/typed-number/print-typed";
import type { NewRun, RunEdit } from "@/db/run/run.commands";
import type { Mixing, SheetRun } from "@/db/sheet/sheet.schema";
import { type Cells, readCells } from "../run-row";
import type { RowEdit } from "../schema";

/**
 * A run as a row of volumes and back, in the unit of the table. The same reading decides in the page, while typing, and on
 * the server. Only cells that changed are read.
 */
export interface MixingShape {
  readonly stocks: readonly { readonly id: string; readonly head: string }[];
  readonly unit: Mixing["volumeUnit"];
}

export const VOLUME = "v:";
export const MARK = "mark";
export const VOLUME_UNITS: Readonly<Record<Mixing["volumeUnit"], string>> = { uL: "µL", mL: "mL" };

const MICROLITRES: Readonly<Record<Mixing["volumeUnit"], number>> = { uL: 1, mL: 1000 };

export function volumeText(microlitre: number, unit: Mixing["volumeUnit"]): string {
  return typedNumber(microlitre / MICROLITRES[unit]);
}

export function microlitres(value: number, unit: Mixing["volumeUnit"]): number {
  return Number((value * MICROLITRES[unit]).toPrecision(12));
}

export function mixingCells(run: SheetRun, { stocks, unit }: MixingShape): Record<string, string> {
  const volumes = stocks.map(({ id }): [string, string] => {
    const volume = run.volumes[id];
    return [VOLUME + id, volume === undefined ? "" : volumeText(volume, unit)];
  });
  return {
    label: run.label,
    ...Object.fromEntries(volumes),
    [MARK]: run.markMicrolitre === null ? "" : volumeText(run.markMicrolitre, unit),
    remark: run.remark,
  };
}

export interface MixingReading {
  /** By column id: what is wrong, with the way out. */
  readonly faults: Readonly<Record<string, string>>;
  readonly edit: RunEdit;
}

const NO_CONCENTRATIONS = { species: [], rateFactor: 1, stocked: [] } as const;

/** `cells` holds the texts that changed; `before` the run as it is, null for a new one. */
export function readMixingCells(
  cells: Cells,
  before: Pick<SheetRun, "volumes"> | null,
  shape: MixingShape,
): MixingReading {
  const words = Object.entries(cells).filter(([column]) => column === "label" || column === "remark");
  const said = readCells(Object.fromEntries(words), null, NO_CONCENTRATIONS);
  const faults: Record<string, string> = { ...said.faults };
  let { edit } = said;
  const volumes = { ...before?.volumes };
  let touched = false;
  for (const [column, text] of Object.entries(cells)) {
    if (column === "label" || column === "remark") continue;
    const stock = shape.stocks.find(({ id }) => VOLUME + id === column);
    const reading = readVolume(text, shape.unit);
    if (stock === undefined && column !== MARK)
      faults[column] = "This stock is not on the list any more. Load the page again.";
    else if (reading.status === "fault") faults[column] = reading.message;
    else if (stock === undefined) {
      if (reading.microlitre === 0) faults[column] = "A mark is above 0. Empty it to follow the study's.";
      edit = { ...edit, markMicrolitre: reading.microlitre };
    } else {
      touched = true;
      if (reading.microlitre === null) delete volumes[stock.id];
      else volumes[stock.id] = reading.microlitre;
    }
  }
  return { faults, edit: touched ? { ...edit, volumes } : edit };
}

/** A new run from its row; its concentrations follow. */
export function newMixture(
  row: RowEdit,
  id: string,
  shape: MixingShape,
): { faults: MixingReading["faults"]; run: NewRun } {
  const { faults, edit } = readMixingCells({ label: "", ...row.cells }, null, shape);
  return {
    faults,
    run: {
      id,
      label: edit.label ?? "",
      concentrations: {},
      volumes: edit.volumes ?? {},
      markMicrolitre: edit.markMicrolitre ?? null,
      remark: edit.remark ?? "",
    },
  };
}

type VolumeReading =
  | { readonly status: "volume"; readonly microlitre: number | null }
  | { readonly status: "fault"; readonly message: string };

function readVolume(text: string, unit: Mixing["volumeUnit"]): VolumeReading {
  const reading = parseNumber(text);
  if (reading.status === "empty") return { status: "volume", microlitre: null };
  if (reading.status === "not-a-number") return { status: "fault", message: reading.message };
  if (reading.value < 0) return { status: "fault", message: "A volume is not negative." };
  return { status: "volume", microlitre: microlitres(reading.value, unit) };
}

import { concentrationToMolar, molarTo } from "kinetics-core/quantities";
import { parseUncertain, type TypedUncertain } from "@/app/_worksheet/typed-number/parse-uncertain";
import { typedUncertain } from "@/app/_worksheet/typed-number/print-typed";
import type { ConcentrationUnit, Mixing, Sheet, SheetStock } from "@/db/sheet/sheet.schema";
import { microlitres, volumeText } from "../_mixing/mixing-row";
import { stockUnit } from "../_mixing/stock-amounts";
import type { StockForm } from "./schema";

/** A stock as boxes of text and back, read alike in the dialog and on the server. */
export type StockReading =
  | { readonly status: "read"; readonly stock: Omit<SheetStock, "id" | "position"> }
  | { readonly status: "faults"; readonly faults: Readonly<Record<string, string>> };

type Known = Pick<Sheet, "species" | "stocks" | "mixing">;

export const EMPTY_STOCK: StockForm = {
  symbol: "",
  name: "",
  unit: "mmol/L",
  contents: {},
  fromStockId: "",
  taken: "",
  mark: "",
  lot: "",
  madeOn: "",
  howKnown: "",
};

export function stockFormOf(stock: SheetStock, unit: Mixing["volumeUnit"]): StockForm {
  const concentrationUnit = stockUnit(stock);
  const { dilution } = stock;
  const volume = (of: { value: number; standardUncertainty: number } | undefined) =>
    of === undefined
      ? ""
      : typedUncertain({
          value: Number(volumeText(of.value, unit)),
          standardUncertainty: Number(volumeText(of.standardUncertainty, unit)),
        });
  return {
    symbol: stock.symbol,
    name: stock.name,
    unit: concentrationUnit,
    contents: Object.fromEntries(
      Object.entries(stock.contents).map(([id, { value, standardUncertainty }]) => [
        id,
        typedUncertain({
          value: molarTo(value, concentrationUnit),
          standardUncertainty: molarTo(standardUncertainty, concentrationUnit),
        }),
      ]),
    ),
    fromStockId: dilution?.fromStockId ?? "",
    taken: volume(dilution?.takenMicrolitre),
    mark: volume(dilution?.markMicrolitre),
    lot: stock.lot,
    madeOn: stock.madeOn,
    howKnown: stock.howKnown,
  };
}

export function readStockForm(form: StockForm, { species, mixing }: Known): StockReading {
  const faults: Record<string, string> = {};
  const name = form.name.trim();
  if (name === "") faults.name = "A stock needs a name, such as KOH, carbonate-free.";
  const isDilution = form.fromStockId !== "";
  const contents: SheetStock["contents"] = {};
  for (const one of isDilution ? [] : species) {
    const path = `contents.${one.id}`;
    const reading = parseUncertain(form.contents[one.id] ?? "");
    if (reading.status === "empty") continue;
    const fault = amountFault(reading, "A concentration");
    if (fault !== null) faults[path] = fault;
    else if (reading.status === "uncertain")
      contents[one.id] = {
        value: molar(reading.value, form.unit),
        standardUncertainty: molar(reading.standardUncertainty, form.unit),
      };
  }
  const volume = (path: "taken" | "mark") => {
    const reading = parseUncertain(form[path]);
    const fault = amountFault(reading, "A volume");
    if (fault !== null) faults[path] = fault;
    return reading.status === "uncertain"
      ? {
          value: microlitres(reading.value, mixing.volumeUnit),
          standardUncertainty: microlitres(reading.standardUncertainty, mixing.volumeUnit),
        }
      : { value: 1, standardUncertainty: 0 };
  };
  const dilution = isDilution
    ? { fromStockId: form.fromStockId, takenMicrolitre: volume("taken"), markMicrolitre: volume("mark") }
    : null;
  if (Object.keys(faults).length > 0) return { status: "faults", faults };
  return {
    status: "read",
    stock: {
      symbol: form.symbol.trim(),
      name,
      contents,
      dilution,
      lot: form.lot.trim(),
      madeOn: form.madeOn.trim(),
      howKnown: form.howKnown.trim(),
    },
  };
}

function amountFault(reading: TypedUncertain, what: string): string | null {
  if (reading.status === "empty") return `${what} is missing. Write it as 25.0 ± 0.1.`;
  if (reading.status === "not-readable") return reading.message;
  if (reading.value <= 0) return `${what} is above 0.`;
  return reading.standardUncertainty > reading.value
    ? "The uncertainty is larger than the value itself."
    : null;
}

function molar(value: number, unit: ConcentrationUnit): number {
  return Number(concentrationToMolar(value, unit).toPrecision(12));
}

import type { MixedRow } from "kinetics-core/mixing";
import { printUncertain } from "kinetics-core/quantities";
import { concentrationDisplay } from "@/app/_worksheet/display-units";
import { mixingName } from "@/app/_worksheet/mixing/mixing-input";
import { presentRuns } from "@/app/_worksheet/present-runs";
import type { ConcentrationUnit, Sheet, SheetStock } from "@/db/sheet/sheet.schema";
import { isMedium } from "./mixture";

/** "Stock A", and a medium by its name. */
export function stockHead(stock: Pick<SheetStock, "symbol" | "name">): string {
  return stock.symbol === "" ? stock.name : `Stock ${stock.symbol}`;
}

/** The unit in which its numbers are handy. */
export function stockUnit({ contents }: Pick<SheetStock, "contents">): ConcentrationUnit {
  const most = Math.max(0, ...Object.values(contents).map(({ value }) => value));
  return most === 0 || (most >= 1e-4 && most < 0.5) ? "mmol/L" : most >= 0.5 ? "mol/L" : "umol/L";
}

/** Its concentrations as prose, a line each, led by their uncertainty: "20.02 ± 0.12 mmol L^-1". */
export function amountLines(sheet: Sheet, solution: MixedRow): string[] {
  const amounts = amountsOf(sheet, solution);
  return amounts.map(({ names, value, uncertainty }) => {
    const display = concentrationDisplay(
      stockUnit({ contents: { one: { value, standardUncertainty: uncertainty } } }),
    );
    const printed = printUncertain(value * display.factor, uncertainty * display.factor, { power: 0 });
    const number = printed.uncertainty === null ? printed.value : `${printed.value} ± ${printed.uncertainty}`;
    return `${amounts.length > 1 ? `${names.join(", ")}: ` : ""}${number} ${display.unit}`;
  });
}

interface Amount {
  readonly names: string[];
  readonly value: number;
  readonly uncertainty: number;
}

/** Concentrations of a solution; ions of one salt share a line. */
export function amountsOf({ species }: Sheet, solution: MixedRow): Amount[] {
  const amounts: Amount[] = [];
  for (const one of species) {
    const value = solution.concentrations[mixingName(one)] ?? 0;
    const uncertainty = solution.standardUncertainties[mixingName(one)] ?? 0;
    if (value === 0) continue;
    const same = amounts.find((other) => near(other.value, value) && near(other.uncertainty, uncertainty));
    const name = one.symbol || one.name || one.formula;
    if (same === undefined) amounts.push({ names: [name], value, uncertainty });
    else same.names.push(name);
  }
  return amounts;
}

function near(one: number, other: number): boolean {
  return Math.abs(one - other) <= 1e-9 * Math.abs(one);
}

/** The medium that fills mixtures up: the one that most was taken of; the only one where nothing was taken yet. */
export function mainMedium(sheet: Sheet): SheetStock | null {
  const taken = (stock: SheetStock) =>
    presentRuns(sheet).reduce((sum, run) => sum + (run.volumes[stock.id] ?? 0), 0);
  const media = sheet.stocks.filter(isMedium).toSorted((a, b) => taken(b) - taken(a));
  const [first] = media;
  return first !== undefined && (media.length === 1 || taken(first) > 0) ? first : null;
}

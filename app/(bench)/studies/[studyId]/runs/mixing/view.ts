import { type MixedRow, mixRuns } from "kinetics-core/mixing";
import { inARow, verb } from "kinetics-core/quantities";
import type { Check, CheckSeverity, StudyAnalysis } from "@/app/_worksheet/analysis";
import { percent } from "@/app/_worksheet/checks/check";
import { deliveryUncertainty, mixingInput, stockName } from "@/app/_worksheet/mixing/mixing-input";
import { presentRuns } from "@/app/_worksheet/present-runs";
import { countInWords } from "@/app/_worksheet/words";
import { isMixed } from "@/db/sheet/mixed-run";
import type { Sheet, SheetStock } from "@/db/sheet/sheet.schema";
import { VOLUME_UNITS, volumeText } from "../_mixing/mixing-row";
import { isMedium } from "../_mixing/mixture";
import { amountLines, amountsOf, mainMedium } from "../_mixing/stock-amounts";
import { dispensingFormOf } from "./dispensing-form";
import type { MixingGridView } from "./mixing-grid.view";
import type { DispensingForm, StockForm } from "./schema";
import { stockFormOf } from "./stock-form";

export interface MixingView {
  readonly title: string;
  readonly stocks: readonly StockRow[];
  /** What the stocks' own uncertainties do, "" where there are none. */
  readonly sharedNote: string;
  readonly notes: readonly MixingNote[];
  /** Mark and uncertainties of deliveries, in words. */
  readonly volumes: readonly { readonly name: string; readonly value: string }[];
  readonly dispensing: DispensingForm;
  readonly volumeUnit: string;
  readonly species: readonly SpeciesChoice[];
}

/** A species as a box of the stock dialog. */
export interface SpeciesChoice {
  readonly id: string;
  readonly label: string;
}

export interface StockRow {
  readonly stockId: string;
  readonly name: string;
  readonly symbol: string;
  readonly holds: string;
  /** Prose: what it is made of and how much; one line a concentration. */
  readonly concentrations: readonly string[];
  readonly relative: string;
  readonly lot: string;
  readonly howKnown: string;
  readonly form: StockForm;
}

export interface MixingNote {
  readonly severity: CheckSeverity;
  readonly message: string;
}

export function mixingView(sheet: Sheet, analysis: StudyAnalysis, grid: MixingGridView): MixingView {
  const stocks = sheet.stocks.toSorted((a, b) => a.position - b.position);
  const mixed = mixRuns(mixingInput(sheet, presentRuns(sheet).filter(isMixed)));
  const solutions = new Map(mixed.solutions.map((row) => [row.label, row]));
  const unit = VOLUME_UNITS[sheet.mixing.volumeUnit];
  return {
    title: titleOf(sheet, grid),
    stocks: stocks.map((stock) => {
      const solution = solutions.get(stockName(stock));
      return stockRow(sheet, stock, solution?.status === "mixed" ? solution : null);
    }),
    sharedNote: sharedNote(sheet),
    notes: [
      ...refusalNotes(grid),
      ...ionicNotes(analysis.checks),
      ...balanceNotes(mixed.solutions.filter((row) => row.status === "mixed")),
      ...deliveryNotes(sheet),
    ],
    volumes: volumeFacts(sheet),
    dispensing: dispensingFormOf(sheet.mixing),
    volumeUnit: unit,
    species: sheet.species
      .toSorted((a, b) => a.position - b.position)
      .filter(({ role }) => role !== "solvent")
      .map(({ id, symbol, name, formula }) => ({
        id,
        label: [symbol, name || formula].filter((part) => part !== "").join(", "),
      })),
  };
}

function titleOf({ stocks }: Sheet, { rows }: MixingGridView): string {
  if (stocks.length === 0) return "No stocks yet";
  const good = rows.filter(({ mixture }) => mixture.status === "mixed").length;
  const refused = refusedLabels(rows);
  if (refused.length > 0)
    return `${countInWords(good)} ${good === 1 ? "mixture adds" : "mixtures add"} up, ${inARow(refused, 4)} ${verb(refused.length, "does", "do")} not`;
  if (good === 0) return "No mixtures yet";
  return good === 1 ? "One mixture, and it adds up" : `${countInWords(good)} mixtures, all add up`;
}

function refusedLabels(rows: MixingGridView["rows"]): string[] {
  return rows.flatMap(({ mixture, cells }) => (mixture.status === "refused" ? [cells.label ?? ""] : []));
}

function stockRow(sheet: Sheet, stock: SheetStock, solution: MixedRow | null): StockRow {
  const unit = sheet.mixing.volumeUnit;
  const { dilution } = stock;
  const from = dilution === null ? undefined : sheet.stocks.find(({ id }) => id === dilution.fromStockId);
  const diluted =
    dilution === null || from === undefined
      ? ""
      : `${volumeText(dilution.takenMicrolitre.value, unit)} ${VOLUME_UNITS[unit]} of ${stockName(from)} to ${volumeText(dilution.markMicrolitre.value, unit)} ${VOLUME_UNITS[unit]}`;
  const amounts = solution === null ? [] : amountsOf(sheet, solution);
  const relatives = amounts.map(({ value, uncertainty }) => uncertainty / value);
  return {
    stockId: stock.id,
    name: stockName(stock),
    symbol: stock.symbol,
    holds: stock.name,
    concentrations: solution === null ? [] : amountLines(sheet, solution),
    relative: relatives.some((one) => one > 0)
      ? [...new Set(relatives.map((one) => (one * 100).toPrecision(2)))].join(", ")
      : "",
    lot: [stock.lot, stock.madeOn].filter((part) => part !== "").join(", "),
    howKnown: [diluted, stock.howKnown].filter((part) => part !== "").join("; "),
    form: stockFormOf(stock, unit),
  };
}

function sharedNote(sheet: Sheet): string {
  const runs = presentRuns(sheet).filter(isMixed);
  const isUncertain = (stock: SheetStock): boolean =>
    stock.dilution !== null ||
    Object.values(stock.contents).some(({ standardUncertainty }) => standardUncertainty > 0);
  const common = sheet.stocks.filter(
    (stock) => isUncertain(stock) && runs.length > 1 && runs.every((run) => (run.volumes[stock.id] ?? 0) > 0),
  );
  if (common.length === 0) return "";
  const names = inARow(common.map(stockName));
  return common.length === 1
    ? `Stock ${names} serves every mixture, so its uncertainty moves all of them together and does not average out.`
    : `Stocks ${names} serve every mixture, so their uncertainties move all of them together and do not average out.`;
}

function refusalNotes({ rows }: MixingGridView): MixingNote[] {
  const labels = refusedLabels(rows);
  if (labels.length === 0) return [];
  return [
    {
      severity: "blocks",
      message: `${inARow(labels, 4)} ${verb(labels.length, "does not add up to its mark. It", "do not add up to their marks. They")} cannot be mixed or printed until ${verb(labels.length, "it does", "they do")}.`,
    },
  ];
}

function ionicNotes(checks: readonly Check[]): MixingNote[] {
  return checks.filter(({ code }) => code === "ionic-strength-spread");
}

/** A stock whose charges do not balance makes every ionic strength below it wrong. */
function balanceNotes(solutions: readonly MixedRow[]): MixingNote[] {
  return solutions.flatMap(({ label, flags }) =>
    flags.some(({ code }) => code === "charges-unbalanced")
      ? [
          {
            severity: "weakens" as const,
            message: `The charges in stock ${label} do not balance, so that *I* is too low. Give its counter-ion too; an ion that only counts there is a spectator of Set-up.`,
          },
        ]
      : [],
  );
}

/** A delivery this uncertain, relative, is worth a weaker stock. */
const COARSE_DELIVERY = 0.01;

function deliveryNotes(sheet: Sheet): MixingNote[] {
  const { volumeUnit } = sheet.mixing;
  const coarse = presentRuns(sheet).flatMap((run) =>
    sheet.stocks.flatMap((stock) => {
      const volume = run.volumes[stock.id] ?? 0;
      if (volume === 0 || isMedium(stock)) return [];
      const relative = deliveryUncertainty(volume, sheet.mixing) / volume;
      return relative > COARSE_DELIVERY ? [{ run, stock, volume, relative }] : [];
    }),
  );
  const worst = coarse.toSorted((a, b) => b.relative - a.relative)[0];
  if (worst === undefined) return [];
  const runs = coarse.flatMap(({ run, stock, volume }) =>
    stock === worst.stock && volume === worst.volume ? [run.label] : [],
  );
  return [
    {
      severity: "note",
      message: `Stock ${stockName(worst.stock)} in ${inARow(runs, 4)} is ${volumeText(worst.volume, volumeUnit)} ${VOLUME_UNITS[volumeUnit]}, where the delivery adds ${percent(worst.relative)}. A weaker stock and a larger volume bring it down.`,
    },
  ];
}

function volumeFacts(sheet: Sheet): { name: string; value: string }[] {
  const { volumeUnit, markMicrolitre, deliveries } = sheet.mixing;
  const unit = VOLUME_UNITS[volumeUnit];
  const written = (microlitre: number) => `${volumeText(microlitre, volumeUnit)} ${unit}`;
  const filler = mainMedium(sheet);
  const small = deliveries.find(({ upToMicrolitre }) => upToMicrolitre !== null);
  const large = deliveries.find(({ upToMicrolitre }) => upToMicrolitre === null);
  return [
    {
      name: "Mark",
      value:
        markMicrolitre === null
          ? "none: a mixture is the sum of its volumes"
          : `${written(markMicrolitre)}, made up with ${filler === null ? "solvent" : stockName(filler)}`,
    },
    ...(small?.upToMicrolitre == null
      ? []
      : [{ name: `To ${written(small.upToMicrolitre)}`, value: `± ${written(small.absoluteMicrolitre)}` }]),
    {
      name: small === undefined ? "Each delivery" : "Above",
      value: large === undefined || large.relative === 0 ? "taken as exact" : `± ${percent(large.relative)}`,
    },
  ];
}

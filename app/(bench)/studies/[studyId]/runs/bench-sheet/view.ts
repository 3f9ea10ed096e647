import { mixRuns } from "kinetics-core/mixing";
import { inARow, verb } from "kinetics-core/quantities";
import type { CheckSeverity, RunMark, StudyAnalysis } from "@/app/_worksheet/analysis";
import { lawName } from "@/app/_worksheet/law-name";
import { mixingInput, stockName } from "@/app/_worksheet/mixing/mixing-input";
import { lawSpecies, presentRuns } from "@/app/_worksheet/present-runs";
import { countInWords } from "@/app/_worksheet/words";
import type { Sheet, SheetRun, SheetStock } from "@/db/sheet/sheet.schema";
import { VOLUME_UNITS, volumeText } from "../_mixing/mixing-row";
import { isMedium, mixturesOf } from "../_mixing/mixture";
import { amountLines, mainMedium, stockHead } from "../_mixing/stock-amounts";
import { measuringOrder, mostVaried } from "./measuring-order";
import type { BenchOptions } from "./options";

/** The sheet that goes to the bench: what is mixed in which order, and blanks to fill in. */
export interface BenchSheetView {
  readonly title: string;
  /** Head of the paper. */
  readonly paperTitle: string;
  /** Prose. */
  readonly conditions: string;
  readonly columns: readonly { readonly id: string; readonly head: string; readonly note: string }[];
  readonly rows: readonly BenchRow[];
  readonly stocks: readonly {
    readonly name: string;
    readonly lines: readonly string[];
    readonly lot: string;
  }[];
  readonly notes: readonly { readonly severity: CheckSeverity; readonly message: string }[];
  /** Stocks that could start the reaction, for the choice. */
  readonly starters: readonly { readonly id: string; readonly head: string }[];
  readonly startsId: string;
}

export interface BenchRow {
  readonly key: string;
  readonly label: string;
  readonly mark: RunMark | null;
  /** In the order of the columns; "" where nothing is taken. */
  readonly volumes: readonly string[];
  readonly remark: string;
}

export function benchSheetView(sheet: Sheet, analysis: StudyAnalysis, options: BenchOptions): BenchSheetView {
  const planned = presentRuns(sheet).filter(
    (run) => run.trace === null && run.enteredRate === null && run.setAside === null,
  );
  const mixtures = mixturesOf(sheet, planned);
  const ready = planned.filter((_, index) => mixtures[index]?.status === "mixed");
  const refused = planned.filter((_, index) => mixtures[index]?.status === "refused");
  const species = lawSpecies(sheet);
  const runs = measuringOrder(ready, species, options.order, options.seed);
  const stocks = inOrderOfAdding(sheet, ready, options.starts);
  const starter = stocks.at(-1);
  const unit = VOLUME_UNITS[sheet.mixing.volumeUnit];
  const marks = new Map(analysis.runs.map((run) => [run.runId, run.mark]));
  const rows = runs.map(
    (run): BenchRow => ({
      key: run.id,
      label: run.label,
      mark: marks.get(run.id) ?? null,
      volumes: stocks.map((stock) => written(sheet, run.volumes[stock.id])),
      remark: [ownMark(sheet, run), run.remark].filter((part) => part !== "").join(". "),
    }),
  );
  const blank = options.blank ? blankRow(sheet, stocks, runs[0]) : null;
  return {
    title:
      runs.length === 0
        ? "Nothing to mix yet"
        : `The bench sheet for the next ${runs.length === 1 ? "run" : `${countInWords(runs.length).toLowerCase()} runs`}`,
    paperTitle: paperTitle(runs, species.length === 0 ? null : mostVaried(runs, species), options),
    conditions: conditionsOf(sheet, starter),
    columns: stocks.map((stock, index) => ({
      id: stock.id,
      head: stockHead(stock),
      note: `${unit}${index === 0 && stocks.length > 1 ? ", first" : stock === starter ? ", starts it" : ""}`,
    })),
    rows: blank === null ? rows : [blank, ...rows],
    stocks: stocksAtHand(sheet, stocks),
    notes: [...refusedNotes(refused), ...amountNotes(sheet, stocks, runs)],
    starters: stocks
      .filter((stock) => !isMedium(stock))
      .map((stock) => ({ id: stock.id, head: stockHead(stock) })),
    startsId: starter?.id ?? "",
  };
}

/**
 * Media first, then stocks without species of the law, then the others, the largest volumes first: what is left for the end
 * is the small volume that starts the reaction.
 */
function inOrderOfAdding(sheet: Sheet, runs: readonly SheetRun[], starts: string): SheetStock[] {
  const law = new Set(lawSpecies(sheet).map(({ id }) => id));
  const holdsLaw = (stock: SheetStock): boolean => {
    const from = sheet.stocks.find(({ id }) => id === stock.dilution?.fromStockId);
    return Object.keys(stock.contents).some((id) => law.has(id)) || (from !== undefined && holdsLaw(from));
  };
  const place = (stock: SheetStock) =>
    stock.id === starts ? 3 : isMedium(stock) ? 0 : holdsLaw(stock) ? 2 : 1;
  const taken = (stock: SheetStock) => runs.reduce((sum, run) => sum + (run.volumes[stock.id] ?? 0), 0);
  return sheet.stocks
    .filter((stock) => taken(stock) > 0)
    .sort((a, b) => place(a) - place(b) || taken(b) - taken(a));
}

function written({ mixing }: Sheet, microlitre: number | undefined): string {
  return microlitre === undefined || microlitre === 0 ? "" : volumeText(microlitre, mixing.volumeUnit);
}

function ownMark({ mixing }: Sheet, { markMicrolitre }: SheetRun): string {
  return markMicrolitre === null
    ? ""
    : `To ${volumeText(markMicrolitre, mixing.volumeUnit)} ${VOLUME_UNITS[mixing.volumeUnit]}`;
}

/** The first mixture with medium in place of the stock that starts it. */
function blankRow(sheet: Sheet, stocks: readonly SheetStock[], first: SheetRun | undefined): BenchRow | null {
  const medium = mainMedium(sheet);
  const starter = stocks.at(-1);
  if (first === undefined || starter === undefined || isMedium(starter)) return null;
  const instead = first.volumes[starter.id] ?? 0;
  return {
    key: "blank",
    label: "Blank",
    mark: null,
    volumes: stocks.map((stock) => {
      if (stock === starter) return "";
      const volume = first.volumes[stock.id] ?? 0;
      return written(sheet, stock.id === medium?.id ? Number((volume + instead).toPrecision(12)) : volume);
    }),
    remark: "Zero the reading",
  };
}

function paperTitle(
  runs: readonly SheetRun[],
  varied: Sheet["species"][number] | null,
  { order, seed }: BenchOptions,
): string {
  const count = `${countInWords(runs.length)} ${runs.length === 1 ? "run" : "runs"}`;
  if (order === "random") return `${count} in random order, seed ${seed}`;
  if (order === "table" || varied === null) return count;
  return `${count}, least to most ${varied.name || lawName(varied)}`;
}

function conditionsOf({ conditions, mixing }: Sheet, starter: SheetStock | undefined): string {
  const kelvin = conditions.temperatureKelvin?.value;
  const unit = VOLUME_UNITS[mixing.volumeUnit];
  const set = [
    kelvin === undefined ? "" : `${(kelvin - 273.15).toFixed(1).replace("-", "−")} °C`,
    conditions.wavelengthNanometre === null ? "" : `${conditions.wavelengthNanometre} nm`,
    conditions.pathLengthCentimetre === null ? "" : `${conditions.pathLengthCentimetre.value} cm cell`,
    conditions.sampleIntervalSeconds === null
      ? ""
      : `one reading every ${conditions.sampleIntervalSeconds} s`,
  ].filter((part) => part !== "");
  return [
    set.length === 0 ? "" : `${set.join(", ")}.`,
    mixing.markMicrolitre === null
      ? ""
      : `Mark ${volumeText(mixing.markMicrolitre, mixing.volumeUnit)} ${unit}.`,
    starter === undefined
      ? ""
      : `Bring each mixture to temperature before ${starter.symbol === "" ? starter.name : `stock ${starter.symbol}`} starts it.`,
  ]
    .filter((part) => part !== "")
    .join(" ");
}

function stocksAtHand(sheet: Sheet, stocks: readonly SheetStock[]): BenchSheetView["stocks"] {
  const solutions = new Map(mixRuns(mixingInput(sheet, [])).solutions.map((row) => [row.label, row]));
  return stocks
    .filter((stock) => !isMedium(stock))
    .map((stock) => {
      const solution = solutions.get(stockName(stock));
      return {
        name: [stock.symbol, stock.name].filter((part) => part !== "").join(", "),
        lines: solution?.status === "mixed" ? amountLines(sheet, solution) : [],
        lot:
          stock.lot === ""
            ? stock.madeOn
            : `lot ${[stock.lot, stock.madeOn].filter((part) => part !== "").join(", ")}`,
      };
    });
}

function refusedNotes(refused: readonly SheetRun[]): BenchSheetView["notes"] {
  if (refused.length === 0) return [];
  const labels = refused.map(({ label }) => label);
  return [
    {
      severity: "blocks",
      message: `${inARow(labels, 4)} ${verb(labels.length, "does not add up and is", "do not add up and are")} not on this sheet. Correct the volumes on the mixing table.`,
    },
  ];
}

function amountNotes(
  { mixing }: Sheet,
  stocks: readonly SheetStock[],
  runs: readonly SheetRun[],
): BenchSheetView["notes"] {
  const amounts = stocks
    .filter((stock) => !isMedium(stock))
    .map((stock) => {
      const sum = runs.reduce((all, run) => all + (run.volumes[stock.id] ?? 0), 0);
      const text = volumeText(Number(sum.toPrecision(6)), mixing.volumeUnit);
      return `${text} ${VOLUME_UNITS[mixing.volumeUnit]} of ${stockName(stock)}`;
    });
  return amounts.length === 0
    ? []
    : [{ severity: "note", message: `The runs of this sheet take ${inARow(amounts)}, without rinsing.` }];
}

import type { RunMark, StudyAnalysis } from "@/app/_worksheet/analysis";
import { concentrationDisplay } from "@/app/_worksheet/display-units";
import { lawName } from "@/app/_worksheet/law-name";
import { type Preparation, stockName } from "@/app/_worksheet/mixing/mixing-input";
import { presentRuns } from "@/app/_worksheet/present-runs";
import type { Sheet, SheetRun } from "@/db/sheet/sheet.schema";
import { MARK, type MixingShape, mixingCells, VOLUME, VOLUME_UNITS } from "../_mixing/mixing-row";
import { CONCENTRATION, type Mixture, mixedSpecies, mixturesOf, STRENGTH, TOTAL } from "../_mixing/mixture";
import { stockHead } from "../_mixing/stock-amounts";

/** The mixing table: volumes in, what they come to out. */
export interface MixingGridView {
  readonly shape: MixingShape;
  /** From which the page works out a row while it is being typed. */
  readonly preparation: Preparation;
  readonly columns: readonly MixingColumn[];
  /** Measured runs first, then planned ones. */
  readonly rows: readonly MixingRow[];
  /** Over the volumes and over what follows from them; plain text, "" for none. */
  readonly volumesHead: string;
  readonly afterHead: string;
}

export interface MixingColumn {
  readonly id: string;
  /** Spoken. */
  readonly label: string;
  /** Prose. */
  readonly head: string;
  readonly unit: string;
  readonly kind: "number" | "text";
  readonly computed: boolean;
  /** Headings of a pasted block that mean this column, in lower case; a symbol counts as it is written. */
  readonly names: readonly string[];
}

export interface MixingRow {
  readonly runId: string;
  readonly mark: RunMark;
  readonly state: "standing" | "set-aside" | "without-rate";
  readonly group: "measured" | "planned";
  readonly cells: Readonly<Record<string, string>>;
  readonly mixture: Mixture;
  /** "Set aside: bubble at 6 s"; "" where it is not. */
  readonly aside: string;
}

export function mixingGridView(sheet: Sheet, analysis: StudyAnalysis): MixingGridView {
  const stocks = sheet.stocks.toSorted((a, b) => a.position - b.position);
  const shape: MixingShape = {
    stocks: stocks.map((stock) => ({ id: stock.id, head: stockHead(stock) })),
    unit: sheet.mixing.volumeUnit,
  };
  const preparation: Preparation = { stocks, mixing: sheet.mixing, species: sheet.species };
  const runs = presentRuns(sheet);
  const mixtures = mixturesOf(preparation, runs);
  const analysed = new Map(analysis.runs.map((run) => [run.runId, run]));
  const rows = runs.map((run, index): MixingRow => {
    const found = analysed.get(run.id);
    return {
      runId: run.id,
      mark: found?.mark ?? { series: "base", level: 0, levels: 1, repeat: false },
      state: found?.state ?? "without-rate",
      group: isMeasured(run) ? "measured" : "planned",
      cells: mixingCells(run, shape),
      mixture: mixtures[index] ?? { status: "empty" },
      aside: run.setAside === null ? "" : `Set aside: ${run.setAside.reason}`,
    };
  });
  const celsius = sheet.conditions.temperatureKelvin?.value;
  return {
    shape,
    preparation,
    columns: columnsOf(preparation, shape, runs),
    rows: [
      ...rows.filter(({ group }) => group === "measured"),
      ...rows.filter(({ group }) => group === "planned"),
    ],
    volumesHead: `in ${VOLUME_UNITS[shape.unit]}, each cell can be edited`,
    afterHead: celsius === undefined ? "" : `${(celsius - 273.15).toFixed(1).replace("-", "−")} °C`,
  };
}

function isMeasured(run: SheetRun): boolean {
  return run.trace !== null || run.enteredRate !== null;
}

function columnsOf(
  preparation: Preparation,
  { stocks, unit }: MixingShape,
  runs: readonly SheetRun[],
): MixingColumn[] {
  const byId = new Map(preparation.stocks.map((stock) => [stock.id, stock]));
  const typed = { kind: "number", computed: false, unit: "" } as const;
  const worked = { kind: "number", computed: true } as const;
  const species = mixedSpecies(preparation);
  return [
    { ...typed, id: "label", label: "Run", head: "Run", kind: "text", names: ["run", "label"] },
    ...stocks.map(({ id, head }): MixingColumn => {
      const stock = byId.get(id);
      const names = stock === undefined ? [] : [stockName(stock), stock.name, head].map(lower);
      return { ...typed, id: VOLUME + id, label: head, head: plainHead(head), names };
    }),
    { ...worked, id: TOTAL, label: "Total", head: "Total", unit: "", names: ["total", "sum"] },
    ...(runs.some((run) => run.markMicrolitre !== null)
      ? [{ ...typed, id: MARK, label: "Mark", head: "Mark", unit: VOLUME_UNITS[unit], names: ["mark"] }]
      : []),
    ...species.map(
      (one): MixingColumn => ({
        ...worked,
        id: CONCENTRATION + one.id,
        label: `[${lawName(one)}]₀`,
        head: `[${lawName(one)}]_0`,
        unit: concentrationDisplay(one.unit).unit,
        names: [`[${lower(lawName(one))}]`, `[${lower(lawName(one))}]0`, `[${lower(lawName(one))}]₀`],
      }),
    ),
    {
      ...worked,
      id: STRENGTH,
      label: "Ionic strength",
      head: "*I*",
      unit: "mol L^-1",
      names: ["i", "ionic strength"],
    },
    { ...typed, id: "remark", label: "Remark", head: "Remark", kind: "text", names: ["remark", "note"] },
  ];
}

/** A name is no markup. */
function plainHead(head: string): string {
  return head.replaceAll(/[*^]/g, "");
}

function lower(text: string): string {
  return text.trim().toLowerCase();
}

const UNIT_TAIL = /\s*(?:\/\s*|\bin\s+|[([]\s*)([µμu]l|ml|l)\s*[)\]]?\s*$/i;
const BARE_UNIT = /^[([]?\s*([µμu]l|ml|l)\s*[)\]]?$/i;

/** What a pasted heading names, without its unit: "Stock A (mL)" is "stock a". */
export function headingName(heading: string): string {
  return lower(heading.replace(UNIT_TAIL, "")).replace(/^(?:volume of|v of)\s+/, "");
}

/** Volumes under a heading in another unit would be wrong by a thousand and look right. */
export function volumeHeadingFault(heading: string, unit: MixingShape["unit"]): string | null {
  const said = (BARE_UNIT.exec(heading.trim()) ?? UNIT_TAIL.exec(heading))?.[1]?.toLowerCase();
  const meant = said === undefined ? null : said === "ml" ? "mL" : said === "l" ? "L" : "uL";
  if (meant === null || meant === unit) return null;
  const name = meant === "uL" ? "µL" : meant;
  return `The heading “${heading.trim()}” says ${name} and the table is in ${VOLUME_UNITS[unit]}.`;
}

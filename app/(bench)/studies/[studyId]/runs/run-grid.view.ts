import type { RunMark, StudyAnalysis } from "@/app/_worksheet/analysis";
import { concentrationDisplay, rateDisplay } from "@/app/_worksheet/display-units";
import { lawSpecies, presentRuns } from "@/app/_worksheet/present-runs";
import { isMixed, stockedSpecies } from "@/db/sheet/mixed-run";
import type { Sheet } from "@/db/sheet/sheet.schema";
import { CONCENTRATION, cellsOf, type RowShape } from "./run-row";

/** The runs as an editable grid: texts at full precision in the units that the columns name. */
export interface RunGridView {
  readonly shape: RowShape;
  readonly columns: readonly RunGridColumn[];
  readonly rows: readonly RunGridRow[];
}

export interface RunGridColumn {
  readonly id: string;
  /** Spoken. */
  readonly label: string;
  /** Prose. */
  readonly head: string;
  /** Plain text; "" for none. */
  readonly unit: string;
  readonly kind: "number" | "text";
}

export interface RunGridRow {
  readonly runId: string;
  readonly mark: RunMark;
  readonly state: "standing" | "set-aside" | "without-rate";
  readonly cells: Readonly<Record<string, string>>;
  /** Columns that follow from its volumes. */
  readonly workedOut: readonly string[];
  /** Points of its trace; "" without one. */
  readonly points: string;
}

export function runGridView(sheet: Sheet, analysis: StudyAnalysis): RunGridView {
  const species = lawSpecies(sheet);
  const rate = rateDisplay(sheet);
  const stocked = stockedSpecies(sheet.stocks);
  const shape: RowShape = {
    species: species.map(({ id, symbol, unit }) => ({ id, symbol, unit })),
    rateFactor: rate.factor,
    stocked: [...stocked],
  };
  const worked = species.flatMap(({ id }) => (stocked.has(id) ? [CONCENTRATION + id] : []));
  const analysed = new Map(analysis.runs.map((run) => [run.runId, run]));
  return {
    shape,
    columns: [
      { id: "label", label: "Run", head: "Run", unit: "", kind: "text" },
      ...species.map(
        ({ id, symbol, unit }): RunGridColumn => ({
          id: CONCENTRATION + id,
          label: `[${symbol}]₀`,
          head: `[${symbol}]_0`,
          unit: concentrationDisplay(unit).unit,
          kind: "number",
        }),
      ),
      { id: "temperature", label: "Cell temperature", head: "Cell", unit: "°C", kind: "number" },
      { id: "block", label: "Block", head: "Block", unit: "", kind: "text" },
      { id: "rate", label: "Entered rate", head: "Entered rate", unit: rate.unit, kind: "number" },
      { id: "remark", label: "Remark", head: "Remark", unit: "", kind: "text" },
    ],
    rows: presentRuns(sheet).map((run) => {
      const found = analysed.get(run.id);
      return {
        runId: run.id,
        mark: found?.mark ?? { series: "base", level: 0, levels: 1, repeat: false },
        state: found?.state ?? "without-rate",
        cells: cellsOf(run, shape),
        workedOut: isMixed(run) ? worked : [],
        points: run.trace === null ? "" : String(run.trace.points),
      };
    }),
  };
}

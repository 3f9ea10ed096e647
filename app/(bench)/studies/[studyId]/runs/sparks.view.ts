import { decimate } from "@/app/_figures/decimate";
import { type DrawableTrace, shownTrace } from "@/app/_findings/figures.view";
import type { RunMark } from "@/app/_worksheet/analysis";
import { timeDisplay } from "@/app/_worksheet/display-units";
import { presentRuns } from "@/app/_worksheet/present-runs";
import type { Sheet } from "@/db/sheet/sheet.schema";
import type { RunSheetView } from "./view";

export interface SparkView {
  readonly lines: readonly Spark[];
  /** Common to all rows, so that heights and lengths compare. */
  readonly domain: { readonly x: readonly [number, number]; readonly y: readonly [number, number] };
  /** "70 s, window marked" */
  readonly note: string;
}

export interface Spark {
  readonly runId: string;
  readonly x: readonly number[];
  readonly y: readonly number[];
  readonly window: readonly [number, number] | null;
  readonly mark: RunMark;
  readonly setAside: boolean;
  readonly label: string;
}

const SPARK_COLUMNS = 40;

/** Traces of the table's rows on common axes. */
export function sparkView(
  sheet: Sheet,
  view: RunSheetView,
  traces: ReadonlyMap<string, DrawableTrace>,
): SparkView {
  const runs = new Map(presentRuns(sheet).map((run) => [run.id, run]));
  const { factor, unit } = timeDisplay(sheet);
  const lines = view.groups
    .flatMap((group) => group.rows)
    .flatMap((row): Spark[] => {
      const run = runs.get(row.runId);
      const trace = row.traceSha256 === null ? undefined : traces.get(row.traceSha256);
      if (!run || !trace) return [];
      const shown = shownTrace(sheet, run, trace);
      const { x, y } = decimate(shown.x, shown.y, SPARK_COLUMNS);
      const window = row.windowSeconds;
      return [
        {
          runId: row.runId,
          x,
          y,
          window:
            window === null
              ? null
              : [(window[0] - run.timeZeroSeconds) * factor, (window[1] - run.timeZeroSeconds) * factor],
          mark: row.mark,
          setAside: row.state === "set-aside",
          label: `Trace of ${row.label}`,
        },
      ];
    });
  const times = extent(lines.flatMap(({ x }) => [x[0] ?? 0, x.at(-1) ?? 0]));
  const heights = extent(lines.flatMap(({ y }) => extent(y)));
  const longest = Number((times[1] - Math.min(0, times[0])).toPrecision(2));
  return {
    lines,
    domain: { x: [Math.min(0, times[0]), times[1]], y: heights },
    note: lines.length === 0 ? "\u00a0" : `${longest} ${unit}, window marked`,
  };
}

function extent(values: readonly number[]): [number, number] {
  let low = Number.POSITIVE_INFINITY;
  let high = Number.NEGATIVE_INFINITY;
  for (const value of values) {
    if (value < low) low = value;
    if (value > high) high = value;
  }
  return values.length === 0 ? [0, 1] : [low, high];
}

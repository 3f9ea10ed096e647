import { studentTFactor } from "kinetics-core/distributions";
import { estimateInitialRate } from "kinetics-core/initial-rate";
import type { RandomDraws } from "kinetics-core/random";
import { INITIAL_RATE_CELLS, type InitialRateCell } from "../grid";
import { INITIAL_RATES_BY_SHAPE, INITIAL_RATES_OVERALL } from "../limits";
import { markdownTable, percent } from "../markdown";
import type { CellResult, Outcome, Section, SectionReport } from "../section";
import { courseTo, SHAPES, shapeNamed } from "../shapes";
import { mean, median, rootMeanSquare, share } from "../statistics";

/** The rule of one trace, beside the line to 10 % conversion that is usual. */
export const initialRates: Section<InitialRateCell> = {
  name: "initial-rates",
  title: "Initial rate of one trace: coverage of the true slope by the 95 % interval",
  cells: INITIAL_RATE_CELLS,
  replicates: 1000,
  reason: "judged over all cells and by shape, each with 12,000 replicates or more",
  prepare,
  report,
};

const DURATION = 100;
const LINE_CONVERSION = 0.1;
const LEAST_LINE_POINTS = 4;

function prepare({ shape: name, conversion, readings, noise, autocorrelation }: InitialRateCell) {
  const shape = shapeNamed(name);
  const consumed = courseTo(shape, conversion, readings);
  const time = Float64Array.from({ length: readings }, (_, i) => (DURATION * i) / (readings - 1));
  const truth = shape.elapsed(conversion) / DURATION;
  const before = consumed.findIndex((x) => x > LINE_CONVERSION);
  const linePoints = Math.max(before < 0 ? readings : before, LEAST_LINE_POINTS);
  const lineWindow = [0, time[linePoints - 1] ?? 0] as const;
  const innovation = Math.sqrt(1 - autocorrelation ** 2);

  return (draws: RandomDraws): Outcome => {
    let error = draws.normal();
    const signal = consumed.map((x, i) => {
      if (i > 0) error = autocorrelation * error + innovation * draws.normal();
      return 0.1 + x + noise * error;
    });
    const found = estimateInitialRate({ time, signal }, { signalSpan: 1 });
    const byHand = estimateInitialRate({ time, signal }, { estimator: "straight", window: lineWindow });
    const line = plainLine(time, signal, linePoints);
    if (found.status !== "found" || byHand.status !== "found")
      return {
        covered: 0,
        width: Number.NaN,
        error: Number.NaN,
        line: 0,
        correlatedLine: 0,
        lineError: Number.NaN,
      };
    return {
      covered: within(found.interval, truth),
      width: (found.interval[1] - found.interval[0]) / truth,
      error: found.slope / truth - 1,
      line: Number(Math.abs(line.slope - truth) <= line.halfWidth),
      correlatedLine: within(byHand.interval, truth),
      lineError: line.slope / truth - 1,
    };
  };
}

function within([low, high]: readonly [number, number], truth: number): number {
  return Number(low <= truth && truth <= high);
}

/** Least squares with the usual error of independent residuals. */
function plainLine(time: Float64Array, signal: Float64Array, points: number) {
  const x = time.subarray(0, points);
  const y = signal.subarray(0, points);
  const meanX = mean(x);
  const meanY = mean(y);
  const squares = x.reduce((sum, t) => sum + (t - meanX) ** 2, 0);
  const slope = x.reduce((sum, t, i) => sum + (t - meanX) * ((y[i] ?? 0) - meanY), 0) / squares;
  const rest = x.reduce((sum, t, i) => sum + ((y[i] ?? 0) - meanY - slope * (t - meanX)) ** 2, 0);
  const error = Math.sqrt(rest / (points - 2) / squares);
  return { slope, halfWidth: error * studentTFactor(0.95, points - 2) };
}

const HEAD = [
  "cells",
  "coverage %",
  "mean width %",
  "RMSE %",
  "line: coverage %",
  "line, AR(1) error: coverage %",
  "line: RMSE %",
  "cells under 90 %",
  "line: cells under 90 %",
];

function report(results: readonly CellResult<InitialRateCell>[]): SectionReport {
  const tables = [
    tableBy("shape", results, ({ shape }) => shape),
    tableBy("conversion", results, ({ conversion }) => `${percent(conversion, 0)} %`),
    tableBy("readings", results, ({ readings }) => String(readings)),
    tableBy("noise", results, ({ noise }) => `${percent(noise)} %`),
    tableBy("autocorrelation", results, ({ autocorrelation }) => String(autocorrelation)),
    tableBy("all", results, () => "all"),
    worstTable(results),
  ];
  const overall = summary(results);
  const shapes = SHAPES.map(({ name }) => ({
    name,
    ...summary(results.filter(({ cell }) => cell.shape === name)),
  }));
  const failures = shapes
    .filter(({ coverage }) => !(coverage >= INITIAL_RATES_BY_SHAPE))
    .map(
      ({ name, coverage }) =>
        `${name}: ${percent(coverage)} % covered, at least ${percent(INITIAL_RATES_BY_SHAPE, 0)} %`,
    );
  if (!(overall.coverage >= INITIAL_RATES_OVERALL))
    failures.push(
      `all cells: ${percent(overall.coverage)} % covered, at least ${percent(INITIAL_RATES_OVERALL, 0)} %`,
    );
  return {
    markdown: tables.join("\n\n"),
    figures: { overall, shapes, cells: results.map((one) => ({ name: one.cell.name, ...summary([one]) })) },
    failures,
  };
}

function tableBy(
  title: string,
  results: readonly CellResult<InitialRateCell>[],
  key: (cell: InitialRateCell) => string,
): string {
  const keys = [...new Set(results.map(({ cell }) => key(cell)))];
  return markdownTable(
    [title, ...HEAD],
    keys.map((value) =>
      rowOf(
        value,
        results.filter(({ cell }) => key(cell) === value),
      ),
    ),
  );
}

/** The ten cells that are covered least. */
function worstTable(results: readonly CellResult<InitialRateCell>[]): string {
  const worst = [...results].sort((a, b) => share(a.columns.covered) - share(b.columns.covered)).slice(0, 10);
  return markdownTable(
    ["least covered", ...HEAD],
    worst.map((one) => rowOf(one.cell.name, [one])),
  );
}

function rowOf(title: string, results: readonly CellResult<InitialRateCell>[]): readonly string[] {
  const figures = summary(results);
  return [
    title,
    String(figures.cells),
    percent(figures.coverage),
    percent(figures.width),
    percent(figures.error),
    percent(figures.lineCoverage),
    percent(figures.correlatedLineCoverage),
    percent(figures.lineError),
    String(figures.under90),
    String(figures.lineUnder90),
  ];
}

/** Coverages and widths are means over cells, errors medians of the cells' root-mean-square. */
function summary(results: readonly CellResult<InitialRateCell>[]) {
  const over = (of: (result: CellResult<InitialRateCell>) => number) => Float64Array.from(results, of);
  const covered = over(({ columns }) => share(columns.covered));
  const lineCovered = over(({ columns }) => share(columns.line));
  return {
    cells: results.length,
    coverage: mean(covered),
    width: mean(over(({ columns }) => mean(columns.width))),
    error: median(over(({ columns }) => rootMeanSquare(columns.error))),
    lineCoverage: mean(lineCovered),
    correlatedLineCoverage: mean(over(({ columns }) => share(columns.correlatedLine))),
    lineError: median(over(({ columns }) => rootMeanSquare(columns.lineError))),
    under90: covered.filter((part) => part < 0.9).length,
    lineUnder90: lineCovered.filter((part) => part < 0.9).length,
  };
}

import { orderOfTrace, straightestAxisOrder } from "kinetics-core/integrated";
import type { RandomDraws } from "kinetics-core/random";
import { progressTo, simulateTrace } from "kinetics-core/simulation";
import { TRACE_ORDER_CELLS, type TraceOrderCell } from "../grid";
import { leastCovered, mostRuledOut } from "../limits";
import { markdownTable, percent } from "../markdown";
import type { CellResult, Outcome, Section, SectionReport } from "../section";
import { countOnes, mean, share } from "../statistics";

/**
 * The order of one trace among 0, 1 and 2: with an end signal that is stated with its uncertainty, with a free one, and
 * by the straightest of signal, ln signal and 1/signal, which takes the end for zero.
 */
export const traceOrder: Section<TraceOrderCell> = {
  name: "trace-order",
  title: "Order of one trace: a wrong order chosen, in per cent",
  cells: TRACE_ORDER_CELLS,
  replicates: 300,
  reason: "each replicate is eight nonlinear fits",
  prepare,
  report,
};

const READINGS = 100;
const NOISE = 0.005;
/** Standard uncertainty of the stated end, in parts of the span. */
const END_UNCERTAINTY = 0.005;

function prepare({ order, conversion, autocorrelation, end }: TraceOrderCell) {
  const course = { order, progress: progressTo(conversion, order), readings: READINGS, duration: 100 };
  return (draws: RandomDraws): Outcome => {
    const signal = { start: 1 + end, span: -1, noise: NOISE, autocorrelation };
    const trace = simulateTrace({ ...course, ...signal }, draws.normal);
    const value = end + END_UNCERTAINTY * draws.normal();
    const known = orderOfTrace({
      ...trace,
      endSignal: { kind: "known", value, standardUncertainty: END_UNCERTAINTY },
    });
    const free = orderOfTrace({ ...trace, endSignal: { kind: "free" } });
    return {
      straightest: Number(straightestAxisOrder(trace).order !== order),
      ...outcomeOf("known", known, order),
      ...outcomeOf("free", free, order),
    };
  };
}

/** A trace that gives no reading chooses nothing right. */
function outcomeOf(end: "known" | "free", result: ReturnType<typeof orderOfTrace>, order: number): Outcome {
  if (result.status !== "read")
    return {
      [`${end} wrong`]: 1,
      [`${end} shown wrong`]: 0,
      [`${end} shown right`]: 0,
      [`${end} covered`]: 0,
      [`${end} width`]: Number.NaN,
    };
  const interval = result.freeOrder.interval;
  return {
    [`${end} wrong`]: Number(result.nearest !== order),
    [`${end} shown wrong`]: Number(result.order !== null && result.order !== order),
    [`${end} shown right`]: Number(result.order === order),
    [`${end} covered`]: interval === null ? 0 : Number(interval[0] <= order && order <= interval[1]),
    [`${end} width`]: interval === null ? Number.NaN : interval[1] - interval[0],
  };
}

function report(results: readonly CellResult<TraceOrderCell>[]): SectionReport {
  const rows = results.map(({ cell, columns, replicates }) => ({
    name: cell.name,
    straightest: share(columns.straightest),
    known: ofEnd(columns, "known"),
    free: ofEnd(columns, "free"),
    failures: [
      ...(countOnes(columns["known wrong"]) > mostRuledOut(replicates) ? ["a wrong order is nearest"] : []),
      ...(countOnes(columns["known shown wrong"]) > mostRuledOut(replicates)
        ? ["a wrong order is shown"]
        : []),
      ...(countOnes(columns["known covered"]) < leastCovered(replicates)
        ? ["the free order is not covered"]
        : []),
    ],
  }));
  return {
    markdown: markdownTable(
      [
        "trace",
        "straightest axis",
        "free end: nearest",
        "free end: shown",
        "known end: nearest",
        "known end: shown",
        "known end: right and shown",
        "known end: coverage % of the free order",
        "mean width",
      ],
      rows.map(({ name, straightest, known, free, failures }) => [
        `${name}${failures.length > 0 ? " ✗" : ""}`,
        percent(straightest),
        percent(free.wrong),
        percent(free.shownWrong),
        percent(known.wrong),
        percent(known.shownWrong),
        percent(known.shownRight),
        percent(known.coverage),
        known.width.toFixed(2),
      ]),
    ),
    figures: rows,
    failures: rows.flatMap(({ name, failures, known }) =>
      failures.map(
        (failure) =>
          `${name}: ${failure} (nearest wrong ${percent(known.wrong)} %, shown wrong ${percent(known.shownWrong)} %, covered ${percent(known.coverage)} %)`,
      ),
    ),
  };
}

function ofEnd(columns: CellResult<TraceOrderCell>["columns"], end: "known" | "free") {
  return {
    wrong: share(columns[`${end} wrong`]),
    shownWrong: share(columns[`${end} shown wrong`]),
    shownRight: share(columns[`${end} shown right`]),
    coverage: share(columns[`${end} covered`]),
    width: mean(columns[`${end} width`]),
  };
}

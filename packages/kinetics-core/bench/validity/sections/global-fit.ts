import { fitGlobal, robustBeside } from "kinetics-core/global-fit";
import type { RandomDraws } from "kinetics-core/random";
import { catalysedSpeeds, simulateTrace } from "kinetics-core/simulation";
import { GLOBAL_FIT_CELLS, type GlobalFitCell } from "../grid";
import { leastCovered } from "../limits";
import { markdownTable, percent, significant } from "../markdown";
import { outcomeOf } from "../outcome-of";
import type { CellResult, Outcome, Section, SectionReport } from "../section";
import { countOnes, mean, rootMeanSquare, share } from "../statistics";

/**
 * One law fitted to all traces of a study whose rate constants scatter from run to run: v = k·aⁿ·b with b a catalyst.
 * The rule (random ln k) beside cluster-robust errors (CR2) and the pooled fit that takes every reading for independent.
 */
export const globalFit: Section<GlobalFitCell> = {
  name: "global-fit",
  title: "Global fit under scatter between runs: coverage by the 95 % interval",
  cells: GLOBAL_FIT_CELLS,
  replicates: 3000,
  reason: null,
  prepare,
  report,
};

const DESIGN = [
  { a: 1, b: 1 },
  { a: 2, b: 1 },
  { a: 1, b: 2 },
  { a: 4, b: 1 },
  { a: 1, b: 4 },
  { a: 2, b: 2 },
  { a: 4, b: 2 },
  { a: 2, b: 4 },
  { a: 1, b: 1 },
  { a: 4, b: 4 },
  { a: 2, b: 1 },
  { a: 1, b: 2 },
] as const;
const READINGS = 100;
const DURATION = 100;
const NOISE = 0.005;
const OFFSET_SCATTER = 0.02;
const SCALE_ERROR = 0.01;
const SPECIES = [
  { name: "A", stoichiometricNumber: -1 },
  { name: "B", stoichiometricNumber: 0 },
] as const;
const QUANTITIES = ["A", "B", "ln k"] as const;
type Way = "random" | "robust" | "pooled";

function prepare({ runs, order, fastest, scatter, autocorrelation }: GlobalFitCell) {
  const design = DESIGN.slice(0, runs);
  const { speeds, rateConstant } = catalysedSpeeds(design, { order, fastest, duration: DURATION });
  return (draws: RandomDraws): Outcome => {
    const traces = design.map(({ a, b }, j) => {
      const speed = rateConstant * (speeds[j] ?? 0) * Math.exp(scatter * draws.normal());
      const course = { order, progress: speed * DURATION, readings: READINGS, duration: DURATION };
      const signal = { start: a + OFFSET_SCATTER * draws.normal(), span: -a, noise: NOISE, autocorrelation };
      const trace = simulateTrace({ ...course, ...signal }, draws.normal);
      return { label: `run ${j + 1}`, concentrations: { A: a, B: b }, ...trace };
    });
    const stated = 1 + SCALE_ERROR * draws.normal();
    const fit = fitGlobal({
      species: SPECIES,
      followed: "A",
      signalPerConcentration: { value: stated, standardUncertainty: SCALE_ERROR },
      runs: traces,
      law: { orders: { A: "free", B: "free" } },
    });
    const found = fit.status === "fitted" ? fit : null;
    const robust = found === null ? null : robustBeside(found);
    const logRateConstant = Math.log(rateConstant);
    return {
      failed: Number(found === null),
      scatter: found?.betweenRunStandardDeviation ?? Number.NaN,
      ...outcomeOf("random A", found?.orders.A ?? null, order),
      ...outcomeOf("random B", found?.orders.B ?? null, 1),
      ...outcomeOf("random ln k", found?.logRateConstant ?? null, logRateConstant),
      ...outcomeOf("robust A", robust?.parameters.A ?? null, order),
      ...outcomeOf("robust B", robust?.parameters.B ?? null, 1),
      ...outcomeOf("robust ln k", robust?.logRateConstant ?? null, logRateConstant),
      ...outcomeOf("pooled A", found?.pooled.orders.A ?? null, order),
      ...outcomeOf("pooled B", found?.pooled.orders.B ?? null, 1),
      ...outcomeOf("pooled ln k", found?.pooled.logRateConstant ?? null, logRateConstant),
    };
  };
}

function report(results: readonly CellResult<GlobalFitCell>[]): SectionReport {
  const rows = results.map(({ cell, columns, replicates }) => {
    const measured = (way: Way) =>
      QUANTITIES.map((quantity) => ({
        quantity,
        coverage: share(columns[`${way} ${quantity} covered`]),
        width: mean(columns[`${way} ${quantity} width`]),
        error: rootMeanSquare(columns[`${way} ${quantity} error`]),
        failed: countOnes(columns[`${way} ${quantity} covered`]) < leastCovered(replicates),
      }));
    return {
      name: cell.name,
      random: measured("random"),
      robust: measured("robust"),
      pooled: measured("pooled"),
      scatter: mean(columns.scatter),
      failed: share(columns.failed),
    };
  });
  return {
    markdown: markdownTable(
      [
        "cell",
        "coverage % of n_A, n_B, ln k",
        "mean width",
        "RMSE",
        "CR2: coverage %",
        "pooled: coverage %",
        "pooled: mean width",
        "mean τ",
        "no fit %",
      ],
      rows.map(({ name, random, robust, pooled, scatter, failed }) => [
        name,
        random.map((one) => `${percent(one.coverage)}${one.failed ? " ✗" : ""}`).join(", "),
        random.map(({ width }) => significant(width)).join(", "),
        random.map(({ error }) => significant(error)).join(", "),
        robust.map(({ coverage }) => percent(coverage)).join(", "),
        pooled.map(({ coverage }) => percent(coverage)).join(", "),
        pooled.map(({ width }) => significant(width, 2)).join(", "),
        significant(scatter, 2),
        percent(failed, 2),
      ]),
    ),
    figures: rows,
    failures: rows.flatMap(({ name, random }) =>
      random
        .filter(({ failed }) => failed)
        .map(({ quantity, coverage }) => `${name}: ${quantity} ${percent(coverage)} % covered`),
    ),
  };
}

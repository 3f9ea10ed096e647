import type { Estimate } from "kinetics-core/quantities";
import type { RandomDraws } from "kinetics-core/random";
import { fitRateLaw } from "kinetics-core/rate-law";
import { simulateRuns } from "kinetics-core/simulation";
import { ORDERS_CELLS, type OrdersCell } from "../grid";
import { leastCovered } from "../limits";
import { markdownTable, percent, significant } from "../markdown";
import { outcomeOf } from "../outcome-of";
import type { CellResult, Outcome, Section, SectionReport } from "../section";
import { countOnes, mean, rootMeanSquare, share } from "../statistics";
import { usualIntervals } from "../usual-line-of-logarithms";

/** Orders and ln k from rates with known errors, beside what is usually done with ln v on ln c. */
export const orders: Section<OrdersCell> = {
  name: "orders",
  title: "Orders and ln k from initial rates: coverage by the 95 % interval",
  cells: ORDERS_CELLS,
  replicates: 3000,
  reason: null,
  prepare,
  report,
};

const LOG_RATE_CONSTANT = "ln k";
const WAYS = ["rule", "ordinary", "weighted"] as const;
type Way = (typeof WAYS)[number];
const TITLES: Readonly<Record<Way, string>> = {
  rule: "the rule",
  ordinary: "ordinary least squares, t",
  weighted: "weights of the rates' own errors, z",
};

function prepare({ scenario }: OrdersCell) {
  const quantities = [...scenario.species, LOG_RATE_CONSTANT];
  const truths = [...scenario.orders, Math.log(scenario.rateConstant)];
  return (draws: RandomDraws): Outcome => {
    const input = simulateRuns(scenario, draws.normal);
    const law = fitRateLaw(input);
    const usual = usualIntervals(input);
    const rule =
      law.status === "fitted"
        ? [...scenario.species.map((name) => law.orders[name] ?? null), law.logRateConstant]
        : [];
    const of = (way: Way, estimates: readonly (Estimate | null)[]) =>
      quantities.map((name, i) => outcomeOf(`${way} ${name}`, estimates[i] ?? null, truths[i] ?? Number.NaN));
    return Object.assign(
      {},
      ...of("rule", rule),
      ...of("ordinary", usual.ordinary),
      ...of("weighted", usual.weighted),
    );
  };
}

interface Measured {
  readonly quantity: string;
  /** Null where this way gives no interval in some replicates. */
  readonly coverage: number | null;
  readonly width: number;
  readonly error: number;
}

interface Row {
  readonly name: string;
  readonly group: string;
  readonly ways: Readonly<Record<Way, readonly Measured[]>>;
  /** Quantities of the rule that are covered too seldom. */
  readonly failed: readonly string[];
}

function report(results: readonly CellResult<OrdersCell>[]): SectionReport {
  const rows = results.map(rowOf);
  const replicates = results[0]?.replicates ?? 1;
  const least = leastCovered(replicates) / replicates;
  return {
    markdown: [groupTable(rows), cellTable(rows)].join("\n\n"),
    figures: rows,
    failures: rows.flatMap(({ name, ways, failed }) =>
      ways.rule
        .filter(({ quantity }) => failed.includes(quantity))
        .map(
          ({ quantity, coverage }) =>
            `${name}: ${quantity} ${percent(coverage ?? 0)} % covered, at least ${percent(least)} %`,
        ),
    ),
  };
}

function rowOf({ cell, columns, replicates }: CellResult<OrdersCell>): Row {
  const quantities = [...cell.scenario.species, LOG_RATE_CONSTANT];
  const measured = (way: Way) =>
    quantities.map((quantity) => {
      const widths = columns[`${way} ${quantity} width`];
      const always = way === "rule" || widths?.every(Number.isFinite) === true;
      return {
        quantity,
        coverage: always ? share(columns[`${way} ${quantity} covered`]) : null,
        width: mean(widths),
        error: rootMeanSquare(columns[`${way} ${quantity} error`]),
      };
    });
  return {
    name: cell.name,
    group: cell.group,
    ways: { rule: measured("rule"), ordinary: measured("ordinary"), weighted: measured("weighted") },
    failed: quantities.filter(
      (quantity) => countOnes(columns[`rule ${quantity} covered`]) < leastCovered(replicates),
    ),
  };
}

function groupTable(rows: readonly Row[]): string {
  const groups = [...new Set(rows.map(({ group }) => group))];
  return markdownTable(
    ["stated errors", "cells", ...WAYS.map((way) => `${TITLES[way]}: coverage %, mean (range); width`)],
    groups.map((group) => {
      const own = rows.filter((row) => row.group === group);
      return [group, String(own.length), ...WAYS.map((way) => coverageAndWidth(own, way))];
    }),
  );
}

/** Widths as a geometric mean of those to the rule's. */
function coverageAndWidth(rows: readonly Row[], way: Way): string {
  const given = rows.flatMap(({ ways }) =>
    ways[way].flatMap(({ coverage, width }, i) =>
      coverage === null ? [] : [{ coverage, ratio: Math.log(width / (ways.rule[i]?.width ?? Number.NaN)) }],
    ),
  );
  if (given.length === 0) return "–";
  const coverages = given.map(({ coverage }) => coverage);
  const width = Math.exp(mean(Float64Array.from(given, ({ ratio }) => ratio)));
  const average = mean(Float64Array.from(coverages));
  return `${percent(average)} (${percent(Math.min(...coverages))} to ${percent(Math.max(...coverages))}); ${width.toFixed(2)}`;
}

function cellTable(rows: readonly Row[]): string {
  return markdownTable(
    ["cell", "coverage % of orders, ln k", "mean width", "RMSE"],
    rows.map(({ name, ways: { rule }, failed }) => [
      name,
      rule
        .map(({ quantity, coverage }) => `${percent(coverage ?? 0)}${failed.includes(quantity) ? " ✗" : ""}`)
        .join(", "),
      rule.map(({ width }) => significant(width)).join(", "),
      rule.map(({ error }) => significant(error)).join(", "),
    ]),
  );
}

import type { RandomDraws } from "kinetics-core/random";
import { fitRateLaw } from "kinetics-core/rate-law";
import { simulateRuns } from "kinetics-core/simulation";
import { ORDERS_CELLS, type OrdersCell } from "../grid";
import { leastCovered } from "../limits";
import { markdownTable, percent, significant } from "../markdown";
import { outcomeOf } from "../outcome-of";
import type { CellResult, Outcome, Section, SectionReport } from "../section";
import { countOnes, mean, rootMeanSquare, share } from "../statistics";

/** Orders and ln k from rates with known errors. */
export const orders: Section<OrdersCell> = {
  name: "orders",
  title: "Orders and ln k from initial rates: coverage by the 95 % interval",
  cells: ORDERS_CELLS,
  replicates: 3000,
  reason: null,
  prepare: ({ scenario }) => {
    const quantities = [...scenario.species, LOG_RATE_CONSTANT];
    return (draws: RandomDraws): Outcome => {
      const law = fitRateLaw(simulateRuns(scenario, draws.normal));
      return Object.assign(
        {},
        ...quantities.map((name, i) => {
          const truth = scenario.orders[i] ?? Math.log(scenario.rateConstant);
          const estimate =
            law.status !== "fitted"
              ? null
              : name === LOG_RATE_CONSTANT
                ? law.logRateConstant
                : law.orders[name];
          return outcomeOf(name, estimate ?? null, truth);
        }),
      );
    };
  },
  report,
};

const LOG_RATE_CONSTANT = "ln k";

function report(results: readonly CellResult<OrdersCell>[]): SectionReport {
  const rows = results.map((result) => ({
    name: result.cell.name,
    group: result.cell.group,
    quantities: [...result.cell.scenario.species, LOG_RATE_CONSTANT].map((quantity) => ({
      quantity,
      coverage: share(result.columns[`${quantity} covered`]),
      width: mean(result.columns[`${quantity} width`]),
      error: rootMeanSquare(result.columns[`${quantity} error`]),
      failed: countOnes(result.columns[`${quantity} covered`]) < leastCovered(result.replicates),
    })),
  }));
  const least = leastCovered(results[0]?.replicates ?? 1) / (results[0]?.replicates ?? 1);
  return {
    markdown: `${groupTable(rows)}\n\n${markdownTable(
      ["cell", "coverage % of orders, ln k", "mean width", "RMSE"],
      rows.map(({ name, quantities }) => [
        name,
        quantities.map(({ coverage, failed }) => `${percent(coverage)}${failed ? " ✗" : ""}`).join(", "),
        quantities.map(({ width }) => significant(width)).join(", "),
        quantities.map(({ error }) => significant(error)).join(", "),
      ]),
    )}`,
    figures: rows,
    failures: rows.flatMap(({ name, quantities }) =>
      quantities
        .filter(({ failed }) => failed)
        .map(
          ({ quantity, coverage }) =>
            `${name}: ${quantity} ${percent(coverage)} % covered, at least ${percent(least)} %`,
        ),
    ),
  };
}

type Row = {
  readonly group: string;
  readonly quantities: readonly { readonly quantity: string; readonly coverage: number }[];
};

function groupTable(rows: readonly Row[]): string {
  const groups = [...new Set(rows.map(({ group }) => group))];
  return markdownTable(
    ["stated errors", "cells", "orders: coverage %, mean (range)", "ln k: coverage %, mean (range)"],
    groups.map((group) => {
      const own = rows.filter((row) => row.group === group).flatMap(({ quantities }) => quantities);
      const isLevel = ({ quantity }: { quantity: string }) => quantity === LOG_RATE_CONSTANT;
      return [
        group,
        String(rows.filter((row) => row.group === group).length),
        rangeOf(own.filter((one) => !isLevel(one)).map(({ coverage }) => coverage)),
        rangeOf(own.filter(isLevel).map(({ coverage }) => coverage)),
      ];
    }),
  );
}

export function rangeOf(parts: readonly number[]): string {
  const average = mean(Float64Array.from(parts));
  return `${percent(average)} (${percent(Math.min(...parts))} to ${percent(Math.max(...parts))})`;
}

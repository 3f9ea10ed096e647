import type { SharedUncertainty } from "kinetics-core/rate-law";
import { labelOf, type Scenario } from "kinetics-core/simulation";
import { SHAPES, type ShapeName } from "./shapes";

/** Every cell of the simulations: what is varied, and nothing of how it is measured. */

export interface InitialRateCell {
  readonly name: string;
  readonly shape: ShapeName;
  /** Part consumed at the last reading. */
  readonly conversion: number;
  readonly readings: number;
  /** Standard deviation of a reading, in parts of the span. */
  readonly noise: number;
  readonly autocorrelation: number;
}

const QUIET = { noise: 0.002, autocorrelation: 0 };
const NOISY = { noise: 0.01, autocorrelation: 0.6 };

/** All shapes at three conversions, two lengths and two noises, and first order over noise and autocorrelation. */
export const INITIAL_RATE_CELLS: readonly InitialRateCell[] = [
  ...SHAPES.flatMap(({ name: shape }) =>
    [0.1, 0.4, 0.8].flatMap((conversion) =>
      [40, 160].flatMap((readings) =>
        [QUIET, NOISY].map((noise) => initialRateCell({ shape, conversion, readings, ...noise })),
      ),
    ),
  ),
  ...[0.002, 0.01, 0.03].flatMap((noise) =>
    [0, 0.6, 0.9].map((autocorrelation) =>
      initialRateCell({ shape: "order 1", conversion: 0.6, readings: 120, noise, autocorrelation }),
    ),
  ),
];

function initialRateCell(cell: Omit<InitialRateCell, "name">): InitialRateCell {
  const { shape, conversion, readings, noise, autocorrelation } = cell;
  return {
    name: `${shape}, ${100 * conversion} % conversion, ${readings} readings, noise ${100 * noise} %, ρ ${autocorrelation}`,
    ...cell,
  };
}

export interface StudyRuleCell {
  readonly name: string;
  /** Order in the reactant that is followed; the other species is a catalyst of order 1. */
  readonly order: number;
  /** Conversion of the fastest run at the last reading. */
  readonly fastest: number;
  readonly readings: number;
  readonly noise: number;
}

export const STUDY_RULE_CELLS: readonly StudyRuleCell[] = [16, 24, 120].flatMap((readings) =>
  [0.002, 0.01].flatMap((noise) =>
    [1, 2].flatMap((order) =>
      [0.4, 0.8].map((fastest) => ({
        name: `${readings} readings, noise ${100 * noise} %, order ${order}, fastest to ${100 * fastest} %`,
        order,
        fastest,
        readings,
        noise,
      })),
    ),
  ),
);

export interface GlobalFitCell {
  readonly name: string;
  readonly runs: number;
  /** Order in the reactant A that is followed; the catalyst B has order 1. */
  readonly order: number;
  /** Conversion of the fastest run at the last reading. */
  readonly fastest: number;
  /** Standard deviation of ln k between runs. */
  readonly scatter: number;
  readonly autocorrelation: number;
}

/** 100 readings a run, a noise of 0.5 % of the least span, offsets of their own, a scale stated to 1 %. */
export const GLOBAL_FIT_CELLS: readonly GlobalFitCell[] = [
  ...[6, 8, 12].flatMap((runs) =>
    [0.4, 0.8].flatMap((fastest) =>
      [0, 0.01, 0.04, 0.1].flatMap((scatter) =>
        [0, 0.6].map((autocorrelation) =>
          globalFitCell({ runs, order: 1, fastest, scatter, autocorrelation }),
        ),
      ),
    ),
  ),
  ...[0.5, 2].flatMap((order) =>
    [6, 12].flatMap((runs) =>
      [0.4, 0.8].map((fastest) =>
        globalFitCell({ runs, order, fastest, scatter: 0.04, autocorrelation: 0.6 }),
      ),
    ),
  ),
];

function globalFitCell(cell: Omit<GlobalFitCell, "name">): GlobalFitCell {
  const { runs, order, fastest, scatter, autocorrelation } = cell;
  return {
    name: `${runs} runs, order ${order}, fastest to ${100 * fastest} %, scatter ${100 * scatter} %, ρ ${autocorrelation}`,
    ...cell,
  };
}

/** Laws that compete in every cell of the readings. */
export type LawName = "simple" | "power" | "saturating" | "inhibited" | "background";

export interface ReadingsCell {
  readonly name: string;
  readonly truth: LawName;
  readonly runs: number;
  /** Standard deviation of ln v between runs. */
  readonly scatter: number;
}

export const READINGS_CELLS: readonly ReadingsCell[] = (
  ["simple", "power", "saturating", "inhibited", "background"] as const
).flatMap((truth) =>
  [7, 14].flatMap((runs) =>
    [0.02, 0.05].map((scatter) => ({
      name: `${truth}, ${runs} runs, scatter ${100 * scatter} %`,
      truth,
      runs,
      scatter,
    })),
  ),
);

export interface TraceOrderCell {
  readonly name: string;
  readonly order: number;
  readonly conversion: number;
  readonly autocorrelation: number;
  /** Signal after the reaction, in parts of the span: what the straightest axis takes for zero. */
  readonly end: number;
}

/** 100 readings with a noise of 0.5 % of the span. */
export const TRACE_ORDER_CELLS: readonly TraceOrderCell[] = [0, 1, 2].flatMap((order) =>
  [0.6, 0.9].flatMap((conversion) =>
    [0, 0.5, 0.8].flatMap((autocorrelation) =>
      [0, 0.25].map((end) => ({
        name: `order ${order}, ${100 * conversion} % conversion, ρ ${autocorrelation}, end signal at ${100 * end} % of the span`,
        order,
        conversion,
        autocorrelation,
        end,
      })),
    ),
  ),
);

export interface OrdersCell {
  readonly name: string;
  /** Row of the table. */
  readonly group: string;
  readonly scenario: Scenario;
  /** What is stated differs from what is true, so the bound does not apply; printed with the reason. */
  readonly departure?: string;
}

/** Two species, levels in powers of two: series of A, of B, and runs off both. */
const RECIPES: readonly (readonly number[])[] = [
  [0.01, 0.02],
  [0.02, 0.02],
  [0.01, 0.04],
  [0.04, 0.02],
  [0.01, 0.08],
  [0.08, 0.02],
  [0.02, 0.04],
  [0.01, 0.02],
  [0.04, 0.08],
  [0.02, 0.08],
  [0.08, 0.08],
  [0.04, 0.04],
];
const RUN_NUMBERS = [4, 5, 6, 8, 12, 24];
const base = { species: ["A", "B"], orders: [1, 0.5], rateConstant: 0.3 };

function recipesOf(runs: number): readonly (readonly number[])[] {
  return Array.from({ length: runs }, (_, j) => RECIPES[j % RECIPES.length] ?? []);
}

/** Relative standard errors of the rates, run by run. */
const UNEVENNESS: readonly { readonly title: string; readonly error: (run: number) => number }[] = [
  { title: "no errors stated", error: () => 0 },
  { title: "1 % each", error: () => 0.01 },
  { title: "from 0.5 to 6 %", error: (j) => 0.005 * 12 ** ((j % 4) / 3) },
  { title: "a third at 10 %, the others at 1 %", error: (j) => (j % 3 === 0 ? 0.1 : 0.01) },
];

const byNumberAndUnevenness: readonly OrdersCell[] = RUN_NUMBERS.flatMap((runs) =>
  UNEVENNESS.flatMap(({ title, error }) =>
    [0, 0.02, 0.1].flatMap((scatter) => {
      const recipes = recipesOf(runs);
      const rateErrors = recipes.map((_, j) => error(j));
      // Without scatter and without errors the table is exact, and there is nothing to cover.
      if (scatter === 0 && title === "no errors stated") return [];
      return [
        {
          name: `${runs} runs, ${title}, scatter ${100 * scatter} %`,
          group: title,
          scenario: { ...base, recipes, scatter, rateErrors },
        },
      ];
    }),
  ),
);

function special(group: string, title: string, runs: number, scenario: Partial<Scenario>): OrdersCell {
  const recipes = scenario.recipes ?? recipesOf(runs);
  const plain = { ...base, recipes, scatter: 0.02, rateErrors: recipes.map(() => 0.01) };
  return { name: `${runs} runs, ${title}`, group, scenario: { ...plain, ...scenario } };
}

/** Errors of all runs, or of the runs below a concentration of B, as a chain of dilutions leaves them. */
function stocks(relative: number): readonly SharedUncertainty[] {
  return [
    { species: ["A"], relative },
    { species: ["B"], relative },
    { species: [], onRate: true, relative: 0.015 },
  ];
}
function dilutions(runs: number, relative: number): readonly SharedUncertainty[] {
  return [0.08, 0.04].map((limit) => ({
    species: ["B"],
    relative,
    runs: recipesOf(runs).flatMap((row, j) => ((row[1] ?? 0) < limit ? [labelOf(j)] : [])),
  }));
}

const threeSpecies: Partial<Scenario> = {
  species: ["A", "B", "C"],
  orders: [1, 1, -0.5],
  recipes: Array.from({ length: 12 }, (_, j) => [
    0.01 * 2 ** (j % 3),
    0.02 * 2 ** (Math.floor(j / 3) % 2),
    0.005 * 2 ** (Math.floor(j / 2) % 3),
  ]),
};

const specials: readonly OrdersCell[] = [
  ...[6, 12].flatMap((runs) => [
    special("stocks", "stocks of 2 %, rate scale of 1.5 %", runs, { shared: stocks(0.02) }),
    special("stocks", "stocks of 5 %, rate scale of 1.5 %", runs, { shared: stocks(0.05) }),
    special("dilution chains", "dilution of B, 2 % a step", runs, { shared: dilutions(runs, 0.02) }),
    special("dilution chains", "dilution of B, 2 % a step, scatter 0.5 %", runs, {
      shared: dilutions(runs, 0.02),
      scatter: 0.005,
      rateErrors: recipesOf(runs).map(() => 0.005),
    }),
    special("pipetting", "pipetting of 1 %", runs, { pipetting: 0.01 }),
    special("pipetting", "pipetting of 3 %, scatter 0.5 %", runs, { pipetting: 0.03, scatter: 0.005 }),
    special("rate scale", "a third at 35 %, the others at 3 %", runs, {
      rateErrors: recipesOf(runs).map((_, j) => (j % 3 === 0 ? 0.35 : 0.03)),
    }),
    special("rate scale", "25 % each", runs, { rateErrors: recipesOf(runs).map(() => 0.25) }),
    special("rate scale", "from 1 to 30 %", runs, {
      rateErrors: recipesOf(runs).map((_, j) => 0.01 * 30 ** ((j % 4) / 3)),
    }),
  ]),
  ...[0.01, 0.05].map((scatter) =>
    special("three species", `three species, scatter ${100 * scatter} %`, 12, {
      ...threeSpecies,
      scatter,
      rateErrors: Array.from({ length: 12 }, () => 0.01),
    }),
  ),
  special("blocks", "three days of 4 %", 12, {
    blocks: recipesOf(12).map((_, j) => `day ${1 + (j % 3)}`),
    blockScatter: 0.04,
  }),
];

export const ORDERS_CELLS: readonly OrdersCell[] = [...byNumberAndUnevenness, ...specials];

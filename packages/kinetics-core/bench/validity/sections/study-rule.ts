import {
  chooseFromSurveys,
  estimateInitialRate,
  type StudyRule,
  type StudyRuleChoice,
  surveyTrace,
  type TraceSurvey,
} from "kinetics-core/initial-rate";
import type { RandomDraws } from "kinetics-core/random";
import { fitRateLaw } from "kinetics-core/rate-law";
import { catalysedRecipes, catalysedSpeeds, simulateTrace } from "kinetics-core/simulation";
import { STUDY_RULE_CELLS, type StudyRuleCell } from "../grid";
import { leastCovered, STUDIES_BY_DESIGN, STUDIES_OVERALL } from "../limits";
import { markdownTable, percent, significant } from "../markdown";
import { outcomeOf } from "../outcome-of";
import type { CellResult, Outcome, Section, SectionReport } from "../section";
import { mean, rootMeanSquare, share } from "../statistics";

/**
 * From traces to orders: v = k·aⁿ·b with b a catalyst, nine runs that differ in conversion and carry 3 % of scatter in
 * k. The rule of the study judged by the error of the member it reports, beside the same rule judged by the lower
 * member, and beside a line over one window of the clock.
 */
export const studyRule: Section<StudyRuleCell> = {
  name: "study-rule",
  title: "From traces to orders: one rule for all runs, judged by its upper or its lower member",
  cells: STUDY_RULE_CELLS,
  replicates: 600,
  reason: "a study is nine traces under every rule",
  prepare,
  report,
};

const DURATION = 100;
const RUN_SCATTER = 0.03;
const AUTOCORRELATION = 0.3;
const WAYS = ["upper", "lower", "clock"] as const;
type Way = (typeof WAYS)[number];
const TITLES: Readonly<Record<Way, string>> = {
  upper: "upper (the rule)",
  lower: "lower",
  clock: "line on one clock window",
};
const QUANTITIES = ["a", "b", "ln k"] as const;

function prepare({ order, fastest, readings, noise }: StudyRuleCell) {
  const { speeds, rateConstant } = catalysedSpeeds(catalysedRecipes, { order, fastest, duration: DURATION });
  return (draws: RandomDraws): Outcome => {
    const traces = catalysedRecipes.map(({ a }, j) => {
      const speed = rateConstant * (speeds[j] ?? 0) * Math.exp(RUN_SCATTER * draws.normal());
      const course = {
        order,
        progress: speed * DURATION,
        readings,
        duration: DURATION,
        start: 0.05,
        span: a,
      };
      return simulateTrace({ ...course, noise, autocorrelation: AUTOCORRELATION }, draws.normal);
    });
    const surveys = traces.map((trace, j) =>
      surveyTrace({ label: `run ${j + 1}`, trace, timeZero: 0, signalSpan: catalysedRecipes[j]?.a ?? null }),
    );
    const choice = chooseFromSurveys(surveys);
    const clock = traces.map((trace) => {
      const found = estimateInitialRate(trace, { estimator: "straight", window: [0, DURATION / 2] });
      return found.status === "found" ? { slope: found.slope, standardError: found.standardError } : null;
    });
    return Object.assign(
      {},
      law("upper", choice && ratesUnder(choice.rule, surveys), order, rateConstant),
      law("lower", choice && ratesUnder(judgedByLower(choice, surveys), surveys), order, rateConstant),
      law("clock", clock, order, rateConstant),
    );
  };
}

type Slope = { readonly slope: number; readonly standardError: number } | null;

/** A survey holds the rate of its run under every rule. */
function ratesUnder(rule: StudyRule, surveys: readonly TraceSurvey[]): readonly Slope[] {
  return surveys.map(({ rules }) => {
    const own = rules.find((one) => one.conversionEnd === rule.conversionEnd && one.pair === rule.pair);
    return own === undefined ? null : { slope: own.upperSlope, standardError: own.upperStandardError };
  });
}

/** 1/Σu_j⁻² + 4(Σu_j⁻²δ_j/Σu_j⁻²)² with the lower member's u_j in both terms, over the same candidates. */
function judgedByLower({ compared }: StudyRuleChoice, surveys: readonly TraceSurvey[]): StudyRule {
  const criterion = (rule: StudyRule) => {
    let weights = 0;
    let biases = 0;
    for (const { rules } of surveys) {
      const own = rules.find((one) => one.conversionEnd === rule.conversionEnd && one.pair === rule.pair);
      if (own === undefined) continue;
      const weight = (own.upperSlope / own.lowerStandardError) ** 2;
      weights += weight;
      biases += (weight * (own.lowerSlope - own.upperSlope)) / own.upperSlope;
    }
    return 1 / weights + 4 * (biases / weights) ** 2;
  };
  return compared.reduce((best, rule) => (criterion(rule) < criterion(best) ? rule : best));
}

function law(
  way: (typeof WAYS)[number],
  rates: readonly Slope[] | null,
  order: number,
  rateConstant: number,
) {
  const fit =
    rates &&
    fitRateLaw({
      species: ["a", "b"],
      runs: rates.flatMap((rate, j) => {
        const recipe = catalysedRecipes[j];
        if (rate === null || recipe === undefined) return [];
        const own = { rate: rate.slope, rateStandardError: rate.standardError };
        return [{ label: `run ${j + 1}`, concentrations: { a: recipe.a, b: recipe.b }, ...own }];
      }),
    });
  const found = fit?.status === "fitted" ? fit : null;
  return {
    ...outcomeOf(`${way} a`, found?.orders.a ?? null, order),
    ...outcomeOf(`${way} b`, found?.orders.b ?? null, 1),
    ...outcomeOf(`${way} ln k`, found?.logRateConstant ?? null, Math.log(rateConstant)),
  };
}

interface Row {
  readonly name: string;
  readonly ways: Readonly<Record<Way, readonly Measured[]>>;
}
interface Measured {
  readonly quantity: string;
  readonly coverage: number;
  readonly width: number;
  readonly error: number;
}

function report(results: readonly CellResult<StudyRuleCell>[]): SectionReport {
  const rows: readonly Row[] = results.map(({ cell, columns }) => {
    const measured = (way: Way) =>
      QUANTITIES.map((quantity) => ({
        quantity,
        coverage: share(columns[`${way} ${quantity} covered`]),
        width: mean(columns[`${way} ${quantity} width`]),
        error: rootMeanSquare(columns[`${way} ${quantity} error`]),
      }));
    return {
      name: cell.name,
      ways: { upper: measured("upper"), lower: measured("lower"), clock: measured("clock") },
    };
  });
  const heads = WAYS.map((way) => TITLES[way]);
  const each = (print: (one: Measured) => string) =>
    rows.map((row) => [row.name, ...WAYS.map((way) => row.ways[way].map(print).join(", "))]);
  const overall = Object.fromEntries(WAYS.map((way) => [way, summary(rows, way)]));
  return {
    markdown: [
      markdownTable(
        [
          "all designs",
          "coverage % of orders",
          "coverage % of ln k",
          "geometric mean of RMSE to that of the rule",
        ],
        WAYS.map((way) => {
          const { orders, logRateConstant, error } = summary(rows, way);
          return [TITLES[way], percent(orders), percent(logRateConstant), significant(error)];
        }),
      ),
      markdownTable(
        ["coverage % of n_a, n_b, ln k", ...heads],
        each(({ coverage }) => percent(coverage)),
      ),
      markdownTable(
        ["RMSE of n_a, n_b, ln k", ...heads],
        each(({ error }) => significant(error)),
      ),
      markdownTable(
        ["mean width of n_a, n_b, ln k", ...heads],
        each(({ width }) => significant(width)),
      ),
    ].join("\n\n"),
    figures: { overall, designs: rows },
    failures: failuresOf(rows, results[0]?.replicates ?? 1),
  };
}

/** Coverage of orders and ln k over all designs, and by what factor errors exceed those of the rule. */
function summary(rows: readonly Row[], way: Way) {
  const all = rows.flatMap((row) =>
    row.ways[way].map((one, i) => ({ ...one, rule: row.ways.upper[i]?.error ?? 0 })),
  );
  const isLevel = ({ quantity }: Measured) => quantity === "ln k";
  const meanCoverage = (some: readonly Measured[]) =>
    mean(Float64Array.from(some, ({ coverage }) => coverage));
  return {
    orders: meanCoverage(all.filter((one) => !isLevel(one))),
    logRateConstant: meanCoverage(all.filter(isLevel)),
    both: meanCoverage(all),
    error: Math.exp(mean(Float64Array.from(all, ({ error, rule }) => Math.log(error / rule)))),
  };
}

function failuresOf(rows: readonly Row[], replicates: number): readonly string[] {
  const least = leastCovered(replicates, STUDIES_BY_DESIGN) / replicates;
  const { both } = summary(rows, "upper");
  const overall =
    both >= STUDIES_OVERALL
      ? []
      : [`all designs: ${percent(both)} % covered, at least ${percent(STUDIES_OVERALL, 0)} %`];
  return [
    ...overall,
    ...rows.flatMap(({ name, ways }) =>
      ways.upper
        .filter(({ coverage }) => !(coverage >= least))
        .map(
          ({ quantity, coverage }) =>
            `${name}: ${quantity} ${percent(coverage)} % covered, at least ${percent(least)} %`,
        ),
    ),
  ];
}

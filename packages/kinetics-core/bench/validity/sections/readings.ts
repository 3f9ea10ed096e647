import { type CandidateRun, compareLaws, fitCandidateOnRates, type Reading } from "kinetics-core/comparison";
import type { RandomDraws } from "kinetics-core/random";
import {
  backgroundEquation,
  equationValue,
  inhibitedEquation,
  powerEquation,
  type RateEquation,
  saturatingEquation,
} from "kinetics-core/rate-equation";
import { type LawName, READINGS_CELLS, type ReadingsCell } from "../grid";
import { mostRuledOut } from "../limits";
import { markdownTable, percent } from "../markdown";
import type { CellResult, Outcome, Section, SectionReport } from "../section";
import { countOnes, share } from "../statistics";

/** How candidate laws are read: the true one ruled out, wrong ones ruled out, and what stands. */
export const readings: Section<ReadingsCell> = {
  name: "readings",
  title: "Readings of candidate rate laws",
  cells: READINGS_CELLS,
  replicates: 1000,
  reason: "a replicate is five laws, each fitted anew without every run and profiled",
  prepare,
  report,
};

/** Series in A, in the catalyst C and in added product P, each about a base recipe that is repeated. mol/L. */
const RECIPES: readonly Readonly<Record<"A" | "C" | "P", number>>[] = [
  { A: 0.01, C: 0.001, P: 0 },
  { A: 0.0025, C: 0.001, P: 0 },
  { A: 0.04, C: 0.001, P: 0 },
  { A: 0.01, C: 0.004, P: 0 },
  { A: 0.01, C: 0.001, P: 0.04 },
  { A: 0.01, C: 0.001, P: 0 },
  { A: 0.02, C: 0.001, P: 0 },
  { A: 0.01, C: 0.002, P: 0 },
  { A: 0.01, C: 0.001, P: 0.02 },
  { A: 0.04, C: 0.004, P: 0 },
  { A: 0.005, C: 0.001, P: 0 },
  { A: 0.0025, C: 0.004, P: 0.01 },
  { A: 0.01, C: 0.0005, P: 0 },
  { A: 0.04, C: 0.001, P: 0.04 },
];

const catalyst = { species: "C", order: 1 };
const reactant = { species: "A", order: 1 };

/**
 * Every law with the parameters that it has as the truth. The simple law is the limit of all others but none of them
 * needs what it adds; each of the others is wrong for any other truth.
 */
const LAWS: Readonly<
  Record<LawName, { readonly equation: RateEquation; readonly truth: readonly number[] }>
> = {
  simple: { equation: powerEquation(["A", "C"], [1, 1]), truth: [] },
  power: { equation: powerEquation(["A", "C"]), truth: [1.5, 0.5] },
  saturating: { equation: saturatingEquation({ saturating: "A", others: [catalyst] }), truth: [0.02] },
  inhibited: {
    equation: inhibitedEquation({ uninhibited: [reactant, catalyst], inhibitor: "P" }),
    truth: [30],
  },
  background: {
    equation: backgroundEquation({ main: [reactant, catalyst], background: [reactant] }),
    truth: [0.0005],
  },
};
const NAMES: readonly LawName[] = ["simple", "power", "saturating", "inhibited", "background"];

function prepare({ truth, runs, scatter }: ReadingsCell) {
  const { equation, truth: parameters } = LAWS[truth];
  const recipes = RECIPES.slice(0, runs);
  const rates = recipes.map((recipe) => rateOf(equation, parameters, recipe));
  return (draws: RandomDraws): Outcome => {
    const measured = recipes.map(
      (concentrations, j): CandidateRun => ({
        label: `run ${j + 1}`,
        concentrations,
        rate: (rates[j] ?? 0) * Math.exp(scatter * draws.normal()),
        weight: 1,
      }),
    );
    const { laws } = compareLaws({
      runs: measured.map(({ label, weight }) => ({ label, weight })),
      candidates: NAMES.map((name) => fitCandidateOnRates(LAWS[name].equation, measured, name)),
    });
    return Object.fromEntries(
      laws.flatMap(({ id, reading }) =>
        READINGS.map((one) => [`${id} ${one}`, Number(reading === one)] as const),
      ),
    );
  };
}

const READINGS = [
  "ruled-out",
  "not-needed",
  "standing",
  "undecided",
  "close",
  "too-few-runs",
  "not-compared",
] as const satisfies readonly Reading[];

function rateOf(
  equation: RateEquation,
  parameters: readonly number[],
  recipe: Readonly<Record<string, number>>,
) {
  const value = equationValue(equation);
  const concentrations = Float64Array.from(equation.species, (name) => recipe[name] ?? 0);
  if (!equation.evaluate(concentrations, Float64Array.from(parameters), value))
    throw new RangeError(`${equation.law} has no rate at a recipe of the grid`);
  return value.f;
}

function report(results: readonly CellResult<ReadingsCell>[]): SectionReport {
  const rows = results.map(({ cell, columns, replicates }) => {
    const of = (law: LawName, reading: Reading) => share(columns[`${law} ${reading}`]);
    const wrong = NAMES.filter((law) => law !== cell.truth);
    return {
      name: cell.name,
      truth: cell.truth,
      trueRuledOut: of(cell.truth, "ruled-out"),
      trueStanding: of(cell.truth, "standing"),
      trueNotNeeded: of(cell.truth, "not-needed"),
      undecided: of(cell.truth, "undecided"),
      others: wrong.map((law) => ({
        law,
        ruledOut: of(law, "ruled-out"),
        notNeeded: of(law, "not-needed"),
        open: of(law, "undecided") + of(law, "close"),
      })),
      wrongStanding: wrong.reduce((sum, law) => sum + of(law, "standing"), 0),
      failed: countOnes(columns[`${cell.truth} ruled-out`]) > mostRuledOut(replicates),
    };
  });
  return {
    markdown: markdownTable(
      [
        "true law",
        "true law ruled out %",
        "true law stands %",
        "undecided with it %",
        "another law stands %",
        "another law close or undecided %",
        "other laws: ruled out + not needed %",
      ],
      rows.map((row) => [
        row.name,
        `${percent(row.trueRuledOut)}${row.failed ? " ✗" : ""}`,
        percent(row.trueStanding),
        percent(row.undecided),
        percent(row.wrongStanding),
        row.others.map(({ law, open }) => `${law} ${percent(open, 0)}`).join(", "),
        row.others
          .map(({ law, ruledOut, notNeeded }) => `${law} ${percent(ruledOut, 0)} + ${percent(notNeeded, 0)}`)
          .join(", "),
      ]),
    ),
    figures: rows,
    failures: rows
      .filter(({ failed }) => failed)
      .map(({ name, trueRuledOut }) => `${name}: the true law ruled out in ${percent(trueRuledOut)} %`),
  };
}

import {
  type CandidateRun,
  type Comparison,
  compareLaws,
  fitCandidateOnRates,
} from "kinetics-core/comparison";
import type { RandomDraws } from "kinetics-core/random";
import {
  backgroundEquation,
  equationValue,
  powerEquation,
  type RateEquation,
  reversibleEquation,
  saturatingEquation,
} from "kinetics-core/rate-equation";
import { labelOf } from "./simulated-runs";

/** A study of rates with a known law among its candidates, to measure how often the readings are wrong. */
export interface VerdictStudy {
  readonly name: string;
  readonly truth: TrueLaw;
  /** Concentrations of A, B and P in mol L⁻¹, run by run. */
  readonly recipes: readonly (readonly [number, number, number])[];
  /** Standard deviation of ln v between runs. */
  readonly scatter: number;
}

export interface TrueLaw {
  readonly equation: RateEquation;
  readonly rateConstant: number;
  readonly theta: readonly number[];
}

const typical = (species: string) => (species === "P" ? 0.01 : 0.02);
const ab = [
  { species: "A", order: 1 },
  { species: "B", order: 1 },
] as const;

/** The laws that every study is read by, one of them its own. */
export const verdictLaws = {
  simple: powerEquation(["A", "B"], [1, 1]),
  power: powerEquation(["A", "B"]),
  background: backgroundEquation({ main: ab, background: [{ species: "A", order: 1 }], typical }),
  saturating: saturatingEquation({ saturating: "A", others: [{ species: "B", order: 1 }], typical }),
  reversible: reversibleEquation({
    forward: ab,
    reverse: [{ species: "P", order: 1 }],
    equilibriumConstant: "free",
    typical,
  }),
} as const;

export const trueLaws: Readonly<Record<keyof typeof verdictLaws, TrueLaw>> = {
  simple: { equation: verdictLaws.simple, rateConstant: 0.3, theta: [] },
  power: { equation: verdictLaws.power, rateConstant: 0.3, theta: [1, 0.5] },
  background: { equation: verdictLaws.background, rateConstant: 0.3, theta: [0.01] },
  saturating: { equation: verdictLaws.saturating, rateConstant: 0.3, theta: [0.03] },
  reversible: { equation: verdictLaws.reversible, rateConstant: 0.3, theta: [0.01] },
};

/** Two series, then product added; a study of more than 12 runs repeats recipes from the start. */
const recipes: VerdictStudy["recipes"] = [
  [0.02, 0.02, 0],
  [0.08, 0.02, 0],
  [0.02, 0.08, 0],
  [0.02, 0.02, 0.02],
  [0.005, 0.02, 0],
  [0.02, 0.005, 0],
  [0.08, 0.08, 0.01],
  [0.04, 0.02, 0],
  [0.02, 0.04, 0],
  [0.04, 0.04, 0.04],
  [0.01, 0.02, 0],
  [0.02, 0.01, 0],
];

/** `replicates`: how many of the runs repeat the first recipes. */
export function recipesOf(runs: number, replicates: number): VerdictStudy["recipes"] {
  const distinct = Math.min(runs - replicates, recipes.length);
  return Array.from({ length: runs }, (_, j) => recipes[j < distinct ? j : (j - distinct) % distinct]).filter(
    (recipe) => recipe !== undefined,
  );
}

/** Readings of one replicate of the study, `id` of each law its key in `verdictLaws`. */
export function simulateVerdict(study: VerdictStudy, draws: RandomDraws): Comparison {
  const runs = runsOf(study, draws);
  return compareLaws({
    runs,
    candidates: Object.entries(verdictLaws).map(([id, equation]) => fitCandidateOnRates(equation, runs, id)),
  });
}

function runsOf(
  { truth, recipes: mixed, scatter }: VerdictStudy,
  draws: RandomDraws,
): readonly CandidateRun[] {
  const value = equationValue(truth.equation);
  const theta = Float64Array.from(truth.theta);
  return mixed.map(([a, b, p], j) => {
    const concentrations: Readonly<Record<string, number>> = { A: a, B: b, P: p };
    const c = Float64Array.from(truth.equation.species, (name) => concentrations[name] ?? 0);
    if (!truth.equation.evaluate(c, theta, value) || !(value.f > 0))
      throw new RangeError(`${truth.equation.law} gives no rate in run ${j + 1}`);
    const rate = truth.rateConstant * value.f * Math.exp(scatter * draws.normal());
    return { label: labelOf(j), concentrations, rate, weight: 1 };
  });
}

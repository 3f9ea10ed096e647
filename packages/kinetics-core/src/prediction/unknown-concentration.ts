import { fieller, type RatioSet } from "kinetics-core/calibration";
import { type Estimate, type Flag, noEstimate, numberInWords } from "kinetics-core/quantities";
import type { FittedLaw } from "./fitted-law";
import { degreesWithScatter, factors } from "./log-prediction";
import { rangeFlags } from "./prediction-flags";

export interface UnknownMixture {
  /** The species whose concentration is sought. */
  readonly species: string;
  /** All other species of the law, with the relative standard uncertainty of each; > 0. */
  readonly concentrations: Readonly<Record<string, { readonly value: number; readonly relative: number }>>;
  /** Measured rate, or the geometric mean over several runs of the unknown, in the units of the law; > 0. */
  readonly rate: number;
  /** Relative standard uncertainty of that rate from its own readings. */
  readonly relative: number;
  /** Runs of the unknown behind the rate; default 1. Each has its own ln k, so τ²/runs is added. */
  readonly runs?: number;
}

export type UnknownConcentration =
  | {
      readonly status: "found";
      /** Interval by Fieller, back-transformed from ln c; null where the set is no interval. */
      readonly concentration: Estimate;
      /** Of ln c, whatever its form. */
      readonly logSet: RatioSet;
      /** t² u²(n)/n²: from 1 on the order may be 0 and no interval exists. */
      readonly g: number | null;
      readonly flags: readonly Flag[];
    }
  | { readonly status: "bad-input" | "not-a-power-law"; readonly place: string; readonly message: string };

/**
 * Concentration from a rate by a power law: ln c_x = (ln v − ln k − Σ_{j≠x} n_j ln c_j)/n_x, a ratio of two estimates
 * with one covariance, so its confidence set is Fieller's. The numerator carries u²(ln v), the run's own scatter τ²/runs,
 * Σ n_j² u²(ln c_j) and the law's part. A shift of ln c moves numerator and set alike, so the unit does not matter.
 */
export function unknownConcentration(law: FittedLaw, mixture: UnknownMixture): UnknownConcentration {
  const fault = faultOf(law, mixture);
  if (fault !== null) return fault;
  const { equation, parameters, covariance } = law;
  const { species, concentrations, rate, relative, runs = 1 } = mixture;
  const orders = equation.species.map((name) => orderIn(law, name));
  const sought = orders[equation.species.indexOf(species)] ?? { order: 0, parameter: null };
  let numerator = Math.log(rate) - law.logRateConstant;
  let own = relative ** 2 + (law.betweenRunStandardDeviation ?? 0) ** 2 / runs;
  // ∂(numerator)/∂(ln k, θ).
  const gradient = new Float64Array(1 + parameters.length);
  gradient[0] = -1;
  equation.species.forEach((name, i) => {
    const known = concentrations[name];
    const { order = 0, parameter = null } = orders[i] ?? {};
    if (name === species || known === undefined || (order === 0 && parameter === null)) return;
    numerator -= order * Math.log(known.value);
    own += (order * known.relative) ** 2;
    if (parameter !== null) gradient[1 + parameter] = -Math.log(known.value);
  });
  const between = (a: ArrayLike<number>, b: ArrayLike<number>) => bilinear(covariance ?? [], a, b);
  const bySought = new Float64Array(1 + parameters.length);
  if (sought.parameter !== null) bySought[1 + sought.parameter] = 1;
  const estimate = numerator / sought.order;
  const atEstimate = gradient.map((value, i) => value - estimate * (bySought[i] ?? 0));
  const ofTheLaw = between(atEstimate, atEstimate);
  const scatter = (law.betweenRunStandardDeviation ?? 0) ** 2 / runs;
  const factor = Number.isFinite(ofTheLaw)
    ? factors(law.level)(degreesWithScatter(law, ofTheLaw, scatter))
    : null;
  const known = covariance !== null && factor !== null;
  const ratio = fieller({
    numerator,
    denominator: sought.order,
    numeratorVariance: own + between(gradient, gradient),
    denominatorVariance: between(bySought, bySought),
    covariance: between(gradient, bySought),
    factor: factor ?? 0,
  });
  const concentration = known
    ? exponentialOfRatio(ratio.estimate, ratio.standardError, ratio.set, law.level)
    : exponentialOfRatio(ratio.estimate, null, null, law.level);
  const found = concentration.estimate;
  return {
    status: "found",
    concentration,
    logSet: ratio.set,
    g: known ? ratio.g : null,
    flags: [
      ...(known && ratio.set.kind !== "bounded" ? [unbounded(species)] : []),
      ...(law.betweenRunStandardDeviation === null ? [noScatter()] : []),
      ...(found === null ? [] : rangeFlags(law, { [species]: found })),
    ],
  };
}

function exponentialOfRatio(
  logarithm: number | null,
  standardError: number | null,
  set: RatioSet | null,
  level: number,
): Estimate {
  const value = logarithm === null ? Number.NaN : Math.exp(logarithm);
  if (!(value > 0) || !Number.isFinite(value)) return noEstimate(level);
  const [low, high] = set?.kind === "bounded" ? [Math.exp(set.low), Math.exp(set.high)] : [null, null];
  return {
    estimate: value,
    standardError: standardError === null ? null : value * standardError,
    interval: low === null || !Number.isFinite(high) ? null : [low, high],
    level,
  };
}

/** Order of one species and the index of the parameter that holds it; null where it is held. */
function orderIn(
  { equation, parameters }: FittedLaw,
  species: string,
): { readonly order: number; readonly parameter: number | null } {
  const parameter = equation.parameters.findIndex((one) => one.name === `n_${species}`);
  if (parameter >= 0) return { order: parameters[parameter] ?? Number.NaN, parameter };
  return { order: heldOrder({ equation, parameters }, species), parameter: null };
}

/** d ln f/d ln c, which for a held order is that order wherever it is looked at. */
function heldOrder(
  { equation, parameters }: Pick<FittedLaw, "equation" | "parameters">,
  species: string,
): number {
  const value = {
    f: 0,
    byConcentration: new Float64Array(equation.species.length),
    byParameter: new Float64Array(equation.parameters.length),
  };
  equation.evaluate(
    Float64Array.from(equation.species, () => 1),
    Float64Array.from(parameters),
    value,
  );
  return (value.byConcentration[equation.species.indexOf(species)] ?? Number.NaN) / value.f;
}

function faultOf(
  { equation }: FittedLaw,
  mixture: UnknownMixture,
): Exclude<UnknownConcentration, { readonly status: "found" }> | null {
  const { species, concentrations, rate, relative, runs = 1 } = mixture;
  const bad = (place: string, message: string) => ({ status: "bad-input", place, message }) as const;
  if (equation.form !== "power")
    return {
      status: "not-a-power-law",
      place: "law",
      message: `A concentration is read back from a power law; this law is “${equation.law}”.`,
    };
  if (!equation.species.includes(species))
    return bad("species", `${species} is not in the law “${equation.law}”, so a rate says nothing about it.`);
  if (!(rate > 0) || !Number.isFinite(rate))
    return bad("rate", `The rate is ${rate}; its logarithm needs a value above 0.`);
  if (!(relative >= 0) || !Number.isFinite(relative))
    return bad("relative", `The relative uncertainty of the rate is ${relative}; it must be 0 or above.`);
  if (!(runs >= 1)) return bad("runs", `The rate comes from ${runs} runs; it needs one or more.`);
  for (const name of equation.species) {
    if (name === species) continue;
    const known = concentrations[name];
    if (known === undefined || !(known.value > 0) || !(known.relative >= 0))
      return bad(
        `concentrations.${name}`,
        `The concentration of ${name} is ${known === undefined ? "missing" : numberOrWord(known.value)}; it must be above 0, its relative uncertainty 0 or above.`,
      );
  }
  return null;
}

function numberOrWord(value: number): string {
  return Number.isFinite(value) ? numberInWords(value) : String(value);
}

function bilinear(
  matrix: readonly (readonly number[])[],
  a: ArrayLike<number>,
  b: ArrayLike<number>,
): number {
  let sum = 0;
  matrix.forEach((row, i) => {
    row.forEach((value, j) => {
      sum += (a[i] ?? 0) * value * (b[j] ?? 0);
    });
  });
  return sum;
}

function unbounded(species: string): Flag {
  return {
    code: "order-may-be-zero",
    severity: "blocks",
    message: `The order in ${species} is not told from 0, so the rate sets no bounds to its concentration. More runs at other levels of ${species} would settle the order.`,
  };
}

function noScatter(): Flag {
  return {
    code: "run-scatter-unknown",
    severity: "weakens",
    message:
      "The scatter from run to run is not known, so the unknown's own run was taken to have none. One more run than parameters would give it.",
  };
}

import { inARow, printNumber } from "kinetics-core/quantities";
import { type EquationValue, equationValue } from "kinetics-core/rate-equation";
import { integrate } from "./adaptive-quadrature";
import type { FittedLaw } from "./fitted-law";

/**
 * The course of one mixture by a law: dξ/dt = k f(c), c_i = c_i0 + ν_i ξ, from ξ = 0 to its end, where the first
 * reactant is used up or, in a reversible law, f = 0. The equation does not contain t, so time is a quadrature,
 *     k t(ξ) = ∫₀^ξ dx/f,   ∂(k t)/∂θ = −∫₀^ξ f_θ/f² dx,   ∂ ln t/∂ ln k = −1,
 * and so is the effect of all starting concentrations together, c_i0 → λ c_i0 at one conversion,
 *     ∂(k t)/∂ ln λ = ∫₀^ξ (1/f − Σ c_i f_ci/f²) dx,
 * for a power law (1 − Σ n) k t. With ξ = ξ_end (1 − e^(−u)) the integrands are smooth to the end, where 1/f is not.
 */
export interface Mixture {
  /** Starting concentration of every species that reacts or enters the law, ≥ 0, in the unit of the law. */
  readonly concentrations: Readonly<Record<string, number>>;
  /** ν of every species that changes, negative for reactants; one that is not named does not change. */
  readonly stoichiometricNumbers: Readonly<Record<string, number>>;
}

export interface Course {
  readonly law: FittedLaw;
  readonly mixture: Mixture;
  readonly end: CourseEnd;
  /** Greatest u at which f still has digits. */
  readonly lastU: number;
}

export interface CourseEnd {
  /** ξ_end. */
  readonly extent: number;
  readonly kind: "exhausted" | "equilibrium";
  /** Reactants that are used up there. */
  readonly exhausted: readonly string[];
}

export type CourseFault = {
  readonly status: "bad-mixture" | "no-rate" | "not-reached";
  /** Dotted place of the value at fault, "concentrations.A". */
  readonly place: string;
  readonly message: string;
};

export type CourseResult = { readonly status: "course"; readonly course: Course } | CourseFault;

/** Conversion short of the end by 1e-17 is the end. */
const LAST_U_TO_EXHAUSTION = 39;
/** Towards an equilibrium f is a difference and loses a digit for every 2.3 of u. */
const LAST_U_TO_EQUILIBRIUM = 16;
/** A reactant left over by less than rounding of the starting concentrations is used up. */
const USED_UP = 1e-12;
const STEPS_TO_EQUILIBRIUM = 400;
/** A millionth of the way. */
const JUST_AFTER = 1e-6;

export function courseOf(law: FittedLaw, mixture: Mixture): CourseResult {
  const fault = faultOf(law, mixture);
  if (fault !== null) return fault;
  const reactants = Object.entries(mixture.stoichiometricNumbers).filter(([, number]) => number < 0);
  const extents = reactants.map(([name, number]) => (mixture.concentrations[name] ?? 0) / -number);
  const most = Math.min(...extents);
  if (!(most > 0) || !Number.isFinite(most))
    return {
      status: "bad-mixture",
      place: "stoichiometricNumbers",
      message:
        reactants.length === 0
          ? "No species has a negative stoichiometric number, so nothing is used up; give the reactants theirs."
          : `${inARow(reactants.flatMap(([name], i) => (extents[i] === most ? [name] : [])))} is absent at the start, so nothing reacts.`,
    };
  const exhausted = reactants.flatMap(([name], i) =>
    (extents[i] ?? 0) <= most * (1 + USED_UP) ? [name] : [],
  );
  const toExhaustion: Course = {
    law,
    mixture,
    end: { extent: most, kind: "exhausted", exhausted },
    lastU: LAST_U_TO_EXHAUSTION,
  };
  if (!law.equation.reversible) return startsAt(toExhaustion);
  const equilibrium = equilibriumExtent(toExhaustion);
  if (equilibrium === null) return startsAt(toExhaustion);
  return startsAt({
    ...toExhaustion,
    end: { extent: equilibrium, kind: "equilibrium", exhausted: [] },
    lastU: LAST_U_TO_EQUILIBRIUM,
  });
}

function faultOf({ equation, parameters }: FittedLaw, mixture: Mixture): CourseFault | null {
  if (parameters.length !== equation.parameters.length)
    throw new RangeError(
      `the law has ${equation.parameters.length} parameters, ${parameters.length} values were given`,
    );
  const needed = new Set([...equation.species, ...Object.keys(mixture.stoichiometricNumbers)]);
  for (const name of needed) {
    const value = mixture.concentrations[name];
    if (value === undefined || !(value >= 0) || !Number.isFinite(value))
      return {
        status: "bad-mixture",
        place: `concentrations.${name}`,
        message: `The starting concentration of ${name} is ${value ?? "missing"}; it must be 0 or above.`,
      };
    if (!Number.isFinite(mixture.stoichiometricNumbers[name] ?? 0))
      return {
        status: "bad-mixture",
        place: `stoichiometricNumbers.${name}`,
        message: `The stoichiometric number of ${name} is not a finite number.`,
      };
  }
  return null;
}

/**
 * A course needs a rate at the start. Where f is 0 there (autocatalysis without any product) the reaction never begins by
 * this law; where it has no value (a negative order in an absent product) it counts just after.
 */
function startsAt(course: Course): CourseResult {
  const at = evaluator(course);
  const first = at(0)?.f ?? at(JUST_AFTER)?.f ?? null;
  if (first !== null && first > 0) return { status: "course", course };
  return {
    status: "no-rate",
    place: "concentrations",
    message: `The law gives no rate of reaction in this mixture${first === null ? "" : ` (k times ${printNumber(first, 3)})`}: a species that it needs is absent, or the mixture lies beyond its equilibrium. Change the starting concentrations.`,
  };
}

/** Where f first falls to 0 on the way to exhaustion; null where it never does. */
function equilibriumExtent(course: Course): number | null {
  const at = evaluator(course);
  const positive = (u: number) => (at(u)?.f ?? 0) > 0;
  if (!positive(JUST_AFTER)) return null;
  let below = 0;
  for (let step = 1; step <= STEPS_TO_EQUILIBRIUM; step++) {
    const u = (course.lastU * step) / STEPS_TO_EQUILIBRIUM;
    if (positive(u)) {
      below = u;
      continue;
    }
    let above = u;
    for (let halving = 0; halving < 60; halving++) {
      const middle = (below + above) / 2;
      if (positive(middle)) below = middle;
      else above = middle;
    }
    return -course.end.extent * Math.expm1(-below);
  }
  return null;
}

interface CoursePoint extends EquationValue {
  /** Concentrations in the order of the law's species; overwritten by the next call. */
  readonly c: Float64Array;
}

/** f with its derivatives at u, overwritten by the next call; null where f has no finite value. */
function evaluator(course: Course): (u: number) => CoursePoint | null {
  const { law, mixture, end } = course;
  const { equation } = law;
  const theta = Float64Array.from(law.parameters);
  const c = new Float64Array(equation.species.length);
  const value: CoursePoint = { ...equationValue(equation), c };
  const start = equation.species.map((name) => mixture.concentrations[name] ?? Number.NaN);
  const final = equation.species.map((name, i) =>
    end.exhausted.includes(name)
      ? 0
      : Math.max(0, (start[i] ?? 0) + (mixture.stoichiometricNumbers[name] ?? 0) * end.extent),
  );
  return (u) => {
    const left = Math.exp(-u);
    for (let i = 0; i < c.length; i++)
      c[i] =
        left > 0.5
          ? (start[i] ?? 0) - ((final[i] ?? 0) - (start[i] ?? 0)) * Math.expm1(-u)
          : (final[i] ?? 0) + ((start[i] ?? 0) - (final[i] ?? 0)) * left;
    return equation.evaluate(c, theta, value) && Number.isFinite(value.f) ? value : null;
  };
}

/**
 * k t, its derivatives by θ, and last that by ln λ, between two u: added to `sums` (2 + parameters long). Returns false
 * where f has no positive value on the way.
 */
export function timeIntegrals(course: Course, from: number, to: number, sums: Float64Array): boolean {
  const at = evaluator(course);
  const { law, end } = course;
  const parameters = law.equation.parameters.length;
  return integrate(
    (u, into) => {
      const value = at(u);
      if (value === null || !(value.f > 0)) return false;
      const { f, c, byConcentration, byParameter } = value;
      const reciprocal = (end.extent * Math.exp(-u)) / f;
      into[0] = reciprocal;
      for (let j = 0; j < parameters; j++) into[1 + j] = (-reciprocal * (byParameter[j] ?? Number.NaN)) / f;
      let scaled = 0;
      for (let i = 0; i < c.length; i++) scaled += (c[i] ?? 0) * (byConcentration[i] ?? Number.NaN);
      into[1 + parameters] = reciprocal * (1 - scaled / f);
      return Number.isFinite(into[1 + parameters] ?? Number.NaN);
    },
    from,
    to,
    sums,
  );
}

/** f at u; null where it has no finite value. */
export function rateFactorAt(course: Course, u: number): number | null {
  return evaluator(course)(u)?.f ?? null;
}

/** u of an extent: −ln(1 − ξ/ξ_end). */
export function positionOf(course: Course, extent: number): number {
  return -Math.log1p(-extent / course.end.extent);
}

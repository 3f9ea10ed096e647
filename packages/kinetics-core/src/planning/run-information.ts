import {
  columnOf,
  householderQr,
  inverseGram,
  matrixFromColumns,
  zeroMatrix,
} from "kinetics-core/linear-algebra";
import type { FittedLaw } from "kinetics-core/prediction";
import { equationValue } from "kinetics-core/rate-equation";
import type { Recipe } from "./feasible-set";

/**
 * What runs tell of ln k and the parameters θ: each measures ln v with one scatter s, so with g = (1, f_θ/f) of a run
 * the information is M = Σ g gᵀ/s², and C = (Σ g gᵀ)⁻¹ is their covariance in units of s². For a power law g holds the
 * logarithms of the concentrations and C_ii = 1/(m s²_(i|others)) with s_(i|others) the root-mean-square of ln c_i
 * after regression on the others: u(n_i) = s/(√m s_(i|others)).
 */
export interface Design {
  readonly law: FittedLaw;
  /** Covariance per s² of ln k and θ, in rows; where the runs leave something open it is as good as infinite there. */
  readonly covariance: readonly Float64Array[];
  readonly runs: number;
}

/**
 * Stands for runs that say next to nothing, so that a design without enough runs has an inverse: 10⁴ standard
 * deviations of one run in ln k and in an order.
 */
const NEXT_TO_NOTHING = 1e-4;
/** A standard error beyond so many of one run's standard deviation means that the design leaves it open. */
const OPEN_ABOVE = 1e3;

/** Gradient of ln v by ln k and θ in a mixture; null where the law gives no rate above 0 there. */
export function gradientAt(law: FittedLaw): (recipe: Recipe) => Float64Array | null {
  const { equation, parameters } = law;
  const theta = Float64Array.from(parameters);
  const value = equationValue(equation);
  const c = new Float64Array(equation.species.length);
  return (recipe) => {
    for (const [i, name] of equation.species.entries()) c[i] = recipe[name] ?? Number.NaN;
    if (!equation.evaluate(c, theta, value) || !(value.f > 0)) return null;
    return Float64Array.from({ length: 1 + parameters.length }, (_, j) =>
      j === 0 ? 1 : (value.byParameter[j - 1] ?? Number.NaN) / value.f,
    );
  };
}

/** Runs in which the law gives no rate count for nothing. */
export function designOf(law: FittedLaw, recipes: readonly Recipe[]): Design {
  const gradient = gradientAt(law);
  const rows = recipes.flatMap((recipe) => {
    const row = gradient(recipe);
    return row === null ? [] : [row];
  });
  const size = 1 + law.parameters.length;
  // A parameter with a unit is counted relative to its own size.
  const scales = [1, ...law.parameters.map((value, j) => scaleOf(law, value, j))];
  const ridge = zeroMatrix(size, size);
  for (let j = 0; j < size; j++) ridge.values[j * size + j] = NEXT_TO_NOTHING / (scales[j] ?? 1);
  const stacked = matrixFromColumns(
    Array.from({ length: size }, (_, j) => [...rows.map((row) => row[j] ?? 0), ...columnOf(ridge, j)]),
  );
  const inverse = inverseGram(householderQr(stacked).r);
  return {
    law,
    runs: rows.length,
    covariance: Array.from({ length: size }, (_, i) =>
      Float64Array.from({ length: size }, (_unused, j) => inverse.values[j * size + i] ?? Number.NaN),
    ),
  };
}

function scaleOf({ equation }: FittedLaw, value: number, index: number): number {
  return equation.parameters[index]?.kind === "constant" && value !== 0 ? Math.abs(value) : 1;
}

/** C g. */
export function spread(covariance: readonly Float64Array[], gradient: Float64Array): Float64Array {
  return Float64Array.from(covariance, (row) => {
    let sum = 0;
    for (let j = 0; j < row.length; j++) sum += (row[j] ?? 0) * (gradient[j] ?? 0);
    return sum;
  });
}

/** gᵀ C g: variance of ln v there in units of s². */
export function leverageOf(gradient: Float64Array, spreadOut: Float64Array): number {
  let sum = 0;
  for (let j = 0; j < gradient.length; j++) sum += (gradient[j] ?? 0) * (spreadOut[j] ?? 0);
  return sum;
}

/** The design with one more run, by the formula of Sherman and Morrison. */
export function withRun(design: Design, gradient: Float64Array): Design {
  const spreadOut = spread(design.covariance, gradient);
  const total = 1 + leverageOf(gradient, spreadOut);
  return {
    ...design,
    runs: design.runs + 1,
    covariance: design.covariance.map((row, i) =>
      row.map((value, j) => value - ((spreadOut[i] ?? 0) * (spreadOut[j] ?? 0)) / total),
    ),
  };
}

/** "ln k", then the parameters by name. */
export function parameterNames(law: FittedLaw): readonly string[] {
  return ["ln k", ...law.equation.parameters.map(({ name }) => name)];
}

/** s √C_ii by name; null where the design leaves it open. */
export function standardErrorsOf(design: Design, scatter: number): Readonly<Record<string, number | null>> {
  const { law, covariance } = design;
  return Object.fromEntries(
    parameterNames(law).map((name, i) => {
      const factor = Math.sqrt(covariance[i]?.[i] ?? Number.NaN);
      const scale = i === 0 ? 1 : scaleOf(law, law.parameters[i - 1] ?? 0, i - 1);
      return [name, factor < OPEN_ABOVE * scale ? scatter * factor : null];
    }),
  );
}

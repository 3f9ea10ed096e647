import { dot } from "kinetics-core/linear-algebra";
import { mean } from "kinetics-core/summation";

/**
 * Least squares of y ≈ offset + scale·φ(θ), a curve whose shape φ has one or two parameters, by
 * Levenberg-Marquardt on the shape alone: offset and scale are linear and are eliminated at every step
 * (variable projection; Golub and Pereyra, SIAM J. Numer. Anal. 10 (1973) 413-432, with the Jacobian of
 * Kaufman, BIT 15 (1975) 49-57, whose gradient is exact). With P the projector away from [1, φ],
 *
 *   r(θ) = P y,   J = scale · P ∂φ/∂θ,   (JᵀJ + λD) δ = Jᵀr,
 *
 * D the running maximum of diag JᵀJ (Moré, Lecture Notes in Mathematics 630 (1978) 105-116). J is projected
 * before the products are formed, so the two-by-two system carries no more than the shape's own degeneracy,
 * which λ covers. Parameters stay within bounds; one that rests on a bound is held there while the sum of
 * squares falls outwards. Cost: some ten passes over the points.
 */
export interface Shape {
  /** Bounds of the shape parameters, low then high. Their number is the number of parameters (1 or 2). */
  readonly bounds: readonly (readonly [number, number])[];
  /** Writes φ and ∂φ/∂θ_j at every point. */
  evaluate(parameters: readonly number[], value: Float64Array, derivatives: readonly Float64Array[]): void;
}

export interface ShapeFit {
  readonly parameters: readonly number[];
  readonly offset: number;
  readonly scale: number;
  readonly residualSquares: number;
  /** φ and ∂φ/∂θ_j at the solution. */
  readonly value: Float64Array;
  readonly derivatives: readonly Float64Array[];
  /** Whether each parameter rests on one of its bounds. */
  readonly held: readonly boolean[];
  readonly converged: boolean;
  readonly evaluations: number;
}

const LARGEST_EVALUATIONS = 40;
/** A step that promises less than this part of the sum of squares changes no printed digit. */
const SMALLEST_GAIN = 1e-11;
const SMALLEST_STEP = 1e-12;
const ROUNDING = 1e-12;
const LARGEST_DAMPING = 1e12;

/**
 * `values`: length n ≥ parameters + 2, finite. `start`: within the bounds. Never throws on data: a fit that has
 * not converged after `largestEvaluations` evaluations of the shape says so.
 */
export function fitShape(
  values: Float64Array,
  shape: Shape,
  start: readonly number[],
  largestEvaluations = LARGEST_EVALUATIONS,
): ShapeFit {
  const floor = values.length * (Number.EPSILON * largestOf(values)) ** 2;
  const centre = mean(values);
  const target = centred(values);
  let current = stateAt(target, shape, start);
  let spare = stateAt(target, shape, start);
  let system = normalSystem(current, shape);
  const scales = [...system.least];
  let damping = 1e-3;
  let evaluations = 1;
  let converged = current.residualSquares <= floor;

  while (!converged && evaluations < largestEvaluations) {
    const { next, moved, cut } = boundedStep(current.parameters, dampedStep(system, scales, damping), shape);
    const promised = gainOf(system, moved);
    const last = promised <= SMALLEST_GAIN * current.residualSquares || isSmall(moved, next);
    // A step that a bound cut short may point uphill; more damping turns it downhill again.
    if (last && cut && damping <= LARGEST_DAMPING) {
      damping *= 8;
      continue;
    }
    fillState(target, shape, next, spare);
    evaluations++;
    const gained = current.residualSquares - spare.residualSquares;
    if (last) {
      // Too small to be seen in the sum of squares, yet it doubles the digits of the parameters.
      if (gained > -ROUNDING * current.residualSquares) current = spare;
      converged = true;
    } else if (gained > 0) {
      [current, spare] = [spare, current];
      system = normalSystem(current, shape);
      system.least.forEach((entry, j) => {
        scales[j] = Math.max(scales[j] ?? Number.NaN, entry);
      });
      damping = Math.max(
        damping * (gained > 0.75 * promised ? 0.1 : gained > 0.25 * promised ? 0.5 : 2),
        1e-12,
      );
      converged = current.residualSquares <= floor;
    } else {
      damping = Math.max(damping, 1e-9) * 8;
      if (damping > LARGEST_DAMPING) break;
    }
  }
  const { parameters, scale, residualSquares, value, derivatives } = current;
  const held = shape.bounds.map(([low, high], j) => {
    const parameter = parameters[j] ?? Number.NaN;
    return parameter <= low || parameter >= high;
  });
  const offset = centre - scale * mean(value);
  return { parameters, offset, scale, residualSquares, value, derivatives, held, converged, evaluations };
}

interface State {
  parameters: readonly number[];
  scale: number;
  residualSquares: number;
  readonly value: Float64Array;
  readonly derivatives: readonly Float64Array[];
  readonly residuals: Float64Array;
}

function stateAt(target: Float64Array, shape: Shape, parameters: readonly number[]): State {
  const column = () => new Float64Array(target.length);
  const columns = { value: column(), derivatives: shape.bounds.map(column), residuals: column() };
  const state: State = { parameters, scale: 0, residualSquares: 0, ...columns };
  fillState(target, shape, parameters, state);
  return state;
}

/** Shape, scale and residuals at one set of shape parameters. `target`: the values about their mean. */
function fillState(target: Float64Array, shape: Shape, parameters: readonly number[], state: State): void {
  const { value, derivatives, residuals } = state;
  shape.evaluate(parameters, value, derivatives);
  const direction = centred(value);
  const along = dot(direction, direction);
  const scale = along > 0 ? dot(direction, target) / along : 0;
  for (let i = 0; i < target.length; i++) {
    residuals[i] = (target[i] ?? Number.NaN) - scale * (direction[i] ?? Number.NaN);
  }
  state.parameters = parameters;
  state.scale = scale;
  state.residualSquares = dot(residuals, residuals);
}

/** JᵀJ and Jᵀr of the projected problem; a parameter that pushes against its bound has zeros. */
interface NormalSystem {
  readonly diagonal: readonly number[];
  readonly cross: number;
  readonly descent: readonly number[];
  /** A unit step counts for at least a thousandth of the whole curve, so that an idle parameter stays put. */
  readonly least: readonly number[];
}

function normalSystem(
  { value, derivatives, residuals, scale, parameters }: State,
  shape: Shape,
): NormalSystem {
  const direction = centred(value);
  const along = dot(direction, direction);
  const columns = derivatives.map((derivative) => {
    const column = centred(derivative);
    const share = along > 0 ? dot(direction, column) / along : 0;
    for (let i = 0; i < column.length; i++) {
      column[i] = scale * ((column[i] ?? Number.NaN) - share * (direction[i] ?? Number.NaN));
    }
    return column;
  });
  const slopes = columns.map((column) => dot(column, residuals));
  const free = shape.bounds.map(([low, high], j) => {
    const [parameter = Number.NaN, slope = Number.NaN] = [parameters[j], slopes[j]];
    return !((parameter <= low && slope < 0) || (parameter >= high && slope > 0));
  });
  const diagonal = columns.map((column, j) => (free[j] ? dot(column, column) : 0));
  const [first, second] = columns;
  return {
    diagonal,
    cross: first && second && free.every(Boolean) ? dot(first, second) : 0,
    descent: slopes.map((slope, j) => (free[j] ? slope : 0)),
    least: diagonal.map((entry) => Math.max(entry, 1e-6 * scale * scale * along)),
  };
}

function dampedStep(system: NormalSystem, scales: readonly number[], damping: number): number[] {
  const damped = system.diagonal.map((entry, j) => entry + damping * (scales[j] ?? Number.NaN));
  const [a = 0, b = 0] = damped;
  const [f = 0, g = 0] = system.descent;
  if (system.diagonal.length === 1) return [a > 0 ? f / a : 0];
  const determinant = a * b - system.cross ** 2;
  if (determinant > 1e-14 * a * b) {
    return [(b * f - system.cross * g) / determinant, (a * g - system.cross * f) / determinant];
  }
  return [a > 0 ? f / a : 0, b > 0 ? g / b : 0];
}

/** Fall of the sum of squares that the linear model promises for a step: 2 descentᵀδ − δᵀJᵀJδ. */
function gainOf({ diagonal, cross, descent }: NormalSystem, step: readonly number[]): number {
  let gain = 0;
  step.forEach((move, j) => {
    gain += 2 * move * (descent[j] ?? Number.NaN) - move * move * (diagonal[j] ?? Number.NaN);
  });
  return gain - 2 * cross * (step[0] ?? 0) * (step[1] ?? 0);
}

function isSmall(step: readonly number[], parameters: readonly number[]): boolean {
  return step.every(
    (move, j) => Math.abs(move) <= SMALLEST_STEP * (1 + Math.abs(parameters[j] ?? Number.NaN)),
  );
}

function boundedStep(
  parameters: readonly number[],
  step: readonly number[],
  shape: Shape,
): { readonly next: number[]; readonly moved: number[]; readonly cut: boolean } {
  let cut = false;
  const next = shape.bounds.map(([low, high], j) => {
    const wanted = (parameters[j] ?? Number.NaN) + (step[j] ?? Number.NaN);
    if (wanted < low || wanted > high) cut = true;
    return Math.min(Math.max(wanted, low), high);
  });
  return { next, moved: next.map((value, j) => value - (parameters[j] ?? Number.NaN)), cut };
}

function largestOf(values: Float64Array): number {
  let largest = 0;
  for (let i = 0; i < values.length; i++) largest = Math.max(largest, Math.abs(values[i] ?? Number.NaN));
  return largest;
}

function centred(values: Float64Array): Float64Array {
  const centre = mean(values);
  const result = new Float64Array(values.length);
  for (let i = 0; i < values.length; i++) result[i] = (values[i] ?? Number.NaN) - centre;
  return result;
}

/**
 * Least squares of y ≈ offset + scale·φ(θ), a curve whose shape φ has one or two parameters, by
 * Levenberg-Marquardt on the shape alone: offset and scale are linear and are eliminated at every step
 * (variable projection; Golub and Pereyra, SIAM J. Numer. Anal. 10 (1973) 413-432, with the Jacobian of
 * Kaufman, BIT 15 (1975) 49-57, whose gradient is exact). With P the projector away from [1, φ],
 *
 *   r(θ) = P y,   J = −scale · P ∂φ/∂θ,   (JᵀJ + λD) δ = −Jᵀr,
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

/** `values`: length n ≥ parameters + 2, finite. `start`: within the bounds. Never throws on data. */
export function fitShape(values: Float64Array, shape: Shape, start: readonly number[]): ShapeFit {
  const floor = values.length * (Number.EPSILON * largestOf(values)) ** 2;
  let current = stateAt(values, shape, start);
  let spare = stateAt(values, shape, start);
  let system = normalSystem(current, shape);
  const scales = [...system.least];
  let damping = 1e-3;
  let evaluations = 1;
  let converged = current.residualSquares <= floor;

  while (!converged && evaluations < LARGEST_EVALUATIONS) {
    const { next, moved, cut } = boundedStep(current.parameters, dampedStep(system, scales, damping), shape);
    const promised = gainOf(system, moved);
    const last = promised <= SMALLEST_GAIN * current.residualSquares || isSmall(moved, next);
    // A step that a bound cut short may point uphill; more damping turns it downhill again.
    if (last && cut && damping <= LARGEST_DAMPING) {
      damping *= 8;
      continue;
    }
    fillState(values, shape, next, spare);
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
        scales[j] = Math.max(scales[j] as number, entry);
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
  const { parameters, offset, scale, residualSquares, value, derivatives } = current;
  const held = parameters.map((parameter, j) => {
    const [low, high] = shape.bounds[j] as readonly [number, number];
    return parameter <= low || parameter >= high;
  });
  return {
    parameters,
    offset,
    scale,
    residualSquares,
    value,
    derivatives,
    held,
    converged,
    evaluations,
  };
}

interface State {
  parameters: readonly number[];
  offset: number;
  scale: number;
  residualSquares: number;
  readonly value: Float64Array;
  readonly derivatives: readonly Float64Array[];
  readonly residuals: Float64Array;
}

function stateAt(values: Float64Array, shape: Shape, parameters: readonly number[]): State {
  const state: State = {
    parameters,
    offset: 0,
    scale: 0,
    residualSquares: 0,
    value: new Float64Array(values.length),
    derivatives: shape.bounds.map(() => new Float64Array(values.length)),
    residuals: new Float64Array(values.length),
  };
  fillState(values, shape, parameters, state);
  return state;
}

/** Shape, linear parameters and residuals at one set of shape parameters. */
function fillState(values: Float64Array, shape: Shape, parameters: readonly number[], state: State): void {
  const { value, derivatives, residuals } = state;
  shape.evaluate(parameters, value, derivatives);
  const n = values.length;
  const meanValue = meanOf(values);
  const meanShape = meanOf(value);
  let across = 0;
  let along = 0;
  for (let i = 0; i < n; i++) {
    const centred = (value[i] as number) - meanShape;
    across += centred * ((values[i] as number) - meanValue);
    along += centred * centred;
  }
  const scale = along > 0 ? across / along : 0;
  let squares = 0;
  for (let i = 0; i < n; i++) {
    const residual = (values[i] as number) - meanValue - scale * ((value[i] as number) - meanShape);
    residuals[i] = residual;
    squares += residual * residual;
  }
  state.parameters = parameters;
  state.scale = scale;
  state.offset = meanValue - scale * meanShape;
  state.residualSquares = squares;
}

interface NormalSystem {
  /** A unit step counts for at least a thousandth of the whole curve, so that an idle parameter stays put. */
  readonly least: readonly number[];
  /** diag JᵀJ, its one off-diagonal entry, and −Jᵀr (0 for a parameter that is held at its bound). */
  readonly diagonal: number[];
  readonly cross: number;
  readonly descent: number[];
}

function normalSystem(state: State, shape: Shape): NormalSystem {
  const { value, derivatives, residuals, scale, parameters } = state;
  const n = value.length;
  const meanShape = meanOf(value);
  let along = 0;
  for (let i = 0; i < n; i++) along += ((value[i] as number) - meanShape) ** 2;
  const means = derivatives.map(meanOf);
  const shares = derivatives.map((derivative, j) => {
    let sum = 0;
    for (let i = 0; i < n; i++) {
      sum += ((value[i] as number) - meanShape) * ((derivative[i] as number) - (means[j] as number));
    }
    return along > 0 ? sum / along : 0;
  });
  const diagonal = derivatives.map(() => 0);
  const descent = derivatives.map(() => 0);
  let cross = 0;
  for (let i = 0; i < n; i++) {
    const centred = (value[i] as number) - meanShape;
    let other = 0;
    for (let j = 0; j < derivatives.length; j++) {
      const column = derivatives[j] as Float64Array;
      const entry = scale * ((column[i] as number) - (means[j] as number) - (shares[j] as number) * centred);
      diagonal[j] = (diagonal[j] as number) + entry * entry;
      descent[j] = (descent[j] as number) + entry * (residuals[i] as number);
      if (j === 0) other = entry;
      else cross += other * entry;
    }
  }
  descent.forEach((slope, j) => {
    const [low, high] = shape.bounds[j] as readonly [number, number];
    const parameter = parameters[j] as number;
    if ((parameter <= low && slope < 0) || (parameter >= high && slope > 0)) {
      descent[j] = 0;
      diagonal[j] = 0;
      cross = 0;
    }
  });
  const least = diagonal.map((entry) => Math.max(entry, 1e-6 * scale * scale * along));
  return { least, diagonal, cross, descent };
}

function dampedStep(system: NormalSystem, scales: readonly number[], damping: number): number[] {
  const damped = system.diagonal.map((entry, j) => entry + damping * (scales[j] as number));
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
    gain += 2 * move * (descent[j] as number) - move * move * (diagonal[j] as number);
  });
  return gain - 2 * cross * (step[0] ?? 0) * (step[1] ?? 0);
}

function isSmall(step: readonly number[], parameters: readonly number[]): boolean {
  return step.every((move, j) => Math.abs(move) <= SMALLEST_STEP * (1 + Math.abs(parameters[j] as number)));
}

function boundedStep(
  parameters: readonly number[],
  step: readonly number[],
  shape: Shape,
): { readonly next: number[]; readonly moved: number[]; readonly cut: boolean } {
  let cut = false;
  const next = parameters.map((parameter, j) => {
    const [low, high] = shape.bounds[j] as readonly [number, number];
    const wanted = parameter + (step[j] as number);
    if (wanted < low || wanted > high) cut = true;
    return Math.min(Math.max(wanted, low), high);
  });
  return { next, moved: next.map((value, j) => value - (parameters[j] as number)), cut };
}

function largestOf(values: Float64Array): number {
  let largest = 0;
  for (let i = 0; i < values.length; i++) largest = Math.max(largest, Math.abs(values[i] as number));
  return largest;
}

function meanOf(values: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < values.length; i++) sum += values[i] as number;
  return sum / values.length;
}

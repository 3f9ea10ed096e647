import { fSurvival } from "kinetics-core/distributions";
import {
  fitShape,
  orthonormalPolynomials,
  projectOn,
  type Shape,
  type ShapeFit,
} from "kinetics-core/least-squares";
import { dot } from "kinetics-core/linear-algebra";
import { quadraticForm } from "./autoregressive-noise";
import { LEAST_DEGREES_OF_FREEDOM, NOISE_DEGREE } from "./constants";
import { exponentialShape, generalOrderShape } from "./general-order";
import type { FittedCurve } from "./initial-rate";
import type { Readings } from "./readings";
import type { NoiseModel } from "./trace-noise";
import type { WindowFit } from "./window-fit";

/** Exponential start S = S₀ + v(1 − e^(−kt))/k on readings [from, to), at least 5 of them. */
export function exponentialFit(readings: Readings, noise: NoiseModel, from: number, to: number): WindowFit {
  const data = windowOf(readings, from, to);
  const fit = fitFromStarts(data, exponentialShape, [[0.2], [3], [20]]);
  return windowFit("exponential", data, noise, fit);
}

/** A general-order fit with its lack of fit, F against a polynomial of degree six. */
export interface GeneralOrderFit extends WindowFit {
  readonly lackOfFit: LackOfFit | null;
}

export interface LackOfFit {
  readonly ratio: number;
  readonly above: number;
  readonly below: number;
  readonly pValue: number;
}

/** General order S = S₀ + v(1 − c)/k with dc/dt = −k·cⁿ on readings [from, to), at least 6 of them. */
export function generalOrderFit(
  readings: Readings,
  noise: NoiseModel,
  from: number,
  to: number,
): GeneralOrderFit {
  const data = windowOf(readings, from, to);
  const fit = fitFromStarts(data, generalOrderShape, [
    [0, 0.5],
    [2, 2],
    [0, 2],
    [30, 20],
  ]);
  return {
    ...windowFit("integrated", data, noise, fit),
    lackOfFit: lackOfFitOf(readings, data, noise, fit.residualSquares),
  };
}

interface WindowData {
  readonly from: number;
  readonly to: number;
  /** Last time of the window since mixing: the unit of `scaledTime`. */
  readonly unit: number;
  readonly scaledTime: Float64Array;
  readonly signal: Float64Array;
}

function windowOf({ time, signal }: Readings, from: number, to: number): WindowData {
  const unit = time[to - 1] ?? Number.NaN;
  return {
    from,
    to,
    unit,
    scaledTime: time.subarray(from, to).map((t) => t / unit),
    signal: signal.subarray(from, to),
  };
}

/** Readings on which starting values compete. */
const THINNED_POINTS = 40;
/** Evaluations after which the best start shows. */
const HEATS = 7;

/** The best of several starts on a thinned trace, then all readings from there. */
function fitFromStarts(
  { scaledTime, signal }: WindowData,
  shapeOn: (time: Float64Array) => Shape,
  starts: readonly (readonly number[])[],
): ShapeFit {
  const count = Math.min(THINNED_POINTS, signal.length);
  const thinnedTime = new Float64Array(count);
  const thinnedSignal = new Float64Array(count);
  for (let i = 0; i < count; i++) {
    const index = Math.round((i * (signal.length - 1)) / (count - 1));
    thinnedTime[i] = scaledTime[index] ?? Number.NaN;
    thinnedSignal[i] = signal[index] ?? Number.NaN;
  }
  const thinned = shapeOn(thinnedTime);
  const best = starts
    .map((start) => fitShape(thinnedSignal, thinned, start, HEATS))
    .reduce((a, b) => (b.residualSquares < a.residualSquares ? b : a));
  return fitShape(signal, shapeOn(scaledTime), best.parameters);
}

/**
 * The initial slope is the linear scale v of the fit over the unit of time. Its row is the part of ∂S/∂v = φ
 * that no other parameter can imitate, p = φ − (projection on 1 and v·∂φ/∂θ), divided by pᵀp: the row of the
 * least-squares slope in the tangent plane at the solution. Where nothing of p is left, the readings do not fix
 * a slope at mixing and its error is infinite (`isDetermined`).
 */
function windowFit(
  estimator: "exponential" | "integrated",
  { from, to, unit }: WindowData,
  noise: NoiseModel,
  fit: ShapeFit,
): WindowFit {
  const row = loneliestPart(
    fit.value,
    fit.derivatives.filter((_, j) => !fit.held[j]),
  );
  return {
    estimator,
    degree: null,
    from,
    to,
    slope: fit.scale / unit,
    standardError: row
      ? (noise.standardDeviation * Math.sqrt(quadraticForm(row, noise.steps, from))) / unit
      : Number.POSITIVE_INFINITY,
    settled: fit.converged,
    curve: () => curveOf(fit, unit),
  };
}

function curveOf({ parameters, offset, scale }: ShapeFit, unit: number): FittedCurve {
  const progress = parameters.at(-1) ?? 0;
  // An exponential that has no curvature at all is a straight line, and has no span to name.
  if (progress === 0) return { kind: "polynomial", coefficients: [offset, scale / unit] };
  const common = { start: offset, span: scale / progress, rateConstant: progress / unit };
  return parameters.length === 1
    ? { kind: "exponential", ...common }
    : { kind: "general-order", ...common, order: (parameters[0] ?? 0) / progress };
}

/** A direction that is all but a combination of earlier ones says nothing of its own. */
const COLLINEAR = 1e-7;
const NOTHING_LEFT = 1e-12;

/** p/(pᵀp), p the part of `column` that is orthogonal to the constant and to `others`; null where p is rounding. */
function loneliestPart(column: Float64Array, others: readonly Float64Array[]): Float64Array | null {
  const n = column.length;
  const directions = [new Float64Array(n).fill(1 / Math.sqrt(n))];
  for (const other of others) {
    const direction = Float64Array.from(other);
    const before = Math.sqrt(dot(direction, direction));
    removeDirections(direction, directions);
    const after = Math.sqrt(dot(direction, direction));
    if (after <= COLLINEAR * before) continue;
    directions.push(direction.map((entry) => entry / after));
  }
  const part = Float64Array.from(column);
  removeDirections(part, directions);
  const squares = dot(part, part);
  if (!(squares > NOTHING_LEFT * NOTHING_LEFT * dot(column, column))) return null;
  return part.map((entry) => entry / squares);
}

/** Gram-Schmidt, twice: once leaves a trace of what it removed when little remains. */
function removeDirections(column: Float64Array, directions: readonly Float64Array[]): void {
  for (let pass = 0; pass < 2; pass++) {
    for (const direction of directions) {
      const share = dot(column, direction);
      for (let i = 0; i < column.length; i++) {
        column[i] = (column[i] ?? Number.NaN) - share * (direction[i] ?? Number.NaN);
      }
    }
  }
}

const GENERAL_ORDER_PARAMETERS = 4;

/**
 * F of the general order (4 parameters) against a polynomial of degree six (7) on the same window. With
 * correlated noise a smooth direction q has variance σ²qᵀRq, not σ²; the three that the polynomial adds are
 * taken as its own degrees 4 to 6, and σ² is its RSS/(m − tr QᵀRQ). With ρ = 0 this is the usual F.
 * Null where fewer than three readings are left over.
 */
function lackOfFitOf(
  { time, signal }: Readings,
  { from, to }: WindowData,
  noise: NoiseModel,
  residualSquares: number,
): LackOfFit | null {
  const points = to - from;
  const coefficients = NOISE_DEGREE + 1;
  if (points < coefficients + 3) return null;
  const basis = orthonormalPolynomials(time, from, to, NOISE_DEGREE);
  const projections = projectOn(basis, signal, from);
  let smoothSquares = 0;
  for (let i = 0; i < points; i++) {
    let residual = signal[from + i] ?? Number.NaN;
    for (let j = 0; j < coefficients; j++) {
      residual -= (projections[j] ?? Number.NaN) * (basis.columns[j * points + i] ?? Number.NaN);
    }
    smoothSquares += residual * residual;
  }
  let taken = 0;
  let added = 0;
  for (let j = 0; j < coefficients; j++) {
    const form = quadraticForm(basis.columns.subarray(j * points, (j + 1) * points), noise.steps, from);
    taken += form;
    if (j >= GENERAL_ORDER_PARAMETERS) added += form;
  }
  const above = coefficients - GENERAL_ORDER_PARAMETERS;
  const effective = (points * (1 - noise.autocorrelation)) / (1 + noise.autocorrelation);
  const below = Math.max(effective - coefficients, LEAST_DEGREES_OF_FREEDOM);
  const variance = smoothSquares / (points - taken);
  const rounding = points * noise.roundingError ** 2;
  const excess = residualSquares - smoothSquares;
  const ratio = excess <= rounding ? 0 : excess / (added * variance);
  return { ratio, above, below, pValue: fSurvival(ratio, above, below) };
}

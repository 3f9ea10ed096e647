/**
 * One run linearised at the current parameters: what remains of its trace after its own nuisances (offset, and where
 * asked for time zero and scale departure) have been projected out. Made once a run and filled by each pass.
 */
export interface RunLinearisation {
  /** JᵀJ, p by p in rows; J = ∂(signal)/∂θ. */
  readonly gram: Float64Array;
  /** Jᵀr, r = measured − fitted. */
  readonly gradient: Float64Array;
  /** The gradient moved to the shared ln k; written by `informationOf`. */
  readonly shifted: Float64Array;
  residualSquares: number;
  points: number;
  /** r₁ of the residuals about their mean. */
  lagOne: number;
  /** Signal at the mixing time, with the offset. */
  startSignal: number;

  /** Where the run stands: its own ln k less the shared one, time zero, ratio of its scale to the shared one. */
  deviation: number;
  timeZero: number;
  scaleRatio: number;
  /** Variance of one reading in terms of the run's effective points; weighs what is known of the nuisances. */
  noise: number;
  /** For the next course of this run: length of the first step as a part of span/rate. */
  firstStep: number;

  /** [r, J, nuisances]ᵀ[r, J, nuisances], in rows: the work of the projection. */
  readonly moments: Float64Array;
  /** Rows of the eliminated nuisances: M_ae/M_ee over [r, θ, nuisances], in the order of elimination. */
  readonly eliminated: readonly Float64Array[];
}

/** Linearisations of all runs, their numbers in one stretch of memory: a fit makes hundreds of such small arrays. */
export function runLinearisations(
  points: readonly number[],
  parameters: number,
  nuisances: number,
): readonly RunLinearisation[] {
  const p = parameters;
  const size = 1 + p + nuisances;
  const buffer = new ArrayBuffer(8 * points.length * (p * p + 2 * p + size * size + nuisances * size));
  let used = 0;
  const stretch = (length: number) => {
    const view = new Float64Array(buffer, used, length);
    used += 8 * length;
    return view;
  };
  return points.map((count) => ({
    gram: stretch(p * p),
    gradient: stretch(p),
    shifted: stretch(p),
    residualSquares: 0,
    points: count,
    lagOne: 0,
    startSignal: 0,
    deviation: 0,
    timeZero: 0,
    scaleRatio: 1,
    noise: 0,
    firstStep: 0,
    moments: stretch(size * size),
    eliminated: Array.from({ length: nuisances }, () => stretch(size)),
  }));
}

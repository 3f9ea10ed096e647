/**
 * What the traces of a study say about the shared parameters θ of a global fit, run by run, at the fitted θ: the
 * linearised problem from which run scatter, standard errors and intervals are made (numerics, 'Global fit'). A run's
 * own linear nuisances (its offset) are projected out, so nothing here is longer than the number of parameters p.
 *
 * θ[0] is ln k.
 */
export interface RunInformation {
  readonly label: string;
  /** JᵀJ of the run, p by p, row after row; J = ∂(fitted signal)/∂θ after projection, in signal. */
  readonly gram: Float64Array;
  /** Jᵀr of the run, r = measured − fitted after projection. */
  readonly gradient: Float64Array;
  /** rᵀr. */
  readonly residualSquares: number;
  readonly points: number;
  /** Points less the projected nuisances. */
  readonly degreesOfFreedom: number;
  /** Lag-one autocorrelation ρ of the run's residuals about its own fit, 0 to 0.97. */
  readonly autocorrelation: number;
}

/** Independent knowledge of parameters that enters as observations: the scale ε·l with its standard uncertainty. */
export interface PriorInformation {
  /** Index in θ. */
  readonly parameter: number;
  /** Stated value less the current one. */
  readonly deviation: number;
  readonly standardUncertainty: number;
}

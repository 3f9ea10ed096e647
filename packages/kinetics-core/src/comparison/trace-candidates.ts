import { studentTFactor } from "kinetics-core/distributions";
import type { MarginalSquares } from "kinetics-core/inference";
import { numberInWords } from "kinetics-core/quantities";
import type { CandidateParameter, ExtensionFact, FittedCandidate } from "./candidate";
import { INTERVAL_LEVEL } from "./constants";
import { replicateLackOfFit } from "./replicate-lack-of-fit";

/** A law that was fitted to traces, with what its marginal quadratic form says at the common σ_j and τ. */
export interface TraceFit {
  readonly id: string;
  readonly law: string;
  /** Fitted parameters of the law, ln k among them; a scale with a stated value is no parameter of the law. */
  readonly parameters: number;
  readonly squares: MarginalSquares;
  readonly estimates: readonly CandidateParameter[];
  readonly extensions: readonly ExtensionFact[];
}

/**
 * Candidates for laws that rates alone cannot tell. The weighted squares of a law are those of its runs' ln k, plus by
 * how much it misses their shape more than the law that misses it least: what all laws miss is noise of the readings,
 * which must not count as scatter of the runs. `recipes`: concentrations of every run in one order of species.
 */
export function traceCandidates(
  fits: readonly TraceFit[],
  recipes: readonly (readonly number[])[],
): readonly FittedCandidate[] {
  const leastShape = Math.min(...fits.map((fit) => fit.squares.shape));
  return fits.map(({ id, law, parameters, squares, estimates, extensions }) => ({
    status: "fitted",
    id,
    law,
    parameters,
    runSquares: Math.max(squares.betweenRuns + squares.shape - leastShape, Number.MIN_VALUE),
    onRates: null,
    estimates,
    lackOfFit:
      squares.runs === null || squares.runs.length !== recipes.length
        ? null
        : replicateLackOfFit(
            recipes,
            squares.runs.map((run) => run.residual),
            squares.runs.map((run) => run.weight),
            parameters,
          ),
    extensions,
  }));
}

/** What a fit of traces says about an added term, by its standard error; `degreesOfFreedom`: m − r of the fit. */
export interface AddedTerm {
  /** Text of the simpler law. */
  readonly law: string;
  readonly parameter: string;
  /** Value at which the term vanishes; ∞ is judged by the reciprocal. */
  readonly at: number;
  readonly estimate: number;
  readonly standardError: number;
  readonly degreesOfFreedom: number;
}

/** Null without a standard error or degrees of freedom. */
export function extensionByStandardError(term: AddedTerm): ExtensionFact | null {
  const { law, parameter, at, estimate, standardError, degreesOfFreedom } = term;
  if (!(degreesOfFreedom > 0 && standardError > 0 && Number.isFinite(estimate))) return null;
  const factor = studentTFactor(INTERVAL_LEVEL, degreesOfFreedom);
  const toEnd = at === Number.POSITIVE_INFINITY;
  // u(1/K) = u(K)/K², so that 1/K is K/u(K) of its own standard errors from 0.
  const tStatistic = Math.abs((toEnd ? estimate : estimate - at) / standardError);
  const coversNull = tStatistic <= factor;
  const half = factor * standardError;
  const reciprocal = (estimate + half) / estimate ** 2;
  const excludes = toEnd
    ? `${parameter} below ${numberInWords(1 / reciprocal)}`
    : `${parameter} further from ${numberInWords(at)} than ${numberInWords(Math.abs(estimate - at) + half)}`;
  return {
    law,
    parameter,
    at,
    tStatistic,
    degreesOfFreedom,
    coversNull,
    excludes: coversNull && (!toEnd || reciprocal > 0) ? excludes : null,
  };
}

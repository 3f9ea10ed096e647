import { studentTFactor } from "kinetics-core/distributions";
import { type Matrix, singularValues } from "kinetics-core/linear-algebra";
import type { Flag } from "kinetics-core/quantities";
import { LEAST_FREE_PART, WIDER_THAN_MODEL } from "./constants";
import { lowerRoot } from "./positive-definite";
import type { RandomRateInference } from "./random-rate-inference";
import type { PriorInformation, RunInformation } from "./run-information";
import { partsOf, type RunParts } from "./run-parts";

/**
 * Standard errors that do not lean on the model of the scatter: the sandwich over runs with the bias-reduced
 * correction CR2 and the degrees of freedom of Bell and McCaffrey (Survey Methodology 28, 169, 2002; Pustejovsky and
 * Tipton, J. Bus. Econ. Stat. 36, 672, 2018), the fitted V as working model.
 *
 * On rows whitened by V_j^−½ let H_j = JᵀV_j⁻¹J, C the covariance, F Fᵀ = C and N_j = FᵀH_jF = Q diag(μ) Qᵀ; μ are the
 * leverages of run j. The correction (I − J C Jᵀ)^−½ of its rows then acts on its score s_j = JᵀV_j⁻¹(r − Jδ) as
 *     a_j = Q (1 − μ)^−½ Qᵀ Fᵀ s_j,    covariance F (Σ a_j a_jᵀ) Fᵀ + C (Σ priors) C,
 * nothing longer than p. With f = Fᵀe_i, the variance of parameter i is a quadratic form in the whitened rows whose
 * matrix has the elements δ_jk w_j − b_jᵀb_k, w_j = fᵀQ μ/(1 − μ) Qᵀf, b_j = Q μ(1 − μ)^−½ Qᵀf; two of its moments give
 * Satterthwaite's degrees of freedom. A prior is an error of stated size and not one of the clusters: its part is
 * added as it stands, and the degrees of freedom follow by Welch.
 */
export interface ClusterRobust {
  readonly status: "determined";
  /** p by p. */
  readonly covariance: readonly (readonly number[])[];
  readonly parameters: readonly {
    readonly standardError: number;
    /** Null where no run has a residual that is free to speak. */
    readonly degreesOfFreedom: number | null;
    /** Width of the 95 % interval over that of the model; null without degrees of freedom on either side. */
    readonly widthOverModel: number | null;
  }[];
  readonly flags: readonly Flag[];
}

export type ClusterRobustResult =
  | ClusterRobust
  | { readonly status: "undetermined"; readonly message: string };

/**
 * `runs`, `priors`: those that `inference` came from; `names`: of the parameters, as messages should print them.
 */
export function clusterRobust(
  runs: readonly RunInformation[],
  priors: readonly PriorInformation[],
  inference: RandomRateInference,
  names: readonly string[],
): ClusterRobustResult {
  const p = inference.step.length;
  const bread = Float64Array.from(inference.workingCovariance.flat());
  const root = lowerRoot(bread, p);
  if (root === null)
    return {
      status: "undetermined",
      message:
        "The covariance of the parameters is singular to rounding, so no standard error can be made from the runs' scores. Hold a parameter or add a run that differs.",
    };
  const clusters = partsOf(runs, inference.noiseVariances).map((part) =>
    clusterOf(part, inference.weightVariance, inference.step, root, p),
  );
  const fromRuns = sandwich(clusters, root, p);
  const fromPriors = priorPart(priors, bread, p);
  const covariance = fromRuns.map((row, i) => row.map((value, j) => value + (fromPriors[i]?.[j] ?? 0)));
  const parameters = covariance.map((row, i) => {
    const variance = row[i] ?? 0;
    const ofRuns = fromRuns[i]?.[i] ?? 0;
    const freedom = ofRuns > 0 ? satterthwaite(clusters, root, i, p) : null;
    const degreesOfFreedom = freedom === null ? null : finiteOrNull(freedom * (variance / ofRuns) ** 2);
    const standardError = Math.sqrt(Math.max(0, variance));
    return {
      standardError,
      degreesOfFreedom,
      widthOverModel: widthOverModel(standardError, degreesOfFreedom, inference, i),
    };
  });
  return {
    status: "determined",
    covariance,
    parameters,
    flags: parameters.flatMap(({ widthOverModel: width }, i) =>
      width !== null && width > WIDER_THAN_MODEL ? [widerFlag(names[i] ?? `parameter ${i + 1}`, width)] : [],
    ),
  };
}

interface Cluster {
  /** Eigenvectors of N_j, element (i, k) at k·p + i. */
  readonly vectors: Matrix;
  /** μ, each below 1 or counted as having no free part. */
  readonly leverages: readonly number[];
  /** a_j. */
  readonly score: Float64Array;
}

function clusterOf(
  part: RunParts,
  weightVariance: number,
  step: Float64Array,
  root: Float64Array,
  p: number,
): Cluster {
  const weight = part.ownVariance === null ? 0 : 1 / (part.ownVariance + weightVariance);
  const information = part.shapeInformation.slice();
  const score = new Float64Array(p);
  for (let i = 0; i < p; i++) {
    const weighted = weight * (part.direction[i] ?? 0);
    let rest = (part.shapeGradient[i] ?? 0) + weighted * part.offset;
    for (let j = 0; j < p; j++) {
      const element = (information[i * p + j] ?? 0) + weighted * (part.direction[j] ?? 0);
      information[i * p + j] = element;
      rest -= element * (step[j] ?? 0);
    }
    score[i] = rest;
  }
  const { values, v } = singularValues({ rows: p, columns: p, values: congruent(information, root, p) });
  const leverages = Array.from(values, (value) => Math.min(1, value));
  const corrected = throughEigenvectors(v, leverages, transposedTimes(root, score, p), correction);
  return { vectors: v, leverages, score: corrected };
}

/** (1 − μ)^−½; a direction that the run alone determines has no residual to correct. */
function correction(leverage: number): number {
  return 1 - leverage > LEAST_FREE_PART ? 1 / Math.sqrt(1 - leverage) : 0;
}

/** Q diag(g(μ)) Qᵀ x. */
function throughEigenvectors(
  vectors: Matrix,
  leverages: readonly number[],
  x: ArrayLike<number>,
  g: (leverage: number) => number,
): Float64Array {
  const p = vectors.rows;
  const result = new Float64Array(p);
  leverages.forEach((leverage, k) => {
    let along = 0;
    for (let i = 0; i < p; i++) along += (vectors.values[k * p + i] ?? 0) * (x[i] ?? 0);
    along *= g(leverage);
    for (let i = 0; i < p; i++) result[i] = (result[i] ?? 0) + along * (vectors.values[k * p + i] ?? 0);
  });
  return result;
}

/** Fᵀ A F. */
function congruent(matrix: Float64Array, root: Float64Array, p: number): Float64Array {
  const half = new Float64Array(p * p);
  for (let i = 0; i < p; i++)
    for (let j = 0; j < p; j++) {
      let sum = 0;
      for (let k = 0; k < p; k++) sum += (matrix[i * p + k] ?? 0) * (root[k * p + j] ?? 0);
      half[i * p + j] = sum;
    }
  const result = new Float64Array(p * p);
  for (let i = 0; i < p; i++)
    for (let j = 0; j < p; j++) {
      let sum = 0;
      for (let k = 0; k < p; k++) sum += (root[k * p + i] ?? 0) * (half[k * p + j] ?? 0);
      result[i * p + j] = sum;
    }
  return result;
}

/** Fᵀ x. */
function transposedTimes(root: Float64Array, x: ArrayLike<number>, p: number): Float64Array {
  const result = new Float64Array(p);
  for (let k = 0; k < p; k++)
    for (let i = 0; i < p; i++) result[i] = (result[i] ?? 0) + (root[k * p + i] ?? 0) * (x[k] ?? 0);
  return result;
}

/** F (Σ a aᵀ) Fᵀ, as the sum of outer products of F a. */
function sandwich(clusters: readonly Cluster[], root: Float64Array, p: number): number[][] {
  const sum = Array.from({ length: p }, () => Array.from({ length: p }, () => 0));
  for (const { score } of clusters) {
    const effect = Array.from({ length: p }, (_, i) => {
      let value = 0;
      for (let k = 0; k < p; k++) value += (root[i * p + k] ?? 0) * (score[k] ?? 0);
      return value;
    });
    sum.forEach((row, i) => {
      for (let j = 0; j < p; j++) row[j] = (row[j] ?? 0) + (effect[i] ?? 0) * (effect[j] ?? 0);
    });
  }
  return sum;
}

/** C (Σ 1/u² at the prior's place) C. */
function priorPart(
  priors: readonly PriorInformation[],
  covariance: Float64Array,
  p: number,
): readonly (readonly number[])[] {
  return Array.from({ length: p }, (_, i) =>
    Array.from({ length: p }, (_unused, j) =>
      priors.reduce(
        (sum, { parameter, standardUncertainty }) =>
          sum +
          ((covariance[i * p + parameter] ?? 0) * (covariance[parameter * p + j] ?? 0)) /
            standardUncertainty ** 2,
        0,
      ),
    ),
  );
}

/** (Σ g_jj)²/ΣΣ g_jk² with g_jk = δ_jk w_j − b_jᵀb_k, by way of Σ b bᵀ so that the work grows with the runs only. */
function satterthwaite(
  clusters: readonly Cluster[],
  root: Float64Array,
  parameter: number,
  p: number,
): number | null {
  const f = root.slice(parameter * p, (parameter + 1) * p);
  const outer = new Float64Array(p * p);
  let trace = 0;
  let own = 0;
  for (const { vectors, leverages } of clusters) {
    const b = throughEigenvectors(vectors, leverages, f, (leverage) => leverage * correction(leverage));
    const wide = throughEigenvectors(
      vectors,
      leverages,
      f,
      (leverage) => leverage * correction(leverage) ** 2,
    );
    let w = 0;
    let square = 0;
    for (let i = 0; i < p; i++) {
      w += (f[i] ?? 0) * (wide[i] ?? 0);
      square += (b[i] ?? 0) ** 2;
      for (let j = 0; j < p; j++) outer[i * p + j] = (outer[i * p + j] ?? 0) + (b[i] ?? 0) * (b[j] ?? 0);
    }
    trace += w - square;
    own += w * (w - 2 * square);
  }
  const squares = own + outer.reduce((sum, value) => sum + value ** 2, 0);
  return squares > 0 ? finiteOrNull(trace ** 2 / squares) : null;
}

function widthOverModel(
  standardError: number,
  degreesOfFreedom: number | null,
  inference: RandomRateInference,
  parameter: number,
): number | null {
  const model = Math.sqrt(Math.max(0, inference.covariance[parameter]?.[parameter] ?? 0));
  if (degreesOfFreedom === null || inference.degreesOfFreedom <= 0 || !(model > 0)) return null;
  const ratio = standardError / model;
  return finiteOrNull(
    (ratio * studentTFactor(0.95, degreesOfFreedom)) / studentTFactor(0.95, inference.degreesOfFreedom),
  );
}

function finiteOrNull(value: number): number | null {
  return Number.isFinite(value) && value > 0 ? value : null;
}

function widerFlag(name: string, width: number): Flag {
  return {
    code: "cluster-robust-wider",
    // With few runs chance alone does this: in 23 % of simulated clean studies of 8 runs.
    severity: "note",
    message: `The interval of ${name} is ${width.toFixed(1)} times wider when it rests on the runs' own departures instead of a common scatter of ln k: the runs may scatter unevenly, or few runs look so by chance. Look for a run that departs, or repeat runs.`,
  };
}

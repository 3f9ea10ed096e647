import type { PriorInformation, RandomRateInference, RunInformation } from "kinetics-core/inference";
import { NormalStep } from "./normal-step";

/** Below this part of a parameter's information from within the runs it is counted as left to differences between them. */
const LEAST_WITHIN = 0.5;

/**
 * r of the m − r degrees of freedom: ln k, and every free parameter of the law of which the shapes of the traces
 * tell less than half, so that differences between runs, which scatter, decide it.
 *
 * The shapes alone, each run with a free ln k of its own, have the information Σ_j (G_j − G_j e eᵀG_j/eᵀG_j e)/σ_j² and
 * what is stated beside it; W is its inverse. With the differences between runs the variance is C; C_ii/W_ii is the
 * part that the shapes tell.
 *
 * Against counting the reactants that change by less than a tenth within the runs: at a quarter of conversion an order
 * is still told by the differences, and with six runs that count left its intervals at 90 to 93 %.
 */
export function leftToRuns(
  information: readonly RunInformation[],
  priors: readonly PriorInformation[],
  inference: RandomRateInference,
  lawParameters: number,
): number {
  const p = inference.step.length;
  const shapes = new Float64Array(p * p);
  information.forEach(({ gram }, j) => {
    const own = gram[0] ?? 0;
    const weight = 1 / (inference.noiseVariances[j] ?? 1);
    if (!(own > 0 && Number.isFinite(weight))) return;
    for (let a = 1; a < p; a++)
      for (let b = 1; b < p; b++) {
        const left = (gram[a * p + b] ?? 0) - ((gram[a * p] ?? 0) * (gram[b] ?? 0)) / own;
        shapes[a * p + b] = (shapes[a * p + b] ?? 0) + weight * left;
      }
  });
  for (const { parameter, standardUncertainty } of priors) {
    const place = parameter * p + parameter;
    shapes[place] = (shapes[place] ?? 0) + 1 / standardUncertainty ** 2;
  }
  const within = new NormalStep(p).inverse(shapes);
  let left = 1;
  for (let i = 1; i <= lawParameters; i++) {
    const variance = within[i * p + i] ?? 0;
    const told = variance > 0 ? (inference.covariance[i]?.[i] ?? 0) / variance : 0;
    if (told < LEAST_WITHIN) left++;
  }
  return left;
}

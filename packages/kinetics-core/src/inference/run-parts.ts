import { sum } from "kinetics-core/summation";
import { FEWEST_OWN_FREEDOM, LEAST_RELATIVE_NOISE, ROUNDING_OF_SUBTRACTION } from "./constants";
import type { RunInformation } from "./run-information";

/**
 * What one run says, parted into what it says about its own ln k_j and what its shape says whatever ln k_j is.
 *
 * With a = eᵀG e the information on ln k (e the ln k column), the run's own ln k alone would move by z = eᵀg/a with
 * variance h = σ²/a; u = G e/a is how that ln k_j answers to θ. What remains is the Schur complement
 * S = G − G e eᵀG/a, s = g − G e z. Then for V = σ²I + τ² J e eᵀJᵀ
 *     JᵀV⁻¹J = S/σ² + u uᵀ/(h + τ²),      JᵀV⁻¹r = s/σ² + u z/(h + τ²),
 *     rᵀV⁻¹r = (rᵀr − a z²)/σ² + z²/(h + τ²),      ln|V| = ln|σ²I| + ln(1 + τ²/h),
 * which is G/σ² − G e eᵀG/σ⁴/(1/τ² + a/σ²) and its like (Sherman and Morrison) written without the difference of two
 * large numbers that a precise trace makes of it.
 */
export interface RunParts {
  readonly label: string;
  /** σ² = s²(1 + ρ)/(1 − ρ): variance of an independent reading that would tell as much. */
  readonly noiseVariance: number;
  /** h; null where the run says nothing about ln k. */
  readonly ownVariance: number | null;
  /** z. */
  readonly offset: number;
  /** u. */
  readonly direction: Float64Array;
  /** S/σ², p by p, row after row. */
  readonly shapeInformation: Float64Array;
  /** s/σ². */
  readonly shapeGradient: Float64Array;
  /** (rᵀr − a z²)/σ². */
  readonly shapeQuadratic: number;
}

/** `noiseVariances`: σ² of each run where they are held; otherwise from each run's own fit with its own ln k. */
export function partsOf(
  runs: readonly RunInformation[],
  noiseVariances?: readonly number[],
): readonly RunParts[] {
  const p = runs[0]?.gradient.length ?? 0;
  const own = noiseVariances ?? ownNoise(runs);
  return runs.map((run, j) => onePart(run, own[j] ?? 1, p));
}

function onePart(run: RunInformation, noiseVariance: number, p: number): RunParts {
  const { gram, gradient } = run;
  const information = gram[0] ?? 0;
  const tells = information > 0 && Number.isFinite(noiseVariance / information);
  const direction = new Float64Array(p);
  const offset = tells ? (gradient[0] ?? 0) / information : 0;
  if (tells) for (let i = 0; i < p; i++) direction[i] = (gram[i * p] ?? 0) / information;
  const shapeInformation = new Float64Array(p * p);
  const shapeGradient = new Float64Array(p);
  for (let i = 1; i < p; i++) {
    const diagonal = gram[i * p + i] ?? 0;
    const left = diagonal - information * (direction[i] ?? 0) ** 2;
    if (!(left > ROUNDING_OF_SUBTRACTION * diagonal)) continue;
    for (let j = 1; j < p; j++)
      shapeInformation[i * p + j] =
        ((gram[i * p + j] ?? 0) - information * (direction[i] ?? 0) * (direction[j] ?? 0)) / noiseVariance;
    shapeGradient[i] = ((gradient[i] ?? 0) - information * (direction[i] ?? 0) * offset) / noiseVariance;
  }
  clearColumnsOfEmptyRows(shapeInformation, p);
  return {
    label: run.label,
    noiseVariance,
    ownVariance: tells ? noiseVariance / information : null,
    offset,
    direction,
    shapeInformation,
    shapeGradient,
    shapeQuadratic: ownSquares(run) / noiseVariance,
  };
}

function clearColumnsOfEmptyRows(matrix: Float64Array, p: number): void {
  for (let i = 0; i < p; i++) if (matrix[i * p + i] === 0) for (let j = 0; j < p; j++) matrix[j * p + i] = 0;
}

/** Sum of squares that is left when the run has its own ln k. */
function ownSquares(run: RunInformation): number {
  const information = run.gram[0] ?? 0;
  const explained = information > 0 ? (run.gradient[0] ?? 0) ** 2 / information : 0;
  return Math.max(0, run.residualSquares - explained);
}

/** σ² of each run: from its own fit, from all runs together where it has too few points for that. */
function ownNoise(runs: readonly RunInformation[]): readonly number[] {
  const freedoms = runs.map((run) => Math.max(0, run.degreesOfFreedom - 1));
  const squares = runs.map(ownSquares);
  const totalFreedom = sum(freedoms);
  const pooled = totalFreedom > 0 ? sum(squares) / totalFreedom : 0;
  const perPoint = Math.max(0, ...runs.map((run) => (run.gram[0] ?? 0) / Math.max(1, run.points)));
  const least = LEAST_RELATIVE_NOISE ** 2 * perPoint;
  return runs.map((run, j) => {
    const freedom = freedoms[j] ?? 0;
    const variance = freedom >= FEWEST_OWN_FREEDOM ? (squares[j] ?? 0) / freedom : pooled;
    const { autocorrelation } = run;
    return Math.max((variance * (1 + autocorrelation)) / (1 - autocorrelation), least, Number.MIN_VALUE);
  });
}

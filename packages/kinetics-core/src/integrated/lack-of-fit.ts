import { fSurvival } from "kinetics-core/distributions";
import { quadraticForm } from "kinetics-core/initial-rate";
import { dot } from "kinetics-core/linear-algebra";
import { courseNoise } from "./course-noise";

/**
 * Whether a course follows the readings, or leaves a smooth pattern in its residuals. The pattern is looked for in
 * directions that no parameter of the course has: powers of the part that is left (2, 3 and 4 in turn with the time
 * itself, which sees a drift after the end), made orthogonal to the columns of the fit. The progress of the reaction is
 * the axis on which courses of one or two phases are smooth; a polynomial in time would fail on readings that span decades.
 *
 * With correlated noise a smooth direction q carries variance σ²qᵀRq; σ and ρ are those of the residuals that remain
 * after the directions are removed. With ρ = 0 this is the usual F.
 */
export interface LackOfFit {
  readonly ratio: number;
  readonly above: number;
  readonly below: number;
  readonly pValue: number;
}

/** One direction for every four readings beyond the first four, three at most: as the degree of the noise polynomial. */
const READINGS_PER_DIRECTION = 4;
const MOST_DIRECTIONS = 3;
/** Degrees of freedom that must remain to judge by. */
const LEAST_REMAINING = 3;
const COLLINEAR = 1e-6;

/**
 * `residuals`: measured less fitted, one a reading. `basis`: orthonormal on the readings, what the fit spans. `left`:
 * part left, in any scale. `rounding`: what a reading can be uncertain by at least. Null where the readings are too few.
 */
export function lackOfFit(
  time: Float64Array,
  left: Float64Array,
  residuals: Float64Array,
  basis: readonly Float64Array[],
  rounding: number,
): LackOfFit | null {
  const n = time.length;
  const wanted = Math.min(Math.floor(n / READINGS_PER_DIRECTION) - 1, MOST_DIRECTIONS);
  if (wanted < 1 || n - basis.length - wanted < LEAST_REMAINING) return null;
  const directions = newDirections([power(left, 2), time, power(left, 3), power(left, 4)], basis, wanted);
  if (directions.length === 0) return null;

  const remaining = Float64Array.from(residuals);
  removeAll(remaining, basis);
  const before = dot(remaining, remaining);
  removeAll(remaining, directions);
  const excess = before - dot(remaining, remaining);
  const noise = courseNoise(time, remaining, [...basis, ...directions], rounding);
  const variance = noise.standardDeviation ** 2;
  const carried = directions.reduce((sum, direction) => sum + quadraticForm(direction, noise.steps, 0), 0);
  const [above, below] = [directions.length, noise.degreesOfFreedom];
  const ratio = excess <= n * rounding ** 2 ? 0 : excess / (carried * variance);
  return { ratio, above, below, pValue: fSurvival(ratio, above, below) };
}

/** Powers of a part that runs from −1 to 1, so that neighbours are far from parallel. */
function power(left: Float64Array, exponent: number): Float64Array {
  let [low, high] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY];
  for (const part of left) {
    low = Math.min(low, part);
    high = Math.max(high, part);
  }
  const [middle, half] = [(low + high) / 2, (high - low) / 2 || 1];
  return left.map((part) => ((part - middle) / half) ** exponent);
}

function newDirections(
  candidates: readonly Float64Array[],
  basis: readonly Float64Array[],
  wanted: number,
): Float64Array[] {
  const directions: Float64Array[] = [];
  for (const candidate of candidates) {
    if (directions.length === wanted) break;
    const own = Float64Array.from(candidate);
    const length = Math.sqrt(dot(own, own));
    removeAll(own, [...basis, ...directions]);
    const rest = Math.sqrt(dot(own, own));
    if (rest > COLLINEAR * length) directions.push(own.map((entry) => entry / rest));
  }
  return directions;
}

/** Gram-Schmidt, twice: once leaves a trace of what it removed when little remains. */
function removeAll(column: Float64Array, directions: readonly Float64Array[]): void {
  for (let pass = 0; pass < 2; pass++) {
    for (const direction of directions) {
      const share = dot(column, direction);
      for (let i = 0; i < column.length; i++) column[i] = (column[i] ?? 0) - share * (direction[i] ?? 0);
    }
  }
}

import type { NonlinearProblem } from "kinetics-core/least-squares";
import { dot } from "kinetics-core/linear-algebra";
import type { CourseLaw, CourseParameter } from "./course-law";
import type { EndCondition } from "./end-signal";

/**
 * The least-squares problem of one trace with its scales and end signal eliminated at every θ (variable projection;
 * Golub and Pereyra, SIAM J. Numer. Anal. 10 (1973) 413-432, with the Jacobian of Kaufman, BIT 15 (1975) 49-57, whose
 * gradient is exact). With A = [1, parts] and P the projector away from its columns,
 *
 *   r(θ) = P y,   ∂r/∂θ_j = −P Σ_s scale_s ∂part_s/∂θ_j.
 *
 * An end signal that was measured is one more row, (1, 0 … 0) with value E, both times its weight; one that is exact is
 * subtracted from y and has no column.
 */
export interface ProjectedCourse extends NonlinearProblem {
  readonly bounds: readonly (readonly [number, number])[];
  /** Of the last evaluation: the end signal and the scales of the parts, all on the scaled signal. */
  readonly linear: { end: number; readonly scales: Float64Array };
  /** Of the last evaluation: parts at the readings, and their derivatives by θ_j: `derivatives[j][s]`. */
  readonly parts: readonly Float64Array[];
  readonly derivatives: readonly (readonly Float64Array[])[];
}

export function projectedCourse(
  law: CourseLaw,
  time: Float64Array,
  signal: Float64Array,
  end: EndCondition,
): ProjectedCourse {
  const readings = time.length;
  const rows = end.kind === "observed" ? readings + 1 : readings;
  const column = () => new Float64Array(rows);
  const onReadings = (whole: Float64Array) => whole.subarray(0, readings);
  const parts = Array.from({ length: law.species }, column);
  const derivatives = law.parameters.map(() => parts.map(column));
  const [partsOnReadings, derivativesOnReadings] = [
    parts.map(onReadings),
    derivatives.map((bySpecies) => bySpecies.map(onReadings)),
  ];
  const hasEnd = end.kind !== "fixed";
  const ones = column().fill(1);
  const target = column();
  for (let i = 0; i < readings; i++) target[i] = (signal[i] ?? Number.NaN) - (hasEnd ? 0 : end.value);
  if (end.kind === "observed") {
    ones[readings] = end.weight;
    target[readings] = end.weight * end.value;
  }
  const basis = orthonormalBasis(hasEnd ? [ones, ...parts] : parts);
  const linear = { end: end.kind === "fixed" ? end.value : 0, scales: new Float64Array(law.species) };
  const coefficients = new Float64Array(basis.columns);

  return {
    residuals: rows,
    parameters: law.parameters.length,
    bounds: law.parameters.map((parameter) => boundsBeside(parameter, end)),
    linear,
    parts: partsOnReadings,
    derivatives: derivativesOnReadings,
    evaluate(theta, residuals, jacobian) {
      if (!law.evaluate(time, theta, partsOnReadings, derivativesOnReadings)) return false;
      basis.renew();
      basis.project(target, residuals, coefficients);
      const first = hasEnd ? 1 : 0;
      if (hasEnd) linear.end = coefficients[0] ?? Number.NaN;
      for (let s = 0; s < law.species; s++) linear.scales[s] = coefficients[first + s] ?? Number.NaN;
      jacobian?.forEach((into, j) => {
        into.fill(0);
        derivatives[j]?.forEach((derivative, s) => {
          const scale = linear.scales[s] ?? Number.NaN;
          for (let i = 0; i < readings; i++) into[i] = (into[i] ?? 0) - scale * (derivative[i] ?? Number.NaN);
        });
        const before = dot(into, into);
        basis.project(into, into, null);
        // What the linear columns imitate to rounding is no direction to search along.
        if (dot(into, into) <= IMITATED * IMITATED * before) into.fill(0);
      });
      return true;
    },
  };
}

/**
 * With a free end a course that moves by less than a ten-thousandth of the way is a straight line, whatever it would
 * turn into; its scale would grow without bound.
 */
const LEAST_LOG_RATE_OF_FREE_END = Math.log(1e-4);

function boundsBeside({ kind, bounds }: CourseParameter, end: EndCondition): readonly [number, number] {
  return kind === "rate" && end.kind === "free"
    ? [Math.max(bounds[0], LEAST_LOG_RATE_OF_FREE_END), bounds[1]]
    : bounds;
}

/** A column that is all but a combination of the earlier ones says nothing of its own. */
const COLLINEAR = 1e-12;
const IMITATED = 1e-11;

interface Basis {
  readonly columns: number;
  /** Orthonormalises the columns as they stand now. */
  renew(): void;
  /** Writes what is left of `vector` outside the span into `into`, and its coefficients in the columns. */
  project(vector: Float64Array, into: Float64Array, coefficients: Float64Array | null): void;
}

/** Gram-Schmidt, each column twice: once leaves a trace of what it removed when little remains. */
function orthonormalBasis(columns: readonly Float64Array[]): Basis {
  const count = columns.length;
  const orthonormal = columns.map((column) => new Float64Array(column.length));
  /** R of A = Q R, row after row; a dropped column has 0 on the diagonal. */
  const triangle = new Float64Array(count * count);
  const along = new Float64Array(count);
  const remove = (from: Float64Array, direction: Float64Array): number => {
    const share = dot(from, direction);
    for (let i = 0; i < from.length; i++) from[i] = (from[i] ?? 0) - share * (direction[i] ?? 0);
    return share;
  };
  return {
    columns: count,
    renew() {
      triangle.fill(0);
      columns.forEach((column, j) => {
        const own = orthonormal[j];
        if (!own) return;
        own.set(column);
        const before = Math.sqrt(dot(own, own));
        for (let pass = 0; pass < 2; pass++) {
          for (let k = 0; k < j; k++) {
            const direction = orthonormal[k];
            if (direction) triangle[k * count + j] = (triangle[k * count + j] ?? 0) + remove(own, direction);
          }
        }
        const after = Math.sqrt(dot(own, own));
        const kept = after > COLLINEAR * before;
        triangle[j * count + j] = kept ? after : 0;
        for (let i = 0; i < own.length; i++) own[i] = kept ? (own[i] ?? 0) / after : 0;
      });
    },
    project(vector, into, coefficients) {
      if (into !== vector) into.set(vector);
      along.fill(0);
      for (let pass = 0; pass < 2; pass++) {
        orthonormal.forEach((direction, j) => {
          along[j] = (along[j] ?? 0) + remove(into, direction);
        });
      }
      if (coefficients === null) return;
      for (let j = count - 1; j >= 0; j--) {
        let sum = along[j] ?? 0;
        for (let k = j + 1; k < count; k++) sum -= (triangle[j * count + k] ?? 0) * (coefficients[k] ?? 0);
        const pivot = triangle[j * count + j] ?? 0;
        coefficients[j] = pivot === 0 ? 0 : sum / pivot;
      }
    },
  };
}

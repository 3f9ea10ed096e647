import { Course, type CourseTask } from "./course";
import { DENSE_COEFFICIENTS } from "./dormand-prince";
import type { PreparedRun, PreparedStudy } from "./prepared-study";

/**
 * Signal of the course and its derivatives at every reading of a run, one by one: what `TracePass` sums without ever
 * forming it. For an optimiser that wants residuals, and to hold the sums against.
 *
 * `derivatives[0]` by ln k, then by the law's parameters, last by the ratio of the scale; the constant part of the
 * scale's is left out, as the offset takes it. False where the law has no course.
 */
export function evaluatePoints(
  study: PreparedStudy,
  run: PreparedRun,
  place: PointPlace,
  signal: Float64Array,
  derivatives: readonly Float64Array[],
): boolean {
  const { law, scale, followedNumber } = study;
  const k = Math.exp(place.logRateConstant);
  const factor = scale * followedNumber * place.scale;
  law.begin(run.concentrations, place.parameters);
  const task: CourseTask = { system: law, least: run.least, most: run.most, span: run.span };
  const course = new Course(task);
  const end = k * ((run.time[run.time.length - 1] ?? 0) - place.timeZero);
  if (!(end < Number.MAX_VALUE)) return false;
  if (end > 0 && !course.begin(task, end, place.tolerance, 0)) return false;
  let piece: ReturnType<Course["next"]> | null = null;
  for (let i = 0; i < run.time.length; i++) {
    const elapsed = (run.time[i] ?? 0) - place.timeZero;
    if (elapsed <= 0) {
      signal[i] = 0;
      for (const column of derivatives) column[i] = 0;
      continue;
    }
    while (piece === null || (piece === "piece" && k * elapsed > course.until)) piece = course.next();
    if (piece === "failed") return false;
    const v = piece === "rest" ? 0 : (k * elapsed - course.from) / course.length - 0.5;
    const extent = valueAt(course.coefficients, 0, v);
    const rate = piece === "rest" ? 0 : slopeAt(course.coefficients, v) / course.length;
    signal[i] = factor * extent;
    derivatives.forEach((column, j) => {
      if (j === 0) column[i] = factor * k * elapsed * rate;
      else if (j <= law.free.length)
        column[i] = factor * (law.sensitivity === "integral" ? rate : 1) * valueAt(course.coefficients, j, v);
      else column[i] = scale * followedNumber * place.ownScale * extent;
    });
  }
  return true;
}

export interface PointPlace {
  readonly logRateConstant: number;
  /** Free parameters of the law. */
  readonly parameters: ArrayLike<number>;
  /** Ratio to the stated signal per concentration, the run's own included. */
  readonly scale: number;
  /** The run's own part of that ratio. */
  readonly ownScale: number;
  readonly timeZero: number;
  readonly tolerance: number;
}

function valueAt(coefficients: Float64Array, component: number, v: number): number {
  const at = component * DENSE_COEFFICIENTS;
  let value = 0;
  for (let m = DENSE_COEFFICIENTS - 1; m >= 0; m--) value = value * v + (coefficients[at + m] ?? 0);
  return value;
}

function slopeAt(coefficients: Float64Array, v: number): number {
  let value = 0;
  for (let m = DENSE_COEFFICIENTS - 1; m >= 1; m--) value = value * v + m * (coefficients[m] ?? 0);
  return value;
}

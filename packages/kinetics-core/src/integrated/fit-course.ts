import { quadraticForm } from "kinetics-core/initial-rate";
import { dot } from "kinetics-core/linear-algebra";
import type { CourseLaw } from "./course-law";
import { type CourseNoise, correlationInflation, courseNoise } from "./course-noise";
import type { EndCondition } from "./end-signal";
import { linearInformation } from "./linear-information";
import { type CourseFound, type CourseSearch, type ScaledTrace, searchCourse } from "./search-course";

/** What is known of the end, on the scaled signal. `standardUncertainty` above 0. */
export type ScaledEnd =
  | { readonly kind: "fixed"; readonly value: number }
  | { readonly kind: "free" }
  | { readonly kind: "stated"; readonly value: number; readonly standardUncertainty: number };

/** ∂f/∂(θ, scales, end signal) of a quantity f. Trailing zeros may be left out of `theta` and `scales`. */
export interface Gradient {
  readonly theta: readonly number[];
  readonly scales: readonly number[];
  readonly end: number;
}

export interface CourseFit {
  readonly status: "fitted";
  readonly found: CourseFound;
  readonly condition: EndCondition;
  readonly noise: CourseNoise;
  /** Fitted parameters: θ, scales, and the end signal unless it is fixed. */
  readonly parameters: number;
  /**
   * Whether each of θ was stopped by a bound. One that the readings do not determine anyway is not: it may rest there,
   * while quantities that do not lean on it stand (the slope of a straight trace).
   */
  readonly stopped: readonly boolean[];
  /** A free end rests on one or two readings behind a corner, and so on their noise. */
  readonly cornered: boolean;
  /** The fit with a free end, where the end is stated. */
  readonly freeEnd: CourseResult | null;
  /** (fitted end − stated end)/u; 0 where there is no stated end. */
  readonly endDeviation: number;
  /**
   * Error of a quantity by its gradient, correlated noise and the end's own uncertainty counted; "undetermined" where the
   * readings do not fix the quantity.
   */
  errorOf(gradient: Gradient): QuantityError | "undetermined";
}

export interface QuantityError {
  /** Null where nothing is left to judge the noise by. */
  readonly standardError: number | null;
  readonly degreesOfFreedom: number;
}

export type CourseResult = CourseFit | Exclude<CourseSearch, CourseFound>;

/** With fewer degrees of freedom the noise of the fit with a free end is no guide for the weight of a stated one. */
const LEAST_GUIDING_FREEDOM = 3;
const MOST_WEIGHINGS = 4;
/** The weight has settled when it moves by less than this part; estimates feel a tenth of that. */
const SETTLED = 0.02;
/** Weights beyond these make an end exact, or a mere tie-break where readings are exact. */
const LEAST_WEIGHT = 1e-6;
const LARGEST_WEIGHT = 1e6;

/** One trace fitted by one law. Plain least squares on the readings; see `fitStated` for an end with its own uncertainty. */
export function fitCourse(law: CourseLaw, trace: ScaledTrace, end: ScaledEnd): CourseResult {
  if (end.kind === "stated") return fitStated(law, trace, end);
  if (end.kind === "free") return fitFree(law, trace);
  const found = searchCourse(law, trace, end);
  return found.status === "found" ? linearisedFit(found, trace, end) : found;
}

/**
 * With a free end, a law that uses everything up can put its corner before the last reading or two and follow their
 * noise. An end of the course is believed when three readings lie behind it and it lowers the sum of squares by more
 * than noise would; else the same law is fitted with its end after the last reading, and where that cannot be asked
 * for (a free order), the fit says that its end rests on a corner.
 */
function fitFree(law: CourseLaw, trace: ScaledTrace): CourseResult {
  const condition = { kind: "free" } as const;
  const found = searchCourse(law, trace, condition);
  if (found.status !== "found") return found;
  const fit = linearisedFit(found, trace, condition);
  const over = law.endOfCourse?.(found.theta) ?? Number.POSITIVE_INFINITY;
  if (over >= 1 && !fit.stopped.includes(true)) return fit;
  const behind = trace.time.reduce((count, time) => count + (time > over ? 1 : 0), 0);
  if (law.withinCourse === undefined)
    return { ...fit, cornered: over < 1 && behind < READINGS_BEHIND_CORNER };
  const within = searchCourse(law.withinCourse, trace, condition);
  if (within.status !== "found") return fit;
  const gain = (within.residualSquares - found.residualSquares) / effectiveDeviation(fit.noise) ** 2;
  const believed = behind >= READINGS_BEHIND_CORNER && gain > CORNER_EVIDENCE;
  return believed ? fit : linearisedFit(within, trace, condition);
}

const READINGS_BEHIND_CORNER = 3;
/** χ² with 2 degrees of freedom exceeds this once in 150. */
const CORNER_EVIDENCE = 10;

/**
 * The end as one more observation. Beside readings whose effective standard deviation is σ·√((1 + ρ)/(1 − ρ)), so that
 * n of them weigh as N_eff = n(1 − ρ)/(1 + ρ) independent ones, it has the weight of that over u. σ and ρ come first
 * from the fit with a free end, which a wrong statement cannot disturb, then from the fit itself until they settle.
 */
function fitStated(
  law: CourseLaw,
  trace: ScaledTrace,
  end: Extract<ScaledEnd, { kind: "stated" }>,
): CourseResult {
  const free = fitFree(law, trace);
  const guide =
    free.status === "fitted" && free.noise.degreesOfFreedom >= LEAST_GUIDING_FREEDOM
      ? free
      : fitCourse(law, trace, { kind: "fixed", value: end.value });
  let weight = guide.status === "fitted" ? weightBeside(guide.noise, end.standardUncertainty) : 1;
  let near: Float64Array | undefined;
  for (let round = 1; ; round++) {
    const condition = { kind: "observed", value: end.value, weight } as const;
    const found = searchCourse(law, trace, condition, near);
    if (found.status !== "found") return found;
    const fit = linearisedFit(found, trace, condition, end.standardUncertainty);
    const next = weightBeside(fit.noise, end.standardUncertainty);
    if (round === MOST_WEIGHINGS || Math.abs(next - weight) <= SETTLED * weight)
      return { ...fit, freeEnd: free };
    weight = next;
    near = found.theta;
  }
}

/** σ·√((1 + ρ)/(1 − ρ)): n correlated readings weigh as n independent ones of this deviation. */
export function effectiveDeviation(noise: CourseNoise): number {
  return noise.standardDeviation * correlationInflation(noise.autocorrelation);
}

function weightBeside(noise: CourseNoise, standardUncertainty: number): number {
  return Math.min(Math.max(effectiveDeviation(noise) / standardUncertainty, LEAST_WEIGHT), LARGEST_WEIGHT);
}

/** A course that was found, with its noise and what it knows of its parameters. */
export function linearisedFit(
  found: CourseFound,
  { time, rounding }: ScaledTrace,
  condition: EndCondition,
  endUncertainty = 0,
): CourseFit {
  const jacobian = courseJacobian(found, condition);
  const information = linearInformation(jacobian);
  const noise = courseNoise(time, found.residuals, information.basis, rounding);
  const { scales, end } = found.problem.linear;
  const width = found.theta.length;
  const isDetermined = (j: number) => information.rowOf(jacobian.map((_, i) => (i === j ? 1 : 0))) !== null;
  return {
    status: "fitted",
    found,
    condition,
    noise,
    stopped: found.held.map((held, j) => held && isDetermined(j)),
    parameters: jacobian.length,
    cornered: false,
    freeEnd: null,
    endDeviation: condition.kind === "observed" ? (end - condition.value) / endUncertainty : 0,
    errorOf(gradient) {
      const flat = [
        ...Array.from({ length: width }, (_, j) => gradient.theta[j] ?? 0),
        ...Array.from(scales, (_, s) => gradient.scales[s] ?? 0),
        ...(condition.kind === "fixed" ? [] : [gradient.end]),
      ];
      const row = information.rowOf(flat);
      return row === null ? "undetermined" : quantityError(row, noise, condition, endUncertainty);
    },
  };
}

/** Columns ∂S/∂(θ, scales, end signal), on the rows of the fit. */
export function courseJacobian({ problem, theta }: CourseFound, condition: EndCondition): Float64Array[] {
  const { parts, derivatives, linear, residuals: rows } = problem;
  const readings = parts[0]?.length ?? 0;
  const byTheta = Array.from(theta, (_, j) => {
    const column = new Float64Array(rows);
    derivatives[j]?.forEach((derivative, s) => {
      const scale = linear.scales[s] ?? Number.NaN;
      for (let i = 0; i < readings; i++) column[i] = (column[i] ?? 0) + scale * (derivative[i] ?? Number.NaN);
    });
    return column;
  });
  const byScale = parts.map((part) => {
    const column = new Float64Array(rows);
    column.set(part);
    return column;
  });
  if (condition.kind === "fixed") return [...byTheta, ...byScale];
  const byEnd = new Float64Array(rows).fill(1);
  if (condition.kind === "observed") byEnd[readings] = condition.weight;
  return [...byTheta, ...byScale, byEnd];
}

/**
 * u² = σ²·aᵀRa + (a_end·weight·u_end)² with a the row of the quantity; see `LinearInformation`. Only the first term was
 * estimated from the readings, so that the degrees of freedom are ν·(u²/σ²aᵀRa)² (Welch and Satterthwaite). With
 * correlated readings they stay ν: how the end shares in a quantity then rests on ρ, which is no better known (with 100
 * readings and ρ = 0.8 orders were covered in 93 % by the former and in 95 % by the latter).
 */
function quantityError(
  row: Float64Array,
  noise: CourseNoise,
  condition: EndCondition,
  endUncertainty: number,
): QuantityError {
  if (noise.degreesOfFreedom === 0) return { standardError: null, degreesOfFreedom: 0 };
  const readings = noise.steps.length;
  const onReadings = row.subarray(0, readings);
  const carried =
    noise.autocorrelation === 0 ? dot(onReadings, onReadings) : quadraticForm(onReadings, noise.steps, 0);
  const byNoise = noise.standardDeviation ** 2 * carried;
  const byEnd =
    condition.kind === "observed" ? ((row[readings] ?? 0) * condition.weight * endUncertainty) ** 2 : 0;
  return {
    standardError: Math.sqrt(byNoise + byEnd),
    degreesOfFreedom:
      byEnd === 0 || noise.autocorrelation > 0
        ? noise.degreesOfFreedom
        : noise.degreesOfFreedom * ((byNoise + byEnd) / byNoise) ** 2,
  };
}

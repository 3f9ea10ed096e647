import { scaled, slopePolynomial, timesIntegral, timesTime } from "./column-polynomials";
import { ColumnSums } from "./column-sums";
import { Course, type CourseTask } from "./course";
import { DENSE_COEFFICIENTS } from "./dormand-prince";
import { PieceMoments } from "./piece-moments";
import type { PreparedRun, PreparedStudy } from "./prepared-study";
import { projectRun } from "./project-run";
import type { RunLinearisation } from "./run-linearisation";

/**
 * One pass over a trace: residual and Jacobian together, from the dense output of the run's course, and their sums.
 *
 *   signal = offset + s·c(t),   c = c₀ + ν ξ(τ),   τ = k (t − t₀),   s = stated · ratio of the scale · the run's own
 *   ∂signal/∂ln k = s ν τ f      ∂signal/∂θ_j = s ν ∂ξ/∂θ_j      ∂signal/∂t₀ = −s ν k f
 *   ∂signal/∂ratio = stated · own ratio · ν ξ   (its constant part falls to the offset)
 *
 * with ξ, f = dξ/dτ and the integrals as polynomials on each step: no logarithm and no power a point.
 */
export class TracePass {
  private study: PreparedStudy;
  private readonly course: Course;
  private readonly tasks: readonly CourseTask[];
  private readonly sums: ColumnSums;
  private readonly moments = new PieceMoments();
  private readonly layout: ColumnLayout;
  /** Free parameters of the law alone, as it takes them. */
  private readonly lawParameters: Float64Array;
  /** On the present piece: the signal of the course, and s ν f. */
  private readonly model = new Float64Array(DENSE_COEFFICIENTS);
  private readonly slope = new Float64Array(DENSE_COEFFICIENTS);
  private readonly endRow: Float64Array;
  private rateConstant = 1;
  /** s ν, and the same with the ratio of the scale at one. */
  private factor = 1;
  private statedFactor = 1;

  constructor(study: PreparedStudy) {
    this.study = study;
    this.layout = columnLayout(study);
    this.sums = new ColumnSums(this.layout.width);
    this.endRow = new Float64Array(this.layout.width);
    this.lawParameters = new Float64Array(study.law.free.length);
    this.tasks = study.runs.map(({ least, most, span }) => ({ system: study.law, least, most, span }));
    this.course = new Course({ system: study.law, least: 0, most: 0, span: 1 });
  }

  /** Goes on with other readings of the same runs. */
  read(study: PreparedStudy): void {
    this.study = study;
  }

  /**
   * Linearises run number `index` at θ and at the run's own deviation, time zero and scale ratio, which `into` holds.
   * False where the law has no finite course there; `into` is then not to be read.
   */
  run(index: number, theta: Float64Array, tolerance: number, into: RunLinearisation): boolean {
    const run = this.study.runs[index];
    const task = this.tasks[index];
    if (run === undefined || task === undefined) throw new RangeError(`no run number ${index}`);
    const ratio = this.layout.ratioPlace < 0 ? 1 : (theta[this.layout.ratioPlace] ?? 1);
    this.rateConstant = Math.exp((theta[0] ?? 0) + into.deviation);
    this.statedFactor = this.study.scale * this.study.followedNumber * into.scaleRatio;
    this.factor = this.statedFactor * ratio;
    for (let j = 0; j < this.lawParameters.length; j++) this.lawParameters[j] = theta[1 + j] ?? 0;
    this.study.law.begin(run.concentrations, this.lawParameters);
    this.sums.clear();
    if (!this.follow(run, task, tolerance, into)) return false;
    const endWeight = this.takeEndSignal(run, into.noise);
    projectRun(this.sums, this.endRow, endWeight, this.layout, this.study, run, ratio, into);
    const start = run.signal[0] ?? 0;
    into.startSignal += start;
    return Number.isFinite(into.residualSquares);
  }

  /** Follows the course of the run and takes the points as its pieces reach them. */
  private follow(run: PreparedRun, task: CourseTask, tolerance: number, into: RunLinearisation): boolean {
    const { course } = this;
    const { time } = run;
    const k = this.rateConstant;
    const end = k * ((time[time.length - 1] ?? 0) - into.timeZero);
    if (!(end < Number.MAX_VALUE)) return false;
    let point = 0;
    // Before mixing nothing has moved.
    while (point < time.length && (time[point] ?? 0) <= into.timeZero) point++;
    if (point > 0) this.takeRest(run, 0, point, null);
    if (point === time.length) return true;
    if (!course.begin(task, end, tolerance, into.firstStep)) return false;
    while (point < time.length) {
      const piece = course.next();
      if (piece === "failed") return false;
      if (piece === "rest") {
        this.takeRest(run, point, time.length, course.coefficients);
        break;
      }
      const until =
        course.until >= end ? time.length : firstAfter(time, point, into.timeZero + course.until / k);
      this.takePiece(run, point, until, into.timeZero);
      point = until;
    }
    into.firstStep = course.firstStep;
    return true;
  }

  private takePiece(run: PreparedRun, from: number, until: number, timeZero: number): void {
    if (until === from) return;
    const { course, sums, layout, model, slope, rateConstant, factor } = this;
    const { coefficients, length } = course;
    const { polynomials } = sums;
    slopePolynomial(coefficients, factor / length, slope);
    timesTime(slope, course.from + 0.5 * length, length, polynomials, DENSE_COEFFICIENTS);
    const integral = this.study.law.sensitivity === "integral";
    for (let j = 0; j < layout.lawParameters; j++) {
      const source = (1 + j) * DENSE_COEFFICIENTS;
      const target = (2 + j) * DENSE_COEFFICIENTS;
      if (integral) timesIntegral(slope, coefficients, source, polynomials, target);
      else scaled(coefficients, source, factor, polynomials, target);
    }
    if (layout.scaleColumn >= 0)
      scaled(coefficients, 0, this.statedFactor, polynomials, layout.scaleColumn * DENSE_COEFFICIENTS);
    if (layout.timeColumn >= 0)
      scaled(slope, 0, -rateConstant, polynomials, layout.timeColumn * DENSE_COEFFICIENTS);
    scaled(coefficients, 0, factor, model, 0);
    model[0] = (model[0] ?? 0) + (run.signal[0] ?? 0);
    const rate = rateConstant / length;
    this.takePoints(run, from, until, rate, timeZero * rate + course.from / length + 0.5);
  }

  /** Points where nothing moves: before mixing (`coefficients` null) or after the course has come to rest. */
  private takeRest(run: PreparedRun, from: number, until: number, coefficients: Float64Array | null): void {
    const { sums, layout, model } = this;
    const { polynomials } = sums;
    const extent = coefficients?.[0] ?? 0;
    polynomials.fill(0);
    if (coefficients !== null && this.study.law.sensitivity === "variation") {
      for (let j = 0; j < layout.lawParameters; j++)
        polynomials[(2 + j) * DENSE_COEFFICIENTS] =
          this.factor * (coefficients[(1 + j) * DENSE_COEFFICIENTS] ?? 0);
    }
    if (layout.scaleColumn >= 0)
      polynomials[layout.scaleColumn * DENSE_COEFFICIENTS] = this.statedFactor * extent;
    model.fill(0);
    model[0] = (run.signal[0] ?? 0) + this.factor * extent;
    this.takePoints(run, from, until, 0, 0);
  }

  private takePoints(run: PreparedRun, from: number, until: number, rate: number, origin: number): void {
    const { moments, sums, model } = this;
    moments.take(run.time, run.signal, from, until, rate, origin, model, sums.count > 0, run.spacing);
    sums.add(moments);
  }

  /** Writes the row of an end reading and returns its weight in readings; 0 where there is none that could be used. */
  private takeEndSignal(run: PreparedRun, noise: number): number {
    const { endRow, layout } = this;
    endRow.fill(0);
    const weight = endWeightOf(this.study, run, noise);
    if (weight === 0) return 0;
    endRow[0] = (run.endSignal?.value ?? 0) - (run.signal[0] ?? 0) - this.factor * run.most;
    if (layout.scaleColumn >= 0) endRow[layout.scaleColumn] = this.statedFactor * run.most;
    return weight;
  }
}

/** An exact end reading counts as this many readings: more would leave no digits for the others. */
const MOST_END_WEIGHT = 1e8;

/** Weight of a run's end reading in readings of variance `noise`; 0 where there is none that could be used. */
export function endWeightOf({ law }: PreparedStudy, { endSignal, most }: PreparedRun, noise: number): number {
  // Where a law comes to equilibrium, the extent at the end is no constant of the design.
  if (endSignal === null || most === Number.MAX_VALUE || law.sensitivity === "variation") return 0;
  if (endSignal.variance === null) return 1;
  return endSignal.variance > noise / MOST_END_WEIGHT ? noise / endSignal.variance : MOST_END_WEIGHT;
}

export interface ColumnLayout {
  readonly width: number;
  readonly lawParameters: number;
  /** Parameters of θ. */
  readonly parameters: number;
  readonly scaleColumn: number;
  readonly timeColumn: number;
  /** Place of the scale's ratio in θ, or −1. */
  readonly ratioPlace: number;
}

/** Columns: residual, ln k, the law's parameters, scale, time zero; the last two where the study has them. */
function columnLayout(study: PreparedStudy): ColumnLayout {
  const lawParameters = study.law.free.length;
  const hasScale = study.scaleVariance > 0 || study.scaleDeviationVariance > 0;
  const scaleColumn = hasScale ? 2 + lawParameters : -1;
  const before = 2 + lawParameters + (hasScale ? 1 : 0);
  return {
    width: before + (study.hasTimeZero ? 1 : 0),
    lawParameters,
    parameters: 1 + lawParameters + (study.scaleVariance > 0 ? 1 : 0),
    scaleColumn,
    timeColumn: study.hasTimeZero ? before : -1,
    ratioPlace: study.scaleVariance > 0 ? 1 + lawParameters : -1,
  };
}

/** First index from `from` on whose time lies beyond `limit`. */
function firstAfter(time: Float64Array, from: number, limit: number): number {
  let low = from;
  let high = time.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((time[middle] ?? 0) <= limit) low = middle + 1;
    else high = middle;
  }
  return low;
}

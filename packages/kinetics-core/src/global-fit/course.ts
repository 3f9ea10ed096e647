import { MOST_REJECTIONS, MOST_STEPS } from "./constants";
import { type CourseSystem, DENSE_COEFFICIENTS, DormandPrinceStep } from "./dormand-prince";

/**
 * The course of one run in τ = k·t: the extent ξ (component 0) from 0, with the integrals or variations from which the
 * sensitivities are made, given piece by piece as dense output. The law is autonomous, so ξ(τ) does not depend on k.
 *
 * ξ stays between `least` and `most`, the extents at which some species is used up. Three things end a course early and
 * leave it resting:
 * - exhaustion, ξ within `tolerance` of a limit. An order below one gets there in finite time, where dξ/dτ has no
 *   Lipschitz bound and steps would shrink for ever; what remains of the extent is below the error of a step.
 * - a step that runs through a limit, as order 0 does: the piece is cut where it crosses.
 * - standstill, dξ/dτ = 0, or so small in a reversible law that nothing moves any more before the end.
 */
export interface CourseTask {
  readonly system: CourseSystem;
  /** Extents at which a product, or a reactant, is used up; ∓Number.MAX_VALUE where none is. */
  readonly least: number;
  readonly most: number;
  /** Extent against which errors are measured. */
  readonly span: number;
}

export type CoursePiece =
  /** `coefficients` hold from `from` over `length`; valid until `until`. */
  | "piece"
  /** Nothing moves from here on: only the constant coefficients count. */
  | "rest"
  /** No finite rate, or more steps than a course may take. */
  | "failed";

export class Course {
  readonly coefficients: Float64Array;
  from = 0;
  length = 1;
  until = 0;
  /** Length of the first step that held, for the next course of the same run. */
  firstStep = 0;
  private readonly step: DormandPrinceStep;
  private task: CourseTask;
  private end = 0;
  private tolerance = 1;
  private wanted = 0;
  private steps = 0;
  private resting = false;

  constructor(task: CourseTask) {
    this.task = task;
    this.step = new DormandPrinceStep(task.system.dimension);
    this.coefficients = new Float64Array(task.system.dimension * DENSE_COEFFICIENTS);
  }

  /**
   * To τ = `end`, with an error a step of `tolerance` of the span; `firstStep` 0 where none is known. False where the
   * law has no rate at the start.
   */
  begin(task: CourseTask, end: number, tolerance: number, firstStep: number): boolean {
    this.task = task;
    this.tolerance = tolerance;
    this.end = end;
    this.from = 0;
    this.length = 1;
    this.until = 0;
    this.steps = 0;
    this.resting = false;
    this.firstStep = firstStep;
    if (!this.step.begin(task.system)) return false;
    this.wanted = firstStep > 0 ? firstStep : this.guess();
    return true;
  }

  next(): CoursePiece {
    if (this.resting || this.until >= this.end || this.rests()) return this.rest();
    const { system } = this.task;
    const start = this.until;
    for (let rejections = 0; rejections < MOST_REJECTIONS && this.steps < MOST_STEPS; rejections++) {
      const left = this.end - start;
      // A last step that would leave a sliver takes it along.
      const h = this.wanted > 0.99 * left ? left : this.wanted;
      if (!(h > 0)) break;
      this.steps++;
      if (!this.step.attempt(system, h)) {
        this.wanted = 0.2 * h;
        continue;
      }
      const error = this.relativeError(h);
      const factor = Math.min(5, Math.max(0.2, 0.9 * error ** -0.2));
      this.wanted = h * factor;
      if (!(error <= 1)) {
        if (Number.isNaN(error)) this.wanted = 0.2 * h;
        continue;
      }
      if (this.from === 0 && start === 0) this.firstStep = h === left ? this.wanted : h;
      this.take(start, h);
      return "piece";
    }
    return this.nearlyExhausted() ? this.rest() : "failed";
  }

  /** A tenth of the span at the starting rate, or the whole time where that is less. */
  private guess(): number {
    const rate = Math.abs(this.step.k1[0] ?? 0);
    return rate > 0 ? Math.min(this.end, (0.1 * this.task.span) / rate) : this.end;
  }

  private relativeError(h: number): number {
    const { system, span } = this.task;
    const tolerance = this.tolerance;
    const { y, next, k1 } = this.step;
    const size = Math.max(span, Math.abs(next[0] ?? 0));
    let error = Math.abs(this.step.error(0, h)) / (tolerance * size);
    // Variations serve as derivatives only: a thousand times the tolerance, relative to themselves.
    for (let i = 1; i < system.coupled; i++) {
      const own = Math.max(Math.abs(y[i] ?? 0), Math.abs(next[i] ?? 0), Math.abs(h * (k1[i] ?? 0)));
      if (own > 0) error = Math.max(error, Math.abs(this.step.error(i, h)) / (1e3 * tolerance * own));
    }
    return error;
  }

  private take(start: number, h: number): void {
    this.step.dense(h, this.coefficients);
    this.from = start;
    this.length = h;
    this.until = h >= this.end - start ? this.end : start + h;
    const reached = this.step.next[0] ?? 0;
    const { least, most } = this.task;
    if (reached > most || reached < least) {
      const limit = reached > most ? most : least;
      this.until = start + h * this.crossing(limit);
      this.resting = true;
      const end = this.step.next;
      this.evaluateAt((this.until - start) / h, end);
      end[0] = limit;
    }
    this.step.accept();
  }

  /** Where the piece passes `limit`, as a part of its length, by bisection: it is monotonic there. */
  private crossing(limit: number): number {
    let low = 0;
    let high = 1;
    const [c0 = 0, c1 = 0, c2 = 0, c3 = 0, c4 = 0] = this.coefficients;
    const rising = (this.step.next[0] ?? 0) > (this.step.y[0] ?? 0);
    for (let halving = 0; halving < 54; halving++) {
      const part = 0.5 * (low + high);
      const v = part - 0.5;
      const beyond = c0 + v * (c1 + v * (c2 + v * (c3 + v * c4))) > limit;
      if (beyond === rising) high = part;
      else low = part;
    }
    return high;
  }

  private evaluateAt(part: number, into: Float64Array): void {
    const c = this.coefficients;
    const v = part - 0.5;
    for (let i = 0; i < into.length; i++) {
      const at = i * DENSE_COEFFICIENTS;
      into[i] =
        (c[at] ?? 0) +
        v * ((c[at + 1] ?? 0) + v * ((c[at + 2] ?? 0) + v * ((c[at + 3] ?? 0) + v * (c[at + 4] ?? 0))));
    }
  }

  private rests(): boolean {
    const { system, least, most, span } = this.task;
    const tolerance = this.tolerance;
    const { y, k1 } = this.step;
    const extent = y[0] ?? 0;
    const rate = k1[0] ?? 0;
    if (rate >= 0 && most - extent <= tolerance * most) return true;
    if (rate <= 0 && extent - least <= -tolerance * least) return true;
    if (system.coupled === 1) return rate === 0;
    const left = this.end - this.until;
    if (Math.abs(rate) * left > 0.01 * tolerance * span) return false;
    for (let i = 1; i < system.coupled; i++)
      if (Math.abs((k1[i] ?? 0) * left) > 1e-4 * Math.abs(y[i] ?? 0)) return false;
    return true;
  }

  /** A step cannot be made small enough beside a limit that a singular law reaches with infinite slope. */
  private nearlyExhausted(): boolean {
    const { least, most } = this.task;
    const extent = this.step.y[0] ?? 0;
    return most - extent <= 1e-3 * most || extent - least <= -1e-3 * least;
  }

  private rest(): CoursePiece {
    this.resting = true;
    this.from = this.until;
    this.length = 1;
    this.until = Number.POSITIVE_INFINITY;
    this.coefficients.fill(0);
    const y = this.step.y;
    for (let i = 0; i < y.length; i++) this.coefficients[i * DENSE_COEFFICIENTS] = y[i] ?? 0;
    return "rest";
  }
}

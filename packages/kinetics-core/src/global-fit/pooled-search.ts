import { LARGEST_LOG_STEP, SCALE_BOUNDS, UNRESOLVED } from "./constants";
import { NormalStep } from "./normal-step";
import { scalePlace } from "./prepared-study";
import { updateNuisances } from "./project-run";
import type { StudyPass } from "./study-pass";

/**
 * Levenberg and Marquardt's search for the θ of least Σ r² over all traces, ln k shared. The nuisances of a run are
 * projected out, so θ is ln k, the orders or constants of the law and the ratio of the scale: three to six numbers.
 *
 * A step moves the logarithm of the rate at mixing by one at most, whatever ln k and the orders share of it: a k too
 * large by a thousand puts every reading on the flat end of its course, where nothing shows the way back. A parameter
 * at its bound whose gradient points outwards is held for the step.
 */
const MOST_DAMPING = 1e7;

export interface SearchSettings {
  readonly tolerance: number;
  /** Predicted fall of Σ r², in residual variances, at which the search ends. */
  readonly settled: number;
  readonly mostPasses: number;
  readonly shouldStop: () => boolean;
}

export type SearchEnd = "settled" | "not-settled" | "no-course" | "stopped";

export class PooledSearch {
  readonly pass: StudyPass;
  readonly theta: Float64Array;
  readonly bounds: readonly (readonly [number, number])[];
  /** Bounds that the last step was held at. */
  readonly held: Uint8Array;
  private readonly largest: readonly number[];
  private readonly solver: NormalStep;
  private readonly step: Float64Array;
  private readonly kept: Float64Array;
  private readonly gram: Float64Array;
  private readonly gradient: Float64Array;
  private readonly keptNuisances: Float64Array;
  /** ∂ ln(rate)/∂θ at mixing, in the mean of the runs. */
  private readonly logRate: Float64Array;

  constructor(pass: StudyPass, theta: Float64Array, logRate: Float64Array) {
    const p = pass.parameters;
    const law = pass.study.law;
    this.pass = pass;
    this.theta = theta;
    this.logRate = logRate;
    const scale = scalePlace(pass.study) >= 0;
    this.bounds = [[-690, 690], ...law.bounds, ...(scale ? [SCALE_BOUNDS] : [])];
    this.largest = [Number.POSITIVE_INFINITY, ...law.largestSteps, ...(scale ? [0.5] : [])];
    this.held = new Uint8Array(p);
    this.solver = new NormalStep(p);
    this.step = new Float64Array(p);
    this.kept = new Float64Array(p);
    this.gram = new Float64Array(p * p);
    this.gradient = new Float64Array(p);
    this.keptNuisances = new Float64Array(2 * pass.runs.length);
  }

  /** From `theta`, which is left at the best point; the last step that settled is taken and not looked at again. */
  search({ tolerance, settled, mostPasses, shouldStop }: SearchSettings): SearchEnd {
    const { pass, theta } = this;
    if (!pass.at(theta, tolerance)) return "no-course";
    let best = pass.residualSquares;
    let damping = 0;
    this.gram.set(pass.gram);
    this.gradient.set(pass.gradient);
    for (let trial = 0; trial < mostPasses; trial++) {
      if (shouldStop()) return "stopped";
      const fall = this.prepareStep(damping);
      const variance = best / this.freedom();
      const small = !(fall > Math.max(settled * variance, UNRESOLVED * best));
      if (small && damping < 1e-2) {
        this.take();
        return "settled";
      }
      this.kept.set(theta);
      this.keepNuisances();
      this.take();
      const walked = pass.at(theta, tolerance);
      const gain = walked ? best - pass.residualSquares : Number.NEGATIVE_INFINITY;
      if (gain > 0) {
        best = pass.residualSquares;
        this.gram.set(pass.gram);
        this.gradient.set(pass.gradient);
        damping = gain > 0.25 * fall ? (damping > 1e-4 ? damping / 10 : 0) : damping;
        continue;
      }
      theta.set(this.kept);
      this.restoreNuisances();
      damping = damping === 0 ? 1e-3 : 10 * damping;
      // No step leads down, however short: a minimum to within the steps' error, or the bottom of a kink.
      if (damping > MOST_DAMPING) return "settled";
    }
    return "not-settled";
  }

  private freedom(): number {
    let points = 0;
    for (const run of this.pass.runs) points += run.points - 1;
    return Math.max(1, points - this.pass.parameters);
  }

  /** Forms the step at this damping, shortened to its caps; returns the fall that the linear model promises. */
  private prepareStep(damping: number): number {
    const { theta, gradient, gram, held, step, bounds, largest, logRate } = this;
    const p = theta.length;
    for (let i = 0; i < p; i++) {
      const [low, high] = bounds[i] ?? [0, 0];
      const at = theta[i] ?? 0;
      const push = gradient[i] ?? 0;
      held[i] = (at <= low && push < 0) || (at >= high && push > 0) ? 1 : 0;
    }
    this.solver.solve(gram, gradient, damping, held, step);
    let inLogRate = 0;
    let part = 1;
    for (let i = 0; i < p; i++) {
      inLogRate += (logRate[i] ?? 0) * (step[i] ?? 0);
      part = Math.min(part, (largest[i] ?? 1) / Math.abs(step[i] ?? 0));
    }
    part = Math.min(part, LARGEST_LOG_STEP / Math.abs(inLogRate));
    for (let i = 0; i < p; i++) {
      const [low, high] = bounds[i] ?? [0, 0];
      const from = theta[i] ?? 0;
      step[i] = Math.min(high, Math.max(low, from + part * (step[i] ?? 0))) - from;
    }
    let fall = 0;
    for (let i = 0; i < p; i++) {
      let row = 2 * (gradient[i] ?? 0);
      for (let j = 0; j < p; j++) row -= (gram[i * p + j] ?? 0) * (step[j] ?? 0);
      fall += row * (step[i] ?? 0);
    }
    return fall;
  }

  private take(): void {
    const { theta, step, pass } = this;
    for (let i = 0; i < theta.length; i++) theta[i] = (theta[i] ?? 0) + (step[i] ?? 0);
    for (const run of pass.runs) if (run.eliminated.length > 0) updateNuisances(pass.study, run, step, 0);
  }

  private keepNuisances(): void {
    this.pass.runs.forEach((run, j) => {
      this.keptNuisances[2 * j] = run.timeZero;
      this.keptNuisances[2 * j + 1] = run.scaleRatio;
    });
  }

  private restoreNuisances(): void {
    this.pass.runs.forEach((run, j) => {
      run.timeZero = this.keptNuisances[2 * j] ?? 0;
      run.scaleRatio = this.keptNuisances[2 * j + 1] ?? 1;
    });
  }
}

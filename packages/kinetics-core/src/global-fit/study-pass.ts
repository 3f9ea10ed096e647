import type { PreparedStudy } from "./prepared-study";
import { parameterCount, scalePlace } from "./prepared-study";
import { type RunLinearisation, runLinearisations } from "./run-linearisation";
import { TracePass } from "./trace-pass";

/**
 * A whole study linearised at θ: every run, and their sum with what is known of ε·l as one observation. All memory is
 * taken here once; a pass allocates nothing.
 */
export class StudyPass {
  study: PreparedStudy;
  readonly parameters: number;
  readonly runs: readonly RunLinearisation[];
  /** Σ_j JᵀJ and Σ_j Jᵀr with the observation of ε·l, in signal². */
  readonly gram: Float64Array;
  readonly gradient: Float64Array;
  residualSquares = 0;
  /** Variance of a reading by which the observation of ε·l is weighed. */
  noise = 0;
  /** Passes over the data so far. */
  passes = 0;
  private readonly trace: TracePass;
  private readonly ratioPlace: number;

  constructor(study: PreparedStudy) {
    this.study = study;
    this.trace = new TracePass(study);
    this.parameters = parameterCount(study);
    this.ratioPlace = scalePlace(study);
    const nuisances = (study.hasTimeZero ? 1 : 0) + (study.scaleDeviationVariance > 0 ? 1 : 0);
    const points = study.runs.map((run) => run.time.length);
    this.runs = runLinearisations(points, this.parameters, nuisances);
    this.reset();
    this.gram = new Float64Array(this.parameters * this.parameters);
    this.gradient = new Float64Array(this.parameters);
  }

  /** Goes on with other readings of the same runs; passes are counted anew. */
  read(study: PreparedStudy): void {
    this.study = study;
    this.trace.read(study);
    this.passes = 0;
    this.runs.forEach((run, j) => {
      run.points = study.runs[j]?.time.length ?? 0;
    });
  }

  /** Back to where every run starts: no deviation of its own, its nuisances as stated. */
  reset(): void {
    this.runs.forEach((run, j) => {
      run.deviation = 0;
      run.timeZero = this.study.runs[j]?.timeZero?.value ?? 0;
      run.scaleRatio = 1;
      run.firstStep = 0;
    });
  }

  /** Linearises all runs; false where some run has no finite course at θ. */
  at(theta: Float64Array, tolerance: number): boolean {
    this.passes++;
    const { gram, gradient, runs, parameters, ratioPlace } = this;
    gram.fill(0);
    gradient.fill(0);
    this.residualSquares = 0;
    for (let j = 0; j < runs.length; j++) {
      const run = runs[j];
      if (run === undefined) continue;
      if (!this.trace.run(j, theta, tolerance, run)) return false;
      for (let a = 0; a < gram.length; a++) gram[a] = (gram[a] ?? 0) + (run.gram[a] ?? 0);
      for (let a = 0; a < parameters; a++) gradient[a] = (gradient[a] ?? 0) + (run.gradient[a] ?? 0);
      this.residualSquares += run.residualSquares;
    }
    if (ratioPlace >= 0) {
      const weight = this.noise / this.study.scaleVariance;
      const gap = 1 - (theta[ratioPlace] ?? 1);
      const diagonal = ratioPlace * parameters + ratioPlace;
      gram[diagonal] = (gram[diagonal] ?? 0) + weight;
      gradient[ratioPlace] = (gradient[ratioPlace] ?? 0) + weight * gap;
      this.residualSquares += weight * gap * gap;
    }
    return true;
  }

  /** Linearises one run where it stands; false where it has no finite course at θ. */
  one(index: number, theta: Float64Array, tolerance: number): boolean {
    const run = this.runs[index];
    return run !== undefined && this.trace.run(index, theta, tolerance, run);
  }

  /** The same variance of a reading for ε·l and for what is known of the runs' nuisances. */
  setNoise(variance: number): void {
    this.noise = variance;
    for (const run of this.runs) run.noise = variance;
  }

  /** Sum of squares that would be left if every run had its own ln k, to first order; without the observation of ε·l. */
  ownResidualSquares(): number {
    let sum = 0;
    for (const { residualSquares, gram, gradient } of this.runs) {
      const information = gram[0] ?? 0;
      sum += Math.max(0, residualSquares - (information > 0 ? (gradient[0] ?? 0) ** 2 / information : 0));
    }
    return sum;
  }

  /** Variance of a reading when every run has its own ln k. */
  ownVariance(): number {
    let freedom = -this.parameters;
    for (const run of this.runs) freedom += run.points - 2;
    return Math.max(this.ownResidualSquares() / Math.max(1, freedom), Number.MIN_VALUE);
  }
}

import { UNDETERMINED } from "./constants";

/**
 * Solves (G + λ diag G) δ = g for a symmetric, positive semidefinite G of few rows by Cholesky's factors of the matrix
 * scaled to a unit diagonal. A parameter whose pivot vanishes, because the data do not tell it from the ones before
 * it, keeps δ = 0. G is a normal matrix; its columns' lengths to 1e-5 of each other are what a double leaves of it,
 * which is far more than a trace with noise tells.
 */
export class NormalStep {
  private readonly size: number;
  private readonly factor: Float64Array;
  private readonly scale: Float64Array;
  /** Parameters that were given no step because nothing determines them, at the last solution. */
  readonly idle: Uint8Array;

  constructor(size: number) {
    this.size = size;
    this.factor = new Float64Array(size * size);
    this.scale = new Float64Array(size);
    this.idle = new Uint8Array(size);
  }

  /** `held[i]` ≠ 0 keeps parameter i where it is. */
  solve(
    gram: Float64Array,
    gradient: Float64Array,
    damping: number,
    held: Uint8Array,
    step: Float64Array,
  ): void {
    this.factorise(gram, damping, held);
    const { size, factor, scale, idle } = this;
    for (let i = 0; i < size; i++) {
      if (idle[i] === 1) {
        step[i] = 0;
        continue;
      }
      let sum = (gradient[i] ?? 0) * (scale[i] ?? 0);
      for (let k = 0; k < i; k++) sum -= (factor[i * size + k] ?? 0) * (step[k] ?? 0);
      step[i] = sum / (factor[i * size + i] ?? 1);
    }
    for (let i = size - 1; i >= 0; i--) {
      if (idle[i] === 1) continue;
      let sum = step[i] ?? 0;
      for (let k = i + 1; k < size; k++) sum -= (factor[k * size + i] ?? 0) * (step[k] ?? 0);
      step[i] = sum / (factor[i * size + i] ?? 1);
    }
    for (let i = 0; i < size; i++) step[i] = (step[i] ?? 0) * (scale[i] ?? 0);
  }

  /** G⁻¹ in rows; rows and columns of parameters that nothing determines are 0. */
  inverse(gram: Float64Array): Float64Array {
    const { size } = this;
    const inverse = new Float64Array(size * size);
    const unit = new Float64Array(size);
    const column = new Float64Array(size);
    const none = new Uint8Array(size);
    for (let j = 0; j < size; j++) {
      unit.fill(0);
      unit[j] = 1;
      this.solve(gram, unit, 0, none, column);
      inverse.set(column, j * size);
    }
    return inverse;
  }

  private factorise(gram: Float64Array, damping: number, held: Uint8Array): void {
    const { size, factor, scale, idle } = this;
    factor.fill(0);
    for (let i = 0; i < size; i++) {
      const diagonal = gram[i * size + i] ?? 0;
      idle[i] = held[i] === 1 || !(diagonal > 0) ? 1 : 0;
      scale[i] = idle[i] === 1 ? 0 : 1 / Math.sqrt(diagonal);
    }
    for (let i = 0; i < size; i++) {
      if (idle[i] === 1) continue;
      for (let j = 0; j <= i; j++) {
        if (idle[j] === 1) continue;
        let sum = i === j ? 1 + damping : (gram[i * size + j] ?? 0) * (scale[i] ?? 0) * (scale[j] ?? 0);
        for (let k = 0; k < j; k++) sum -= (factor[i * size + k] ?? 0) * (factor[j * size + k] ?? 0);
        if (i > j) factor[i * size + j] = sum / (factor[j * size + j] ?? 1);
        else if (sum > UNDETERMINED) factor[i * size + i] = Math.sqrt(sum);
        else {
          idle[i] = 1;
          for (let k = 0; k < i; k++) factor[i * size + k] = 0;
        }
      }
    }
  }
}

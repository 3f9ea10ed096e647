/**
 * Moments of the points that fall on one piece of a course. On a piece every column of the Jacobian is a polynomial of
 * degree 4 in v, the place within the step, so Σ v^m (m to 8), Σ r v^m (m to 4) and Σ r² hold all that the normal
 * equations need of its points: what a point costs does not depend on the number of parameters.
 */
export class PieceMoments {
  /** Σ v^m, m = 0 … 8. */
  readonly powers = new Float64Array(9);
  /** Σ r v^m, m = 0 … 4. */
  readonly residual = new Float64Array(5);
  residualSquares = 0;
  /** Σ r_i r_{i+1}, with the last residual of the piece before. */
  lagged = 0;
  firstResidual = 0;
  lastResidual = 0;

  /**
   * Points `from` up to `until` with v = t·rate − origin and the model Σ model_m v^m. `continued`: the residual before
   * the first of them is `lastResidual`.
   */
  take(
    time: Float64Array,
    signal: Float64Array,
    from: number,
    until: number,
    rate: number,
    origin: number,
    model: Float64Array,
    continued: boolean,
  ): void {
    const { powers } = this;
    let s1 = 0;
    let s2 = 0;
    let s3 = 0;
    let s4 = 0;
    let s5 = 0;
    let s6 = 0;
    let s7 = 0;
    let s8 = 0;
    for (let i = from; i < until; i++) {
      const v = (time[i] ?? 0) * rate - origin;
      const v2 = v * v;
      const v3 = v2 * v;
      const v4 = v2 * v2;
      s1 += v;
      s2 += v2;
      s3 += v3;
      s4 += v4;
      s5 += v4 * v;
      s6 += v3 * v3;
      s7 += v4 * v3;
      s8 += v4 * v4;
    }
    powers[0] = until - from;
    powers[1] = s1;
    powers[2] = s2;
    powers[3] = s3;
    powers[4] = s4;
    powers[5] = s5;
    powers[6] = s6;
    powers[7] = s7;
    powers[8] = s8;
    this.takeResiduals(time, signal, from, until, rate, origin, model, continued);
  }

  private takeResiduals(
    time: Float64Array,
    signal: Float64Array,
    from: number,
    until: number,
    rate: number,
    origin: number,
    model: Float64Array,
    continued: boolean,
  ): void {
    const c0 = model[0] ?? 0;
    const c1 = model[1] ?? 0;
    const c2 = model[2] ?? 0;
    const c3 = model[3] ?? 0;
    const c4 = model[4] ?? 0;
    let r0 = 0;
    let r1 = 0;
    let r2 = 0;
    let r3 = 0;
    let r4 = 0;
    let squares = 0;
    let lagged = 0;
    let previous = continued ? this.lastResidual : 0;
    for (let i = from; i < until; i++) {
      const v = (time[i] ?? 0) * rate - origin;
      const v2 = v * v;
      const r = (signal[i] ?? 0) - (c0 + c1 * v + (c2 + c3 * v + c4 * v2) * v2);
      const rv = r * v;
      const rv2 = r * v2;
      r0 += r;
      r1 += rv;
      r2 += rv2;
      r3 += rv * v2;
      r4 += rv2 * v2;
      squares += r * r;
      lagged += r * previous;
      if (i === from && !continued) this.firstResidual = r;
      previous = r;
    }
    const { residual } = this;
    residual[0] = r0;
    residual[1] = r1;
    residual[2] = r2;
    residual[3] = r3;
    residual[4] = r4;
    this.residualSquares = squares;
    this.lagged = lagged;
    this.lastResidual = previous;
  }
}

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
   * the first of them is `lastResidual`. `spacing`: of the times where they are equally spaced, else 0.
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
    spacing: number,
  ): void {
    const { powers } = this;
    const points = until - from;
    if (spacing > 0) uniformPowers(points, (time[from] ?? 0) * rate - origin, spacing * rate, powers);
    else powersOf(time, from, until, rate, origin, powers);
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

function powersOf(
  time: Float64Array,
  from: number,
  until: number,
  rate: number,
  origin: number,
  powers: Float64Array,
): void {
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
}

/**
 * Σ v^m of n equally spaced points: about their middle the odd sums vanish and the even ones are Faulhaber's, in
 * q = n² − 1: with d the spacing Σ = n, n q d²/12, n q (3q − 4) d⁴/240, n q (3q² − 12q + 16) d⁶/1344 and
 * n q (5q³ − 40q² + 144q − 192) d⁸/11520. The binomial theorem moves them to the origin of v.
 */
export function uniformPowers(n: number, first: number, spacing: number, powers: Float64Array): void {
  const q = n * n - 1;
  const d2 = spacing * spacing;
  const m2 = (n * q * d2) / 12;
  const m4 = (n * q * (3 * q - 4) * d2 * d2) / 240;
  const m6 = (n * q * ((3 * q - 12) * q + 16) * d2 * d2 * d2) / 1344;
  const m8 = (n * q * (((5 * q - 40) * q + 144) * q - 192) * d2 * d2 * d2 * d2) / 11520;
  const v = first + 0.5 * (n - 1) * spacing;
  const v2 = v * v;
  const v3 = v2 * v;
  const v4 = v2 * v2;
  const v6 = v3 * v3;
  powers[0] = n;
  powers[1] = n * v;
  powers[2] = n * v2 + m2;
  powers[3] = v * (n * v2 + 3 * m2);
  powers[4] = n * v4 + 6 * v2 * m2 + m4;
  powers[5] = v * (n * v4 + 10 * v2 * m2 + 5 * m4);
  powers[6] = n * v6 + 15 * v4 * m2 + 15 * v2 * m4 + m6;
  powers[7] = v * (n * v6 + 21 * v4 * m2 + 35 * v2 * m4 + 7 * m6);
  powers[8] = n * v4 * v4 + 28 * v6 * m2 + 70 * v4 * m4 + 28 * v2 * m6 + m8;
}

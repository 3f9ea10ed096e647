/**
 * One step of the embedded Runge-Kutta pair of orders 5 and 4 of Dormand and Prince (1980, J. Comput. Appl. Math. 6,
 * 19) for dy/dτ = g(y), with the continuous extension of order 4 (Hairer, Nørsett and Wanner, Solving Ordinary
 * Differential Equations I, II.6). The last derivative of an accepted step is the first of the next.
 *
 * The first `coupled` components are those that g reads. The others are quadratures: their derivatives are summed with
 * the weights of the step and never formed at the stages.
 */
export interface CourseSystem {
  readonly dimension: number;
  readonly coupled: number;
  /** Writes dy/dτ; false where it has no finite value. Nothing is allocated. */
  evaluate(y: Float64Array, derivative: Float64Array): boolean;
}

/** Coefficients of a component's dense output, in powers 0 to 4 of v = (τ − τ₀)/h − ½, which runs from −½ to ½. */
export const DENSE_COEFFICIENTS = 5;

export class DormandPrinceStep {
  /** State at the start of the step. */
  y: Float64Array;
  /** State at its end, after `attempt`. */
  next: Float64Array;
  /** Derivative at the start. */
  k1: Float64Array;
  private k7: Float64Array;
  private readonly k2: Float64Array;
  private readonly k3: Float64Array;
  private readonly k4: Float64Array;
  private readonly k5: Float64Array;
  private readonly k6: Float64Array;
  private readonly stage: Float64Array;

  constructor(dimension: number) {
    this.y = new Float64Array(dimension);
    this.next = new Float64Array(dimension);
    this.k1 = new Float64Array(dimension);
    this.k2 = new Float64Array(dimension);
    this.k3 = new Float64Array(dimension);
    this.k4 = new Float64Array(dimension);
    this.k5 = new Float64Array(dimension);
    this.k6 = new Float64Array(dimension);
    this.k7 = new Float64Array(dimension);
    this.stage = new Float64Array(dimension);
  }

  /** Sets y to zero and forms its derivative. */
  begin(system: CourseSystem): boolean {
    this.y.fill(0);
    return system.evaluate(this.y, this.k1);
  }

  /** Forms the stages and `next` for a step of length h; false where some stage has no finite derivative. */
  attempt(system: CourseSystem, h: number): boolean {
    const { y, k1, k2, k3, k4, k5, k6, k7, stage, next } = this;
    const coupled = system.coupled;
    for (let i = 0; i < coupled; i++) stage[i] = (y[i] ?? 0) + h * (0.2 * (k1[i] ?? 0));
    if (!system.evaluate(stage, k2)) return false;
    for (let i = 0; i < coupled; i++)
      stage[i] = (y[i] ?? 0) + h * ((3 / 40) * (k1[i] ?? 0) + (9 / 40) * (k2[i] ?? 0));
    if (!system.evaluate(stage, k3)) return false;
    for (let i = 0; i < coupled; i++)
      stage[i] =
        (y[i] ?? 0) + h * ((44 / 45) * (k1[i] ?? 0) - (56 / 15) * (k2[i] ?? 0) + (32 / 9) * (k3[i] ?? 0));
    if (!system.evaluate(stage, k4)) return false;
    for (let i = 0; i < coupled; i++)
      stage[i] =
        (y[i] ?? 0) +
        h *
          ((19372 / 6561) * (k1[i] ?? 0) -
            (25360 / 2187) * (k2[i] ?? 0) +
            (64448 / 6561) * (k3[i] ?? 0) -
            (212 / 729) * (k4[i] ?? 0));
    if (!system.evaluate(stage, k5)) return false;
    for (let i = 0; i < coupled; i++)
      stage[i] =
        (y[i] ?? 0) +
        h *
          ((9017 / 3168) * (k1[i] ?? 0) -
            (355 / 33) * (k2[i] ?? 0) +
            (46732 / 5247) * (k3[i] ?? 0) +
            (49 / 176) * (k4[i] ?? 0) -
            (5103 / 18656) * (k5[i] ?? 0));
    if (!system.evaluate(stage, k6)) return false;
    for (let i = 0; i < y.length; i++)
      next[i] =
        (y[i] ?? 0) +
        h *
          ((35 / 384) * (k1[i] ?? 0) +
            (500 / 1113) * (k3[i] ?? 0) +
            (125 / 192) * (k4[i] ?? 0) -
            (2187 / 6784) * (k5[i] ?? 0) +
            (11 / 84) * (k6[i] ?? 0));
    return system.evaluate(next, k7);
  }

  /** Difference of the two embedded solutions in one component of the step just attempted. */
  error(component: number, h: number): number {
    const { k1, k3, k4, k5, k6, k7 } = this;
    return (
      h *
      ((71 / 57600) * (k1[component] ?? 0) -
        (71 / 16695) * (k3[component] ?? 0) +
        (71 / 1920) * (k4[component] ?? 0) -
        (17253 / 339200) * (k5[component] ?? 0) +
        (22 / 525) * (k6[component] ?? 0) -
        (1 / 40) * (k7[component] ?? 0))
    );
  }

  /** Writes the dense output of the step just attempted, five coefficients a component. */
  dense(h: number, into: Float64Array): void {
    const { y, next, k1, k3, k4, k5, k6, k7 } = this;
    for (let i = 0; i < y.length; i++) {
      const start = y[i] ?? 0;
      const change = (next[i] ?? 0) - start;
      const third = h * (k1[i] ?? 0) - change;
      const fourth = change - h * (k7[i] ?? 0) - third;
      const fifth =
        h *
        ((-12715105075 / 11282082432) * (k1[i] ?? 0) +
          (87487479700 / 32700410799) * (k3[i] ?? 0) -
          (10690763975 / 1880347072) * (k4[i] ?? 0) +
          (701980252875 / 199316789632) * (k5[i] ?? 0) -
          (1453857185 / 822651844) * (k6[i] ?? 0) +
          (69997945 / 29380423) * (k7[i] ?? 0));
      // y = r₁ + u(r₂ + (1−u)(r₃ + u(r₄ + (1−u) r₅))), multiplied out, then about the middle of the step.
      const c1 = change + third;
      const c2 = fourth + fifth - third;
      const c3 = -fourth - 2 * fifth;
      const at = i * DENSE_COEFFICIENTS;
      into[at] = start + c1 / 2 + c2 / 4 + c3 / 8 + fifth / 16;
      into[at + 1] = c1 + c2 + 0.75 * c3 + fifth / 2;
      into[at + 2] = c2 + 1.5 * c3 + 1.5 * fifth;
      into[at + 3] = c3 + 2 * fifth;
      into[at + 4] = fifth;
    }
  }

  /** Makes the end of the step attempted the start of the next. */
  accept(): void {
    const { y, k1 } = this;
    this.y = this.next;
    this.next = y;
    this.k1 = this.k7;
    this.k7 = k1;
  }
}

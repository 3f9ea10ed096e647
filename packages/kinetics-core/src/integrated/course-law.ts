/**
 * An integrated rate law as a fit needs it: the parts of its species that are left or present at each time, each part
 * of a starting amount of 1. The measured signal is a linear combination of them and of a signal that stays when the
 * followed species are gone,
 *
 *   S(t) = end + Σ_s scale_s · part_s(t; θ),
 *
 * so that scales and end signal are linear and only θ is searched for.
 */
export interface CourseLaw {
  readonly name: string;
  readonly parameters: readonly CourseParameter[];
  /** How many parts the signal may be made of. */
  readonly species: number;
  /** For laws that use everything up in finite time: when, on the clock of the fit; Infinity where they do not. */
  readonly endOfCourse?: (theta: Float64Array) => number;
  /** The same law, over no earlier than the last reading, where bounds on θ can say that. */
  readonly withinCourse?: CourseLaw;
  /**
   * Writes part_s(t_i; θ) into `parts[s][i]` and ∂part_s/∂θ_j into `derivatives[j][s][i]`. `time` ≥ 0, on a clock that
   * starts at the first reading and reaches 1 at the last. Returns false where a value is not finite. Nothing is
   * allocated.
   */
  evaluate(
    time: Float64Array,
    theta: Float64Array,
    parts: readonly Float64Array[],
    derivatives: readonly (readonly Float64Array[])[],
  ): boolean;
}

export interface CourseParameter {
  readonly name: string;
  /** A rate is searched for by its natural logarithm, in the reciprocal of the clock's unit; a number as it is. */
  readonly kind: "rate" | "number";
  readonly bounds: readonly [number, number];
  /** Values from which the search may start. */
  readonly starts: readonly number[];
}

/** Rates from 10⁻⁸ of the amount over the whole trace to one that is over long before the second reading. */
const LEAST_LOG_RATE = Math.log(1e-8);
const LARGEST_LOG_RATE = Math.log(1e7);
const RATE_STARTS = [1e-5, 1e-3, 0.03, 0.1, 0.3, 0.7, 1.2, 2, 4, 8, 20, 60, 300, 3000].map(Math.log);

export function rateParameter(name: string): CourseParameter {
  return { name, kind: "rate", bounds: [LEAST_LOG_RATE, LARGEST_LOG_RATE], starts: RATE_STARTS };
}

export function numberParameter(
  name: string,
  bounds: readonly [number, number],
  starts: readonly number[],
): CourseParameter {
  return { name, kind: "number", bounds, starts };
}

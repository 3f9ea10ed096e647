/** Part of a followed species at one time, with its derivatives. Filled in place; made once by `coursePoint`. */
export interface CoursePoint {
  /** c/c₀. */
  part: number;
  /** By the first argument of the closed form, a progress k·t. */
  byProgress: number;
  /** By its second argument: an order, a ratio of starting amounts, or the progress of the second step. */
  bySecond: number;
}

export function coursePoint(): CoursePoint {
  return { part: 0, byProgress: 0, bySecond: 0 };
}

/** Of what is used up, or has never been there, nothing is left and nothing changes. */
export function nothingLeft(into: CoursePoint): void {
  into.part = 0;
  into.byProgress = 0;
  into.bySecond = 0;
}

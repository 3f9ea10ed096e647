import { lengthOf } from "./linearisation";
import type { NonlinearSearch } from "./nonlinear-search";

/** Scales by the columns of the Jacobian as they are now; 1 for a parameter that changes nothing. */
export function rescale({ linear, current }: NonlinearSearch): void {
  current.jacobian.forEach((column, j) => {
    linear.scale[j] = lengthOf(column) || 1;
  });
}

/** Raises scales to the columns of the Jacobian; they never fall on the way down. */
export function raiseScale({ linear, current }: NonlinearSearch): void {
  current.jacobian.forEach((column, j) => {
    linear.scale[j] = Math.max(linear.scale[j] ?? 0, lengthOf(column));
  });
}

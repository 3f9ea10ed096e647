import { type Estimate, estimateOf, noEstimate } from "kinetics-core/quantities";
import type { CourseFit, Gradient } from "./fit-course";

/** A quantity of a fitted course and how it moves with the fitted parameters. */
export interface Quantity {
  readonly value: number;
  readonly gradient: Gradient;
}

/** What the readings say about a quantity: nothing where they do not fix it, no uncertainty where nothing is left over. */
export function estimateQuantity(fit: CourseFit, { value, gradient }: Quantity, level: number): Estimate {
  const error = fit.errorOf(gradient);
  if (error === "undetermined") return noEstimate(level);
  return estimateOf(value, error.standardError, error.degreesOfFreedom, level);
}

import type { RefusedTrace } from "kinetics-core/initial-rate";

/** Why one trace gives no course. */
export type RefusedCourse =
  | UnusableTrace
  | TooFewReadings
  | { readonly status: "not-converged"; readonly message: string };

/** The trace cannot be taken as it is; `message` names the reading and what to check. */
export interface UnusableTrace {
  readonly status: "unusable";
  readonly code: RefusedTrace["code"] | "constant-signal";
  readonly message: string;
}

export interface TooFewReadings {
  readonly status: "too-few-points";
  readonly needed: number;
  readonly got: number;
  readonly message: string;
}

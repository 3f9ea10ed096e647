/** Constants of the inference under run-to-run scatter, each with its reason. */

/**
 * A run's own noise needs this many degrees of freedom; with fewer its variance would be off by a factor of several
 * half of the time, so the runs' pooled noise stands in.
 */
export const FEWEST_OWN_FREEDOM = 3;

/**
 * Smallest noise, as a part of what a change of ln k by 1 does to the signal: computed traces have residuals of
 * rounding only, and a variance of 0 would divide by nothing.
 */
export const LEAST_RELATIVE_NOISE = 1e-12;

/** Part of a diagonal element that subtraction leaves as rounding and that therefore counts as 0. */
export const ROUNDING_OF_SUBTRACTION = 1e-13;

/** Pivot of a matrix scaled to a unit diagonal below which a parameter counts as undetermined. */
export const LEAST_PIVOT = 1e-13;

/** Wider than the model-based interval by this factor, the cluster-robust one contradicts the model: simulation. */
export const WIDER_THAN_MODEL = 1.5;

/** Leverage of a run this close to 1: its residual is fixed by the fit and cannot be corrected. */
export const LEAST_FREE_PART = 1e-9;

/** With fewer runs a resampled study too often repeats a few recipes, and its intervals are too short: simulation. */
export const FEWEST_RUNS_FOR_BOOTSTRAP = 10;

/** 2.5 % of the replicates beyond either limit should be ten or more, or the limits are those of single draws. */
export const FEWEST_REPLICATES = 400;

/** Part of the refits that may fail before their absence could bend the intervals. */
export const MOST_FAILED_REFITS = 0.05;

/** Effective degrees of freedom of the runs below which their scatter is rounding and says nothing. */
export const LEAST_FREEDOM_LEFT = 1e-6;

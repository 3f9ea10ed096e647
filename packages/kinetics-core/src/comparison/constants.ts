/** Constants of the readings of candidate rate laws, each with its reason. */

/**
 * p of the run-level F, times the number of laws with more parameters, below which a law with a lead against it is ruled
 * out. The best law is the best of many: a simple truth met by four laws that extend it lost to one of them at a plain
 * p < 0.01 in up to 1.3 % of simulated studies, and with the lack of fit at 0.01 was ruled out in up to 2.5 %. Counted
 * so, the true law of no cell is ruled out in more than 1 %, and of the wrong ones hardly fewer go.
 */
export const RULED_OUT_P_VALUE = 0.005;

/** Lead in AICc that must agree with F: alone it rules out the true law in up to 29 % of studies of 5 runs. */
export const RULED_OUT_LEAD = 6;

/** Lead over every other law left that lets one stand alone; below it the data prefer neither. */
export const STANDING_LEAD = 2;

/**
 * p of the replicates' lack of fit below which a law misses what it should describe. A true law fails in just that part
 * of studies, so 0.01 alone would spend all that may be spent on ruling it out.
 */
export const LACK_OF_FIT_P_VALUE = 0.002;

/** Level of the interval that must lie wholly beyond what a parameter can be. */
export const IMPOSSIBLE_LEVEL = 0.99;

/** Level of the interval of an added term, and of every interval printed. */
export const INTERVAL_LEVEL = 0.95;

/** Paired t of the leave-one-run-out errors from which the second opinion contradicts: about p = 0.05. */
export const SECOND_OPINION_T = 2;

/** Rates that agree to this part with a law are computed ones; closer agreement does not make a law better. */
export const EXACT_RELATIVE = 1e-9;

/** A disagreement of rates and traces over this many standard uncertainties weakens the law. */
export const DISAGREEMENT_FACTOR = 2;

/** Recipes closer than this are one recipe: what unit conversion and mixing arithmetic leave. */
export const SAME_CONCENTRATION = 1e-6;

/** Signs up to which the runs test counts arrangements; beyond, the normal approximation errs by less than 0.02. */
export const MOST_COUNTED_SIGNS = 40;

/** Degrees of freedom up to which the Durbin-Watson p-value is integrated; beyond, a beta errs by less than 10⁻⁴. */
export const MOST_EXACT_FREEDOM = 30;

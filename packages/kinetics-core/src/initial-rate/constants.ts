/**
 * The constants of the initial-rate rule, each with its reason. "Simulation" means that the value was settled on
 * simulated traces of known truth, with which the rule covered the true slope in 96 % at a nominal 95 %;
 * coverage.test.ts repeats a small cut of them.
 */

/** Highest degree of the polynomial that stands for the trace when its noise is read. Simulation. */
export const NOISE_DEGREE = 6;

/** Largest autocorrelation that is believed; at 1 the variance of a slope has no bound. Simulation. */
export const LARGEST_AUTOCORRELATION = 0.97;

/** Points that the noise polynomial takes from the effective points when degrees of freedom are counted. */
export const NOISE_DEGREES_SPENT = 5;

/** ρ is underestimated in short traces (true 0.9, 20 points: median 0.53); this floor stands for that. */
export const LEAST_DEGREES_OF_FREEDOM = 3;

/** A window with fewer points carries no choice between nested estimators. */
export const LEAST_WINDOW_POINTS = 8;

/** A fit needs two points more than it has parameters before its residuals mean anything. Common practice. */
export const SPARE_POINTS = 2;

/** Number of windows that are tried, their lengths in geometric progression. */
export const WINDOWS = 14;

/** Polynomials up to degree four follow a trace no further than this conversion. Simulation. */
export const POLYNOMIAL_CONVERSION_END = 0.45;

/** Conversion ends of the exponential and general-order windows; complete conversion means the whole trace. */
export const LONG_CONVERSION_ENDS = [0.45, 0.7, 1] as const;

/** Least points of an exponential or general-order window: this many, or this part of the trace. */
export const LEAST_LONG_WINDOW_POINTS = 12;
export const LEAST_LONG_WINDOW_PART = 1 / 8;

/** A general order enters only if its lack of fit against degree six is not significant at this level. */
export const LACK_OF_FIT_LEVEL = 0.05;

/** Weight of the squared disagreement of a pair beside the variance of its lower member. Simulation. */
export const BIAS_WEIGHT = 4;

/** Pairs whose criterion is within this factor of the least are averaged. */
export const AVERAGED_WITHIN = 2;

/** Conversion ends that a study chooses from. */
export const STUDY_CONVERSION_ENDS = [0.03, 0.05, 0.08, 0.12, 0.2, 0.3, 0.45, 0.7, 1] as const;

/** Standard errors of a slope beyond which a run moves at all. Among its two dozen windows noise alone reaches 3. */
export const MOVES = 4;

/** Above this autocorrelation the standard error rests on few independent readings. Simulation. */
export const HIGH_AUTOCORRELATION = 0.9;

/** Fewer effective readings than this weaken an estimate. Common practice. */
export const LEAST_EFFECTIVE_POINTS = 8;

/** Relative standard error of a rate that weakens it, and the one that keeps it out of a logarithmic fit. */
export const IMPRECISE_RATE = 0.1;
export const VERY_IMPRECISE_RATE = 0.2;

/** Part of the reaction that may be over before the first reading used. */
export const LARGEST_DEAD_CONVERSION = 0.2;

/** Standard errors beyond which readings before mixing drift at all: noise alone goes so far in one trace of 370. */
export const CERTAIN_DRIFT = 3;

/** Of the rate at mixing: a drift that goes on through the run moves the rate by as much. As for dead time. */
export const LARGEST_DRIFT = 0.02;

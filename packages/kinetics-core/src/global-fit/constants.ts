/**
 * The constants of the global fit, each with its reason. "Simulation": settled on simulated studies of known truth.
 */

/** Error of one integration step against the extent that the trace shows: a thousandth of ordinary noise. */
export const STEP_TOLERANCE = 1e-6;

/** The same while the fit is still looking for its neighbourhood on few points. */
export const COARSE_TOLERANCE = 1e-3;

/** The same where the residuals are so small that STEP_TOLERANCE would show among them. */
export const FINE_TOLERANCE = 1e-10;

/** Residual standard deviation against the extent seen, below which FINE_TOLERANCE is called for. */
export const FINE_BELOW = 1e-4;

/** Steps of one course. Some ten are usual; a course that needs more than this has no end that steps could reach. */
export const MOST_STEPS = 2000;

/** Rejections in a row after which a step is given up: the step is then below a double's resolution of the time. */
export const MOST_REJECTIONS = 60;

/** Points a run on which the search begins. The full traces only polish what these have found. */
export const COARSE_POINTS = 32;

/** Largest change of the logarithm of the rate in one step: beyond it a course may lie flat at its end. */
export const LARGEST_LOG_STEP = 1;

/** Largest change of one order in one step. */
export const LARGEST_ORDER_STEP = 1;

/** Passes after which a search of the full traces gives up, and one of the thinned ones. Two or three are usual. */
export const MOST_PASSES = 80;
export const MOST_COARSE_PASSES = 20;

/** Predicted fall of the sum of squares, in residual variances, at which the coarse search ends. */
export const COARSE_SETTLED = 0.1;

/**
 * The same for the full traces: a third of a standard error. That step is taken too and leaves a hundredth, less than
 * the pooled fit, a start and a comparison, has to be known.
 */
export const SETTLED = 0.1;

/**
 * Step of the outer loop, in standard errors, at which it has settled. The step is taken; the next would be two to four
 * hundredths of it. Simulation.
 */
export const OUTER_SETTLED = 0.1;

/** Linearisations of the outer loop. Two or three are usual. */
export const MOST_LINEARISATIONS = 25;

/** Linearisation from which on the loop goes half the way. */
export const FIRST_HALVED = 5;

/** Linearisation from which on τ² is held. */
export const FIRST_HELD = 10;

/** Largest change of a run's own ln k before the loop has settled: farther away its course is no straight line. */
export const LARGEST_OWN_STEP = 1;

/** A fit this many times worse than the traces' point-to-point noise is searched again from other starts. */
export const POOR_FIT = 25;

/** Fall of the sum of squares, relative to it, that a double no longer resolves. */
export const UNRESOLVED = 1e-14;

/** Pivot of the scaled normal matrix below which a combination of parameters is not determined: 1e-5 of a column's length. */
export const UNDETERMINED = 1e-10;

/** Orders outside are no power law of chemistry; a fit that rests there says so. */
export const ORDER_BOUNDS = [-6, 6] as const;

/** A scale this many times the stated one, or its inverse, is no longer the same signal. */
export const SCALE_BOUNDS = [0.05, 20] as const;

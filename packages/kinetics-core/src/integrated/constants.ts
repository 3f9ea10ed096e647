/** The constants of the rule for one integrated law, each with its reason. */

/** Difference of a stated end signal from the one that the readings show, in standard uncertainties. Derived. */
export const CONFLICT_WEAKENS = 2;
export const CONFLICT_BLOCKS = 3;

/** Half-width of the interval of an order: beyond a quarter no half order, beyond a half no whole order is told. Derived. */
export const ORDER_HALF_WIDTH_WEAKENS = 0.25;
export const ORDER_HALF_WIDTH_BLOCKS = 0.5;

/** Above this autocorrelation a standard error rests on few independent readings. Simulation. */
export const AUTOCORRELATION_WEAKENS = 0.9;

/** Fewer effective readings than this weaken an estimate; fewer than two to spare leave nothing to judge by. Common practice. */
export const EFFECTIVE_POINTS_WEAKEN = 8;
export const SPARE_POINTS = 2;

/** A pattern in the residuals that chance gives to one good trace in twenty. As for initial rates. */
export const LACK_OF_FIT_LEVEL = 0.05;

/** Part of the whole change that may come before the first reading. As for initial rates. */
export const DEAD_PART_WEAKENS = 0.2;

/** A burst or a lag is seen when neither a line nor an ordinary course does as well, at this level: once in a hundred. */
export const BURST_LEVEL = 0.01;

/** Five parameters' worth of noise and shape: S₀, v_s, v_0, λ, and as many readings again to judge by. */
export const LEAST_BURST_READINGS = 8;

/** The phase has to die away to 5 % within the trace before the rest is called steady. */
export const LEAST_PHASE_DECAYS = 3;

/** Readings within 1/λ below which λ and v_0 are one reading's noise. */
export const READINGS_IN_PHASE = 3;

import { binomialQuantile } from "./statistics";

/** The bounds that decide, with the reason beside each. */

/** An interval of 95 % may lose this much to all that theory leaves out (finite samples, estimated variances). */
export const LEAST_COVERAGE = 0.925;

/** A cell at the bound itself fails by chance in one case of two hundred. */
const CHANCE_OF_FALSE_ALARM = 0.005;

/** Initial rates alone carry the bias of their shape: judged over all cells, and shape by shape. */
export const INITIAL_RATES_OVERALL = 0.93;
export const INITIAL_RATES_BY_SHAPE = 0.87;

/**
 * From traces to orders the rates bring the bias of their shape, all runs the same, which their scatter cannot show: ln k
 * is judged as initial rates are, over all designs and design by design; so are the orders.
 */
export const STUDIES_OVERALL = INITIAL_RATES_OVERALL;
export const STUDIES_BY_DESIGN = INITIAL_RATES_BY_SHAPE;

/** A true law may be ruled out this often. */
export const MOST_TRUE_LAWS_RULED_OUT = 0.01;

/** Fewest replicates that must be covered, at this number of them. */
export function leastCovered(replicates: number, coverage = LEAST_COVERAGE): number {
  return binomialQuantile(CHANCE_OF_FALSE_ALARM, replicates, coverage);
}

/** Most replicates in which the true law may be ruled out, at this number of them. */
export function mostRuledOut(replicates: number): number {
  return binomialQuantile(1 - CHANCE_OF_FALSE_ALARM, replicates, MOST_TRUE_LAWS_RULED_OUT);
}

/**
 * What a rate law that a person writes stays far below, and what keeps reading one from costing more than a few
 * milliseconds whatever the text.
 */

/** Characters. The longest mechanism laws in use fill three lines. */
export const LONGEST_EXPRESSION = 1000;
/** Nested parentheses, signs and exponents; the reader calls itself once for each. */
export const DEEPEST_NESTING = 50;
/** Numbers, names and operations together. */
export const MOST_STEPS = 400;
/** Parameters. Ten are more than any set of runs determines; the search for the rate constant tries their subsets. */
export const MOST_PARAMETERS = 10;
/** Characters of a parameter's name. */
export const LONGEST_NAME = 32;

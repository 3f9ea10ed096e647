/** The rules of thumb and thresholds of temperature dependence, each with its reason. */

/** Two temperatures determine the line and nothing checks it: the scatter of the points cannot be known. */
export const FEWEST_FOR_INTERVAL = 3;

/** A straight line leaves m − 2 degrees of freedom and a curved one m − 3; under two the test sees nothing. */
export const FEWEST_FOR_CURVATURE = 5;

/** Common practice: four or five temperatures over 20 to 40 K. */
export const USUAL_FEWEST = 4;
export const USUAL_RANGE_K = 20;

/** Solutions are solid here, so that numbers like these are mostly degrees Celsius taken for kelvins. */
export const COLD_BELOW_K = 150;

/** Temperatures closer than a good thermostat holds (0.1 K) are one temperature measured twice. */
export const ONE_TEMPERATURE_WITHIN_K = 0.1;

/** p-value below which a curvature counts as shown. */
export const CURVATURE_SHOWN_BELOW = 0.05;

/** Beyond u(k)/k = 20 % the mean of ln k is off by 2 % and more, and a symmetric error of ln k misleads. */
export const POORLY_KNOWN_ABOVE = 0.2;

/** Below this variance of ln k the table obeys the line to rounding, and all points count alike. */
export const EXACT_VARIANCE = 1e-16;

/** Orders that differ by more than rounding belong to different laws. */
export const SAME_ORDER_WITHIN = 1e-6;

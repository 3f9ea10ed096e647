import { LARGEST_ORDER_STEP, ORDER_BOUNDS } from "./constants";
import type { CourseLaw, StudySpecies } from "./course-law";

/** f = Π c_i^{n_i}: ∂ln f/∂n_i = ln c_i, so one logarithm a species serves the rate and its sensitivity. */

/** A concentration this small a part of the run's greatest counts as none: its logarithm is held there. */
const NOTHING = 1e-12;

/** `orders`: "free" or the value at which it is held; a species without one has order 0. */
export function powerCourse(
  species: readonly StudySpecies[],
  orders: Readonly<Record<string, "free" | number>>,
): CourseLaw {
  const isFree = (name: string) => orders[name] === "free";
  const terms = species.filter(({ name }) => isFree(name) || (orders[name] ?? 0) !== 0);
  const free = terms.filter(({ name }) => isFree(name)).map(({ name }) => name);
  const places = Int32Array.from(terms, (term) => species.indexOf(term));
  const numbers = Float64Array.from(terms, (term) => term.stoichiometricNumber);
  const parameters = Int32Array.from(terms, ({ name }) => free.indexOf(name));
  const held = terms.map(({ name }) => {
    const order = orders[name];
    return typeof order === "number" ? order : 0;
  });
  const exponents = Float64Array.from(held);
  const starts = new Float64Array(terms.length);
  const count = terms.length;
  let floor = 0;

  return {
    dimension: 1 + free.length,
    coupled: 1,
    sensitivity: "integral",
    free,
    bounds: free.map(() => ORDER_BOUNDS),
    starts: free.map(() => 1),
    largestSteps: free.map(() => LARGEST_ORDER_STEP),
    begin(concentrations, theta) {
      let greatest = 0;
      for (let i = 0; i < concentrations.length; i++) greatest = Math.max(greatest, concentrations[i] ?? 0);
      floor = NOTHING * greatest;
      for (let i = 0; i < count; i++) {
        starts[i] = concentrations[places[i] ?? 0] ?? 0;
        const parameter = parameters[i] ?? -1;
        if (parameter >= 0) exponents[i] = theta[parameter] ?? 0;
      }
    },
    evaluate(y, derivative) {
      const extent = y[0] ?? 0;
      let logarithm = 0;
      let usedUp = false;
      for (let i = 0; i < count; i++) {
        const c = (starts[i] ?? 0) + (numbers[i] ?? 0) * extent;
        const exponent = exponents[i] ?? 0;
        // Without a reactant of positive order there is no rate, however near a stage has overshot.
        if (c <= floor && exponent > 0) usedUp = true;
        const ln = Math.log(Math.max(c, floor));
        logarithm += exponent * ln;
        const parameter = parameters[i] ?? -1;
        if (parameter >= 0) derivative[1 + parameter] = ln;
      }
      const rate = usedUp ? 0 : Math.exp(logarithm);
      derivative[0] = rate;
      return rate < Number.POSITIVE_INFINITY;
    },
    overallOrder(theta) {
      let sum = 0;
      for (let i = 0; i < count; i++) {
        const parameter = parameters[i] ?? -1;
        sum += parameter >= 0 ? (theta[parameter] ?? 0) : (held[i] ?? 0);
      }
      return sum;
    },
  };
}

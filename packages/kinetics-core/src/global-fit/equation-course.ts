import { equationValue, type RateEquation } from "kinetics-core/rate-equation";
import { LARGEST_ORDER_STEP } from "./constants";
import type { CourseLaw, StudySpecies } from "./course-law";

/** A stage that oversteps exhaustion finds this part of a reactant left: c^n ln c has no value at 0 where n ≤ 0. */
const NOTHING = 1e-12;

/**
 * Any rate equation along a course, a user's expression included. The equation is asked at the stages of some ten
 * steps a run; the points themselves are read from the dense output and never ask it.
 *
 * `held`: values of parameters that are not fitted, by name. Every species of the equation must be in `species`.
 */
export function equationCourse(
  species: readonly StudySpecies[],
  equation: RateEquation,
  held: Readonly<Record<string, number>>,
): CourseLaw {
  const places = Int32Array.from(equation.species, (name) => species.findIndex((one) => one.name === name));
  const numbers = Float64Array.from(places, (place) => species[place]?.stoichiometricNumber ?? 0);
  const all = Float64Array.from(equation.parameters, ({ name, start }) => held[name] ?? start);
  const freePlaces = Int32Array.from(
    equation.parameters.flatMap(({ name }, place) => (held[name] === undefined ? [place] : [])),
  );
  const free = equation.parameters.filter(({ name }) => held[name] === undefined);
  const count = free.length;
  const starts = new Float64Array(places.length);
  const floors = new Float64Array(places.length);
  const c = new Float64Array(places.length);
  const value = equationValue(equation);
  const reversible = equation.reversible;

  function take(theta: ArrayLike<number>): void {
    for (let j = 0; j < count; j++) all[freePlaces[j] ?? 0] = theta[j] ?? 0;
  }

  return {
    dimension: 1 + count,
    coupled: reversible ? 1 + count : 1,
    sensitivity: reversible ? "variation" : "integral",
    free: free.map(({ name }) => name),
    bounds: free.map(({ bounds }) => bounds),
    starts: free.map(({ start }) => start),
    largestSteps: free.map(({ kind }) => (kind === "order" ? LARGEST_ORDER_STEP : Number.POSITIVE_INFINITY)),
    begin(concentrations, theta) {
      for (let i = 0; i < places.length; i++) {
        const start = concentrations[places[i] ?? 0] ?? 0;
        starts[i] = start;
        floors[i] = (numbers[i] ?? 0) < 0 ? NOTHING * start : 0;
      }
      take(theta);
    },
    evaluate(y, derivative) {
      const extent = y[0] ?? 0;
      for (let i = 0; i < c.length; i++) {
        const concentration = (starts[i] ?? 0) + (numbers[i] ?? 0) * extent;
        c[i] = Math.max(concentration, 0);
      }
      if (!equation.evaluate(c, all, value)) return false;
      const rate = value.f;
      if (!Number.isFinite(rate)) return false;
      derivative[0] = rate;
      if (!reversible) {
        // At rest the integrals are multiplied by a rate of zero: what they hold no longer counts.
        if (!(rate > 0)) {
          derivative.fill(0);
          return rate === 0;
        }
        for (let j = 0; j < count; j++)
          derivative[1 + j] = finiteOrZero((value.byParameter[freePlaces[j] ?? 0] ?? 0) / rate);
        return true;
      }
      let byExtent = 0;
      for (let i = 0; i < c.length; i++) byExtent += (numbers[i] ?? 0) * (value.byConcentration[i] ?? 0);
      for (let j = 0; j < count; j++)
        derivative[1 + j] = finiteOrZero(
          byExtent * (y[1 + j] ?? 0) + (value.byParameter[freePlaces[j] ?? 0] ?? 0),
        );
      return true;
    },
    overallOrder(theta) {
      if (equation.overallOrder === null) return null;
      take(theta);
      return equation.overallOrder(all);
    },
  };
}

/** c^n ln c has no value at c = 0 and n ≤ 0, for an instant of the course only. */
function finiteOrZero(value: number): number {
  return Number.isFinite(value) ? value : 0;
}

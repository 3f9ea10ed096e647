import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { autocatalyticEquation } from "./autocatalytic-equation";
import { backgroundEquation } from "./background-equation";
import { catalystEquation } from "./catalyst-equation";
import { describeEquation } from "./describe-equation";
import { inhibitedEquation } from "./inhibited-equation";
import type { PowerTerm } from "./law-of-powers";
import { powerEquation } from "./power-equation";
import { type EquationValue, equationValue, type RateEquation } from "./rate-equation";
import { reversibleEquation } from "./reversible-equation";
import { saturatingEquation } from "./saturating-equation";

fc.configureGlobal({ seed: 1864 });

const free = (species: string): PowerTerm => ({ species, order: "free" });
const held = (species: string, order: number): PowerTerm => ({ species, order });

const equations: readonly RateEquation[] = [
  powerEquation(["A", "B", "C"], ["free", 2, -0.5]),
  catalystEquation({ reactants: [held("A", 1)], catalyst: free("H") }),
  backgroundEquation({ main: [free("A"), held("B", 1)], background: [free("A")] }),
  backgroundEquation({ main: [free("A")], background: [] }),
  reversibleEquation({ forward: [free("A")], reverse: [held("P", 2)], equilibriumConstant: "free" }),
  reversibleEquation({ forward: [held("A", 1)], reverse: [free("P")], equilibriumConstant: 3 }),
  saturatingEquation({ saturating: "S", others: [free("E")] }),
  inhibitedEquation({ uninhibited: [held("A", 1), free("B")], inhibitor: "P" }),
  autocatalyticEquation({ uncatalysed: [free("A")], product: held("P", 1) }),
  autocatalyticEquation({ uncatalysed: [held("A", 1)], product: free("P") }),
];

/** |ln c| of the least concentration below: c^n changes with n on this scale. */
const LARGEST_LOGARITHM = 21;

describe("derivatives of every form", () => {
  it.each(equations.map((equation) => [describeEquation(equation), equation] as const))(
    "%s agrees with differences",
    (_, equation) => {
      fc.assert(
        fc.property(point(equation), ({ c, theta }) => {
          const value = equationValue(equation);
          expect(equation.evaluate(c, theta, value)).toBe(true);
          const size = sizeOfTerms(value, c);
          c.forEach((x, i) => {
            const h = x / 1000;
            const slope = difference(x, h, (moved) => valueAt(equation, c.with(i, moved), theta));
            expect(Math.abs((value.byConcentration[i] ?? Number.NaN) - slope) * x).toBeLessThan(1e-8 * size);
          });
          equation.parameters.forEach(({ kind }, j) => {
            const x = theta[j] ?? Number.NaN;
            const scale = kind === "order" ? 1 / LARGEST_LOGARITHM : x;
            const slope = difference(x, scale / 1000, (moved) => valueAt(equation, c, theta.with(j, moved)));
            const error = Math.abs((value.byParameter[j] ?? Number.NaN) - slope);
            expect(error * scale).toBeLessThan(1e-8 * size);
          });
        }),
        { numRuns: 200 },
      );
    },
  );

  it.each(equations.map((equation) => [describeEquation(equation), equation] as const))(
    "%s is finite or says no, whatever the numbers",
    (_, equation) => {
      const anything = fc.oneof(fc.double(), fc.constantFrom(0, -0, 1, -1, 1e-320, 1e308));
      fc.assert(
        fc.property(
          vector(equation.species.length, anything),
          vector(equation.parameters.length, anything),
          (c, theta) => {
            const value = equationValue(equation);
            if (!equation.evaluate(c, theta, value)) return;
            expect([value.f, ...value.byConcentration, ...value.byParameter].every(Number.isFinite)).toBe(
              true,
            );
            expect(c.every((x, i) => x >= 0 || !matters(equation, i))).toBe(true);
          },
        ),
        { numRuns: 500 },
      );
    },
  );
});

function matters(equation: RateEquation, place: number): boolean {
  const name = equation.species[place] ?? "";
  return equation.law.includes(`[${name}]`);
}

function vector(length: number, of: fc.Arbitrary<number>): fc.Arbitrary<Float64Array> {
  return fc.array(of, { minLength: length, maxLength: length }).map((values) => Float64Array.from(values));
}

function point(equation: RateEquation): fc.Arbitrary<{ c: Float64Array; theta: Float64Array }> {
  const concentration = fc.double({ min: -9, max: 2, noNaN: true }).map((power) => 10 ** power);
  const theta = equation.parameters.map(({ kind }) =>
    kind === "order"
      ? fc.double({ min: 0.3, max: 3, noNaN: true })
      : fc.double({ min: -3, max: 3, noNaN: true }).map((power) => 10 ** power),
  );
  return fc.record({
    c: vector(equation.species.length, concentration),
    theta: fc.tuple(...theta).map((values) => Float64Array.from(values)),
  });
}

function valueAt(equation: RateEquation, c: Float64Array, theta: Float64Array): number {
  const value = equationValue(equation);
  expect(equation.evaluate(c, theta, value)).toBe(true);
  return value.f;
}

/** Fourth-order central difference: with h a thousandth of the scale of x its own error is near 1e-11. */
function difference(x: number, h: number, of: (moved: number) => number): number {
  return (8 * (of(x + h) - of(x - h)) - (of(x + 2 * h) - of(x - 2 * h))) / (12 * h);
}

/** What the rounding of a difference is measured by: a reversible law may cancel to nothing while its terms do not. */
function sizeOfTerms(value: EquationValue, c: Float64Array): number {
  return (
    Math.abs(value.f) +
    c.reduce((sum, x, i) => sum + Math.abs(x * (value.byConcentration[i] ?? Number.NaN)), 0)
  );
}

import { describe, expect, it } from "vitest";
import { autocatalyticEquation } from "./autocatalytic-equation";
import { backgroundEquation } from "./background-equation";
import { catalystEquation } from "./catalyst-equation";
import { describeEquation } from "./describe-equation";
import { inhibitedEquation } from "./inhibited-equation";
import type { PowerTerm } from "./law-of-powers";
import { powerEquation } from "./power-equation";
import { equationValue, type RateEquation } from "./rate-equation";
import { reversibleEquation } from "./reversible-equation";
import { saturatingEquation } from "./saturating-equation";
import { simplerLawIn } from "./simpler-law";

const A: PowerTerm = { species: "A", order: 1 };
const freeA: PowerTerm = { species: "A", order: "free" };

describe("rates by hand", () => {
  it.each<[string, RateEquation, number[], number[], number]>([
    [
      "background",
      backgroundEquation({ main: [A, { species: "B", order: 1 }], background: [A] }),
      [0.2, 0.5],
      [3],
      0.2 * 0.5 + 3 * 0.2,
    ],
    ["background without powers", backgroundEquation({ main: [A], background: [] }), [0.2], [3], 3.2],
    [
      "reversible",
      reversibleEquation({
        forward: [A],
        reverse: [{ species: "P", order: 1 }],
        equilibriumConstant: "free",
      }),
      [0.2, 0.5],
      [0.5],
      0.2 - 0.25,
    ],
    [
      "known equilibrium",
      reversibleEquation({ forward: [A], reverse: [{ species: "P", order: 2 }], equilibriumConstant: 4 }),
      [0.2, 0.5],
      [],
      0.2 - 0.0625,
    ],
    [
      "saturating",
      saturatingEquation({ saturating: "S", others: [{ species: "E", order: 1 }] }),
      [0.2, 0.01],
      [0.3],
      0.4 * 0.01,
    ],
    ["inhibited", inhibitedEquation({ uninhibited: [A], inhibitor: "P" }), [0.2, 0.5], [2], 0.1],
    [
      "autocatalytic",
      autocatalyticEquation({ uncatalysed: [A], product: { species: "P", order: 2 } }),
      [0.2, 0.5],
      [8],
      0.6,
    ],
    [
      "catalyst",
      catalystEquation({ reactants: [A], catalyst: { species: "H", order: "free" } }),
      [0.2, 0.25],
      [0.5],
      0.1,
    ],
  ])("%s", (_, equation, c, theta, expected) => {
    expect(rate(equation, c, theta)).toBeCloseTo(expected, 15);
  });
});

describe("laws as text", () => {
  it.each<[RateEquation, string]>([
    [powerEquation(["A", "B"], ["free", 2]), "Powers of concentrations: v = k [A]^n_A [B]^2"],
    [
      backgroundEquation({ main: [freeA], background: [freeA] }),
      "A second path in the background: v = k ([A]^n_A + β [A]^n′_A)",
    ],
    [backgroundEquation({ main: [A], background: [] }), "A second path in the background: v = k ([A] + β)"],
    [
      reversibleEquation({
        forward: [A],
        reverse: [{ species: "P", order: "free" }],
        equilibriumConstant: "free",
      }),
      "Reversible: v = k ([A] − [P]^n′_P/K)",
    ],
    [
      reversibleEquation({ forward: [A], reverse: [{ species: "P", order: 1 }], equilibriumConstant: 0.2 }),
      "Reversible: v = k ([A] − [P]/0.2)",
    ],
    [saturatingEquation({ saturating: "S" }), "Saturating: v = k [S]/(K + [S])"],
    [inhibitedEquation({ uninhibited: [A], inhibitor: "P" }), "Inhibited: v = k [A]/(1 + K_I [P])"],
    [
      autocatalyticEquation({ uncatalysed: [A], product: { species: "P", order: 1 } }),
      "Autocatalytic: v = k [A] (1 + κ [P])",
    ],
    [
      catalystEquation({ reactants: [A], catalyst: { species: "H", order: "free" } }),
      "Order in a catalyst: v = k [A] [H]^n_H",
    ],
  ])("%#", (equation, text) => {
    expect(describeEquation(equation)).toBe(text);
  });
});

describe("units", () => {
  it.each<[RateEquation, number[], number, number[]]>([
    [
      backgroundEquation({ main: [freeA, { species: "B", order: 1 }], background: [A] }),
      [1.5, 3],
      2.5,
      [0, 1.5],
    ],
    [
      reversibleEquation({
        forward: [A],
        reverse: [{ species: "P", order: 2 }],
        equilibriumConstant: "free",
      }),
      [3],
      1,
      [-1],
    ],
    [saturatingEquation({ saturating: "S", others: [{ species: "E", order: 1 }] }), [3], 1, [1]],
    [inhibitedEquation({ uninhibited: [A], inhibitor: "P" }), [3], 1, [-1]],
    [
      autocatalyticEquation({ uncatalysed: [A], product: { species: "P", order: "free" } }),
      [2, 3],
      1,
      [0, -2],
    ],
  ])("k and every constant carry the power of concentration of %#", (equation, theta, overall, powers) => {
    expect(equation.overallOrder?.(theta)).toBe(overall);
    expect(equation.parameters.map(({ concentrationPower }) => concentrationPower?.(theta))).toEqual(powers);
  });

  it("make a rate that scales as its unit says", () => {
    const equation = backgroundEquation({ main: [freeA, { species: "B", order: 1 }], background: [A] });
    const theta = [1.5, 3];
    const scale = 1000;
    const scaled = equation.parameters.map(
      ({ concentrationPower }, j) =>
        (theta[j] ?? Number.NaN) * scale ** (concentrationPower?.(theta) ?? Number.NaN),
    );
    const expected = rate(equation, [0.2, 0.3], theta) * scale ** 2.5;
    expect(rate(equation, [200, 300], scaled) / expected).toBeCloseTo(1, 13);
  });
});

describe("starts", () => {
  const typical = (species: string) => ({ A: 0.2, P: 0.05 })[species];
  it.each<[RateEquation, number]>([
    [backgroundEquation({ main: [{ species: "A", order: 2 }], background: [A], typical }), 0.02],
    [
      reversibleEquation({
        forward: [A],
        reverse: [{ species: "P", order: 1 }],
        equilibriumConstant: "free",
        typical,
      }),
      0.4,
    ],
    [saturatingEquation({ saturating: "A", typical }), 0.2],
    [saturatingEquation({ saturating: "unknown", typical }), 0.01],
    [inhibitedEquation({ uninhibited: [A], inhibitor: "P", typical }), 2],
    [autocatalyticEquation({ uncatalysed: [A], product: { species: "P", order: 1 }, typical }), 2],
  ])("a constant where the runs can see its term, %#", (equation, start) => {
    const [parameter] = equation.parameters;
    expect(parameter?.start).toBeCloseTo(start, 14);
    expect(parameter?.nullValue).toBe(0);
    expect(parameter?.bounds).toEqual([expect.closeTo(0, 6), expect.closeTo(1e6 * start, 6)]);
  });
});

describe("what a law turns into", () => {
  const extensions: readonly [RateEquation, readonly number[]][] = [
    [backgroundEquation({ main: [freeA, { species: "B", order: 1 }], background: [A] }), [0.3, 0.4]],
    [
      reversibleEquation({
        forward: [freeA],
        reverse: [{ species: "P", order: 1 }],
        equilibriumConstant: "free",
      }),
      [0.3, 0.4],
    ],
    [saturatingEquation({ saturating: "S", others: [{ species: "E", order: "free" }] }), [0.3, 0.4]],
    [inhibitedEquation({ uninhibited: [freeA], inhibitor: "P" }), [0.3, 0.4]],
    [autocatalyticEquation({ uncatalysed: [freeA], product: { species: "P", order: 1 } }), [0.3, 0.4]],
    [catalystEquation({ reactants: [A], catalyst: { species: "H", order: "free" } }), [0.3, 0.4]],
  ];

  it.each(extensions)("is reached at the end of its parameter, up to a factor, %#", (extension, c) => {
    expect(extension.simpler.length).toBeGreaterThan(0);
    for (const { parameter, at, equation } of extension.simpler) {
      const end = Number.isFinite(at) ? at : 1e12;
      const theta = extension.parameters.map((_, j) => (j === parameter ? end : 1.3));
      const orders = equation.parameters.map(() => 1.3);
      const place = (values: readonly number[]) =>
        equation.species.map((name) => values[extension.species.indexOf(name)] ?? Number.NaN);
      const elsewhere = c.map((x, i) => x * (i + 2));
      const ratio = rate(extension, elsewhere, theta) / rate(extension, c, theta);
      expect(
        ratio / (rate(equation, place(elsewhere), orders) / rate(equation, place(c), orders)),
      ).toBeCloseTo(1, 9);
    }
  });

  it("is found by its law", () => {
    const extension = inhibitedEquation({ uninhibited: [freeA], inhibitor: "P" });
    expect(simplerLawIn(extension, powerEquation(["A"]))).toMatchObject({ parameter: 1, at: 0 });
    expect(simplerLawIn(extension, powerEquation(["A"], [1]))).toBeNull();
  });
});

describe("edges", () => {
  it("a saturating law has no rate where nothing is left and nothing is needed", () => {
    const equation = saturatingEquation({ saturating: "S" });
    expect(equation.evaluate(Float64Array.of(0), Float64Array.of(0), equationValue(equation))).toBe(false);
    expect(rate(equation, [0], [0.1])).toBe(0);
  });

  it("an autocatalytic reaction starts without product", () => {
    expect(
      rate(autocatalyticEquation({ uncatalysed: [A], product: { species: "P", order: 1 } }), [0.2, 0], [50]),
    ).toBe(0.2);
  });

  it.each<[string, () => RateEquation, string]>([
    [
      "K",
      () => reversibleEquation({ forward: [A], reverse: [], equilibriumConstant: 0 }),
      "K is 0; give a number above zero",
    ],
    [
      "saturating twice",
      () => saturatingEquation({ saturating: "A", others: [A] }),
      "A saturates and cannot have an order as well",
    ],
    [
      "inhibited by itself",
      () => inhibitedEquation({ uninhibited: [A], inhibitor: "A" }),
      "A inhibits and cannot have an order as well",
    ],
    [
      "catalysing itself",
      () => autocatalyticEquation({ uncatalysed: [A], product: A }),
      "A catalyses and cannot be in the uncatalysed path",
    ],
  ])("%s is refused with the argument", (_, make, message) => {
    expect(make).toThrow(message);
  });
});

function rate(equation: RateEquation, c: readonly number[], theta: readonly number[]): number {
  const value = equationValue(equation);
  expect(equation.evaluate(Float64Array.from(c), Float64Array.from(theta), value)).toBe(true);
  return value.f;
}

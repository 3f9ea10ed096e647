import { describe, expect, it } from "vitest";
import { powerEquation } from "./power-equation";
import { equationValue, type RateEquation } from "./rate-equation";

describe("powerEquation", () => {
  it("multiplies powers, with the derivatives by hand", () => {
    const equation = powerEquation(["A", "B"], ["free", 2]);
    const value = at(equation, [0.3, 0.2], [1.5]);
    const f = 0.3 ** 1.5 * 0.04;
    expect(value.f).toBeCloseTo(f, 15);
    expect([...value.byConcentration]).toEqual([closeTo((1.5 * f) / 0.3), closeTo((2 * f) / 0.2)]);
    expect([...value.byParameter]).toEqual([closeTo(f * Math.log(0.3))]);
  });

  it("returns the concentration itself in a held first order", () => {
    expect(at(powerEquation(["A"], [1]), [0.1234567], []).f).toBe(0.1234567);
  });

  it("ignores a species of held order zero, absent ones included", () => {
    const equation = powerEquation(["A", "B"], [1, 0]);
    const value = at(equation, [0.3, 0], []);
    expect([value.f, ...value.byConcentration]).toEqual([0.3, 1, 0]);
    expect(equation.species).toEqual(["A", "B"]);
  });

  it.each([
    { order: 2, slope: 0 },
    { order: 1, slope: 4 },
    { order: 0.5, slope: 0 },
  ])("is zero where a species of order $order is used up, with a finite slope", ({ order, slope }) => {
    const value = at(powerEquation(["A", "B"], ["free", 2]), [0, 2], [order]);
    expect([value.f, ...value.byConcentration, ...value.byParameter]).toEqual([0, slope, 0, 0]);
  });

  it("has no slope where two species are used up", () => {
    const value = at(powerEquation(["A", "B"], [1, 1]), [0, 0], []);
    expect([value.f, ...value.byConcentration]).toEqual([0, 0, 0]);
  });

  it.each([
    { what: "a negative order of what is used up", c: 0, order: -1 },
    { what: "a fitted order of exactly zero of what is used up", c: 0, order: 0 },
    { what: "a concentration below zero", c: -1e-9, order: 1 },
    { what: "a concentration that is no number", c: Number.NaN, order: 1 },
    { what: "an order that is no number", c: 0.1, order: Number.NaN },
    { what: "an order that is no number, at zero", c: 0, order: Number.NaN },
    { what: "more than a double holds", c: 1e-200, order: -2 },
  ])("has no value at $what", ({ c, order }) => {
    const equation = powerEquation(["A"]);
    expect(equation.evaluate(Float64Array.of(c), Float64Array.of(order), equationValue(equation))).toBe(
      false,
    );
  });

  it("knows its overall order and says its law", () => {
    const equation = powerEquation(["A", "B", "C"], ["free", 1, -0.5]);
    expect(equation.overallOrder?.([1.25])).toBe(1.75);
    expect(equation.law).toBe("v = k [A]^n_A [B] [C]^-0.5");
    expect(powerEquation(["A"], [0]).law).toBe("v = k");
  });

  it("starts orders at 1 or where it is told, within its bounds", () => {
    const [a, b] = powerEquation(["A", "B"], undefined, [0.5]).parameters;
    expect([a?.start, b?.start]).toEqual([0.5, 1]);
    expect(() => powerEquation(["A"], ["free"], [9])).toThrow(
      "n_A starts at 9; orders are sought from -3 to 5",
    );
  });

  it("refuses what is no law", () => {
    expect(() => powerEquation(["A", "A"])).toThrow("A stands twice in one product of powers");
    expect(() => powerEquation(["A"], [Number.NaN])).toThrow("the order of A is NaN");
    expect(() => powerEquation(["A", "B"], [1])).toThrow("2 species have 1 orders");
    expect(() => powerEquation([""])).toThrow("a species has no name");
  });
});

function at(equation: RateEquation, c: readonly number[], theta: readonly number[]) {
  const value = equationValue(equation);
  expect(equation.evaluate(Float64Array.from(c), Float64Array.from(theta), value)).toBe(true);
  return value;
}

const closeTo = (value: number) => expect.closeTo(value, 14);

import type { Shape } from "kinetics-core/least-squares";
import { describe, expect, it } from "vitest";
import { exponentialShape, generalOrderShape, partConsumed } from "./general-order";

describe("the part consumed", () => {
  // Integrated rate laws in closed form, as any textbook of kinetics has them, with [A]₀ = 1 and k = 1.
  it.each([
    ["zero order, 1 − x", 0, (x: number) => Math.min(x, 1)],
    ["half order, 1 − (1 − x/2)²", 0.5, (x: number) => (x < 2 ? 1 - (1 - x / 2) ** 2 : 1)],
    ["first order, 1 − e^(−x)", 1, (x: number) => -Math.expm1(-x)],
    ["second order, x/(1 + x)", 2, (x: number) => x / (1 + x)],
    ["third order, 1 − (1 + 2x)^(−½)", 3, (x: number) => 1 - 1 / Math.sqrt(1 + 2 * x)],
  ])("is that of the integrated law: %s", (_, order, law) => {
    for (const x of [0, 1e-9, 0.1, 0.9, 1, 1.5, 2, 5, 100]) {
      expect(partConsumed(x, order)).toBeCloseTo(law(x), 14);
    }
  });

  it("passes through first order without a jump", () => {
    for (const x of [0.01, 1, 5]) {
      for (const offset of [1e-3, 1e-6, 1e-9, 1e-12, 1e-15]) {
        // d(1 − c)/dn at n = 1 is −x²e^(−x)/2, so the two sides differ by no more than that.
        const difference = partConsumed(x, 1 + offset) - partConsumed(x, 1 - offset);
        expect(Math.abs(difference)).toBeLessThan(1.01 * offset * x * x * Math.exp(-x) + 1e-15);
      }
    }
  });
});

/** Largest disagreement of the written derivatives with central differences, relative to the curve. */
function derivativeError(shape: Shape, points: number, parameters: number[]): number {
  const column = () => new Float64Array(points);
  const derivatives = parameters.map(column);
  const value = column();
  shape.evaluate(parameters, value, derivatives);
  let worst = 0;
  parameters.forEach((parameter, j) => {
    const step = 1e-5 * Math.max(Math.abs(parameter), 0.1);
    const [ahead, behind] = [step, -step].map((move) => {
      const moved = parameters.map((p, k) => (k === j ? p + move : p));
      const result = column();
      shape.evaluate(moved, result, parameters.map(column));
      return result;
    });
    for (let i = 0; i < points; i++) {
      const numeric = (Number(ahead?.[i]) - Number(behind?.[i])) / (2 * step);
      worst = Math.max(worst, Math.abs(Number(derivatives[j]?.[i]) - numeric));
    }
  });
  return worst / Math.max(...value);
}

describe("the derivatives of the shapes", () => {
  const time = Float64Array.from({ length: 60 }, (_, i) => i / 59);

  it.each([
    ["order 0.5, before exhaustion", [0.75, 1.5]],
    ["order 1, where the ratio is a series", [2, 2]],
    ["order 1.000001", [2.000002, 2]],
    ["order 2", [3, 1.5]],
    ["order 5", [5, 1]],
    ["accelerating", [-0.5, 0.3]],
    ["almost a line", [0.01, 0.02]],
  ])("of the general order: %s", (_, parameters) => {
    expect(derivativeError(generalOrderShape(time), 60, parameters)).toBeLessThan(2e-9);
  });

  it("of the general order after exhaustion, away from the corner", () => {
    // Zero order with κ = 4 is over at τ = 1/4; the readings just before and after stay on their sides.
    const beyond = Float64Array.from([0.05, 0.1, 0.2, 0.3, 0.6, 1]);
    expect(derivativeError(generalOrderShape(beyond), 6, [0.4, 4])).toBeLessThan(2e-9);
  });

  it.each([-2, -0.01, 0, 0.01, 0.049, 0.051, 1, 30])("of the exponential: κ = %s", (kappa) => {
    expect(derivativeError(exponentialShape(time), 60, [kappa])).toBeLessThan(2e-9);
  });

  it("of the exponential agree on both sides of the series' end", () => {
    const at = (x: number) => {
      const derivative = new Float64Array(1);
      exponentialShape(Float64Array.from([1])).evaluate([x], new Float64Array(1), [derivative]);
      return Number(derivative[0]);
    };
    expect(Math.abs(at(0.05 * (1 - 1e-15)) - at(0.05))).toBeLessThan(1e-13);
  });
});

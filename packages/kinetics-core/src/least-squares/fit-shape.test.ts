import { describe, expect, it } from "vitest";
import { fitShape, type Shape } from "./fit-shape";

const time = Float64Array.from({ length: 41 }, (_, i) => i / 40);

/** φ = e^(−κt). */
const decay: Shape = {
  bounds: [[0, 50]],
  evaluate([kappa = 0], value, [byKappa]) {
    time.forEach((t, i) => {
      value[i] = Math.exp(-kappa * t);
      if (byKappa) byKappa[i] = -t * Math.exp(-kappa * t);
    });
  },
};

/** φ = e^(−κt) + a·t, two parameters. */
const decayAndDrift: Shape = {
  bounds: [
    [0, 50],
    [-5, 5],
  ],
  evaluate([kappa = 0, drift = 0], value, [byKappa, byDrift]) {
    time.forEach((t, i) => {
      value[i] = Math.exp(-kappa * t) + drift * t;
      if (byKappa) byKappa[i] = -t * Math.exp(-kappa * t);
      if (byDrift) byDrift[i] = t;
    });
  },
};

describe("a shape with its offset and scale eliminated", () => {
  it("is recovered exactly from a noiseless curve", () => {
    const values = time.map((t) => 0.3 - 1.7 * Math.exp(-4 * t));
    const fit = fitShape(values, decay, [0.5]);
    expect(fit.converged).toBe(true);
    expect(fit.parameters[0]).toBeCloseTo(4, 12);
    expect(fit.offset).toBeCloseTo(0.3, 13);
    expect(fit.scale).toBeCloseTo(-1.7, 13);
  });

  it("is recovered with two parameters from half of their values", () => {
    const values = time.map((t) => 2 + 0.5 * (Math.exp(-9 * t) + 0.8 * t));
    const fit = fitShape(values, decayAndDrift, [5, 0.5]);
    expect(fit.converged).toBe(true);
    expect(fit.parameters[0]).toBeCloseTo(9, 10);
    expect(fit.parameters[1]).toBeCloseTo(0.8, 11);
  });

  it("ends where no other parameter gives a smaller sum of squares", () => {
    const values = time.map((t, i) => Math.exp(-2 * t) + 0.05 * Math.sin(i * i));
    const { parameters, residualSquares } = fitShape(values, decay, [10]);
    const [best = 0] = parameters;
    for (const nearby of [best * 0.999, best * 1.001, best * 0.5, best * 2]) {
      const frozen: Shape = { ...decay, bounds: [[nearby, nearby]] };
      expect(fitShape(values, frozen, [nearby]).residualSquares).toBeGreaterThan(residualSquares);
    }
  });

  it("stays within bounds and says which parameter is held", () => {
    const values = time.map((t) => Math.exp(-4 * t));
    const fit = fitShape(values, { ...decay, bounds: [[0, 3]] }, [1]);
    expect(fit.parameters).toEqual([3]);
    expect(fit.held).toEqual([true]);
    expect(fit.converged).toBe(true);
  });

  it("does not move a parameter that changes nothing", () => {
    const idle: Shape = {
      bounds: [
        [0, 50],
        [-5, 5],
      ],
      evaluate([kappa = 0], value, [byKappa, byOther]) {
        decay.evaluate([kappa], value, [byKappa ?? new Float64Array(41)]);
        byOther?.fill(0);
      },
    };
    const values = time.map((t) => Math.exp(-4 * t));
    const fit = fitShape(values, idle, [1, 2]);
    expect(fit.parameters[0]).toBeCloseTo(4, 10);
    expect(fit.parameters[1]).toBe(2);
  });

  it("of a constant signal has scale 0", () => {
    const fit = fitShape(
      time.map(() => 0.7),
      decay,
      [1],
    );
    expect(fit.scale).toBeCloseTo(0, 15);
    expect(fit.offset).toBeCloseTo(0.7, 15);
  });
});

import { powerEquation, saturatingEquation } from "kinetics-core/rate-equation";
import { describe, expect, it } from "vitest";
import type { FittedLaw } from "./fitted-law";
import { unknownConcentration } from "./unknown-concentration";

const law: FittedLaw = {
  equation: powerEquation(["A", "B"]),
  logRateConstant: Math.log(2.5),
  parameters: [1.02, 0.5],
  covariance: [
    [0.09, 0.015, 0.012],
    [0.015, 0.004, 0.0005],
    [0.012, 0.0005, 0.003],
  ],
  degreesOfFreedom: 7,
  betweenRunStandardDeviation: 0.04,
  studied: { A: [0.001, 0.02], B: [0.01, 0.1] },
  level: 0.95,
};

function found(changes: Partial<FittedLaw> = {}, mixture = {}) {
  const result = unknownConcentration(
    { ...law, ...changes },
    {
      species: "A",
      concentrations: { B: { value: 0.04, relative: 0.01 } },
      rate: 2.5 * 0.006 ** 1.02 * 0.04 ** 0.5,
      relative: 0.02,
      ...mixture,
    },
  );
  if (result.status !== "found") throw new Error(result.message);
  return result;
}

describe("a concentration from a rate", () => {
  it("is the one that the law gives that rate at", () => {
    expect(found().concentration.estimate).toBeCloseTo(0.006, 12);
  });

  it("has at its ends rates that lie just t standard deviations from the measured one", () => {
    const { concentration } = found();
    for (const end of concentration.interval ?? []) {
      const gradient = [1, Math.log(end), Math.log(0.04)];
      const variance = gradient.reduce(
        (sum, a, i) =>
          sum + gradient.reduce((inner, b, j) => inner + a * b * (law.covariance?.[i]?.[j] ?? 0), 0),
        0.02 ** 2 + 0.04 ** 2 + (0.5 * 0.01) ** 2,
      );
      const distance = Math.abs(1.02 * Math.log(0.006 / end));
      // t(0.975; 7) = 2.364624.
      expect(distance / Math.sqrt(variance)).toBeCloseTo(2.364624, 5);
    }
  });

  it("is narrower from several runs of the unknown, each with its own scatter", () => {
    const width = (runs: number) => {
      const [low = 0, high = 0] = found({}, { runs }).concentration.interval ?? [];
      return Math.log(high / low);
    };
    expect(width(4)).toBeLessThan(width(1));
  });

  it("needs no logarithm of a concentration that the law holds at order 0", () => {
    const held = found({
      equation: powerEquation(["A", "B"], ["free", 0]),
      parameters: [1.02],
      covariance: [
        [0.09, 0.015],
        [0.015, 0.004],
      ],
    });
    expect(held.concentration.estimate).toBeCloseTo(0.006 * 0.04 ** (0.5 / 1.02), 10);
  });

  it("has no interval, and says so, where the order may be 0", () => {
    const loose = found({ parameters: [0.1, 0.5] });
    expect(loose.g).toBeGreaterThan(1);
    expect(loose.concentration.interval).toBeNull();
    expect(loose.flags[0]).toMatchObject({ code: "order-may-be-zero", severity: "blocks" });
  });

  it("stands alone without a covariance", () => {
    const bare = found({ covariance: null, degreesOfFreedom: null, betweenRunStandardDeviation: null });
    expect(bare.concentration).toMatchObject({ standardError: null, interval: null });
    expect(bare.flags.map((flag) => flag.code)).toEqual(["run-scatter-unknown"]);
  });

  it.each([
    [{ species: "X" }, "species"],
    [{ rate: 0 }, "rate"],
    [{ relative: -1 }, "relative"],
    [{ runs: 0 }, "runs"],
    [{ concentrations: {} }, "concentrations.B"],
  ])("refuses %j and names the place", (mixture, place) => {
    const result = unknownConcentration(law, {
      species: "A",
      concentrations: { B: { value: 0.04, relative: 0 } },
      rate: 1e-3,
      relative: 0.02,
      ...mixture,
    });
    expect(result).toMatchObject({ status: "bad-input", place, message: expect.stringMatching(/\w/) });
  });

  it("is not read back from another form of law", () => {
    const equation = saturatingEquation({ saturating: "A" });
    expect(
      unknownConcentration({ ...law, equation }, { species: "A", concentrations: {}, rate: 1, relative: 0 })
        .status,
    ).toBe("not-a-power-law");
  });
});

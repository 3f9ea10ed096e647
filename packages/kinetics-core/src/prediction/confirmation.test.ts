import { describe, expect, it } from "vitest";
import { judgeConfirmation, sealPrediction } from "./confirmation";

const request = {
  quantity: "rate",
  unit: "mol L^-1 s^-1",
  logarithm: Math.log(2e-5),
  newRunVariance: 0.05 ** 2,
  degreesOfFreedom: 8,
};

function sealed(changes: Partial<Parameters<typeof sealPrediction>[0]> = {}) {
  const result = sealPrediction({ ...request, ...changes });
  if (result.status !== "sealed") throw new Error(result.message);
  return result.sealed;
}

describe("a confirmation run", () => {
  it("is judged against the band as it was sealed: t(0.975; 8) = 2.306004 standard deviations", () => {
    const { band } = sealed();
    expect(Math.log(band[1] / 2e-5) / 0.05).toBeCloseTo(2.306004, 5);
    expect(Math.log(band[0] / 2e-5) / 0.05).toBeCloseTo(-2.306004, 5);
  });

  it("lies inside exactly when its p-value is at or above one less the level", () => {
    const prediction = sealed({ measurementRelative: 0.02 });
    for (const ratio of [0.8, 0.875, 0.885, 0.95, 1, 1.1, 1.13, 1.14, 1.3]) {
      const { verdict, pValue } = judgeConfirmation(prediction, { value: 2e-5 * ratio, relative: 0.02 });
      expect(verdict === "inside").toBe(pValue >= 0.05);
    }
  });

  it("carries the planned error of the measurement in the band, and says when it was worse", () => {
    expect(sealed({ measurementRelative: 0.05 }).standardDeviation).toBeCloseTo(0.05 * Math.SQRT2, 12);
    const judged = judgeConfirmation(sealed({ measurementRelative: 0.02 }), { value: 2e-5, relative: 0.1 });
    expect(judged.flags.map((flag) => flag.code)).toEqual(["measured-worse-than-planned"]);
  });

  it("confirms little inside a wide band", () => {
    const judged = judgeConfirmation(sealed({ newRunVariance: 0.25 }), { value: 3e-5, relative: 0 });
    expect(judged).toMatchObject({ verdict: "inside", flags: [{ code: "wide-band" }] });
  });

  it("survives storage as JSON", () => {
    expect(JSON.parse(JSON.stringify(sealed()))).toEqual(sealed());
  });

  it("has no band without scatter or freedom, and throws on a measurement that is none", () => {
    expect(sealPrediction({ ...request, newRunVariance: null }).status).toBe("no-band");
    expect(sealPrediction({ ...request, degreesOfFreedom: 0 }).status).toBe("no-band");
    expect(sealPrediction({ ...request, newRunVariance: 1e9 }).status).toBe("no-band");
    expect(() => judgeConfirmation(sealed(), { value: 0, relative: 0 })).toThrow(RangeError);
  });
});

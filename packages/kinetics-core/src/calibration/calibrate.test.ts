import { describe, expect, it } from "vitest";
import { type Calibration, calibrate } from "./calibrate";
import type { CalibrateInput } from "./calibration";

function calibrated(input: CalibrateInput): Calibration {
  const result = calibrate(input);
  if (result.status !== "calibrated") throw new Error(result.message);
  return result;
}

const codes = (result: Calibration) => result.flags.map((flag) => flag.code);

/** Six standards on y = 1 + 2 x with errors of one size, alternating. */
const x = [0, 1, 2, 3, 4, 5];
const scattered = x.map((value, i) => 1 + 2 * value + 0.05 * (i % 2 === 0 ? 1 : -1));
const exact = x.map((value) => 1 + 2 * value);

describe("findings about the line", () => {
  it("computed figures, little freedom, an intercept that is not needed and one that is", () => {
    expect(codes(calibrated({ concentrations: x, signals: exact }))).toContain("exact-table");
    expect(codes(calibrated({ concentrations: [0, 1, 2], signals: [0, 1, 2.1] }))).toContain(
      "little-freedom",
    );
    const near = calibrated({ concentrations: x, signals: scattered.map((value) => value - 1) });
    expect(codes(near)).toContain("intercept-covers-zero");
    expect(codes(calibrated({ concentrations: x, signals: scattered, intercept: "none" }))).toContain(
      "intercept-needed",
    );
  });

  it("with weights the limits are said to be those of a signal of weight 1", () => {
    const result = calibrated({ concentrations: x, signals: scattered, weights: [9, 4, 2, 1, 1, 1] });
    const flag = result.flags.find((one) => one.code === "limits-of-unit-weight");
    expect(flag?.message).toMatch(/weight of the lowest standard, 9/);
  });
});

import { describe, expect, it } from "vitest";
import { calibrated, codes, exact, scattered, x } from "./example-line";

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

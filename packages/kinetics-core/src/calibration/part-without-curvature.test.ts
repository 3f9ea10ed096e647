import { describe, expect, it } from "vitest";
import { fitCalibrationLine } from "./fit-calibration-line";
import { linearRange } from "./linear-range";
import { partWithoutCurvature } from "./part-without-curvature";

function partOf(concentrations: readonly number[], signals: readonly number[]): number | null {
  const line = fitCalibrationLine({ concentrations, signals });
  if (line.status !== "fitted") throw new Error(line.message);
  return partWithoutCurvature(line);
}

const levels = Array.from({ length: 11 }, (_, i) => i);
const errors = [1, -1, -1, 1, 0, 1, -1, 0, 1, -1, 0].map((error) => 0.02 * error);
const straight = levels.map((c, i) => c + (errors[i] ?? 0));

describe("the part of a line without curvature", () => {
  it("ends where the signal begins to bend, give or take a standard", () => {
    // Straight up to 7, level from there on.
    const bent = straight.map((signal, i) => (i > 7 ? 7 + (errors[i] ?? 0) : signal));
    const part = partOf(levels, bent) ?? Number.NaN;
    expect(part).toBeGreaterThanOrEqual(7);
    expect(part).toBeLessThanOrEqual(8);
    const line = fitCalibrationLine({ concentrations: levels, signals: bent });
    const range = line.status === "fitted" ? linearRange(line) : null;
    expect(range?.status === "assessed" && range.curvedFrom).toBeLessThan(7);
  });

  it("is not asked for where no curvature is shown, and unknown where all of it bends", () => {
    expect(partOf(levels, straight)).toBeNull();
    expect(
      partOf(
        levels,
        levels.map((c) => c - 0.04 * c * c),
      ),
    ).toBeNull();
    expect(partOf([0, 1, 2], [0, 1, 1])).toBeNull();
  });

  it("takes steps through a dense set of levels", () => {
    const dense = Array.from({ length: 400 }, (_, i) => i / 10);
    const part = partOf(
      dense,
      dense.map((c, i) => Math.min(c, 30) + (errors[i % 11] ?? 0)),
    );
    expect(part).toBeGreaterThan(27);
    expect(part).toBeLessThan(32);
  });
});

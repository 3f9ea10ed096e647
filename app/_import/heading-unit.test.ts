import { describe, expect, it } from "vitest";
import { headingFault } from "./heading-unit";

describe("the unit that a pasted heading names", () => {
  it.each(["[A]0 (mol/L)", "A / mol L-1", "A / M", "mol/L", "[A]₀ / mol·L⁻¹", "c0 [mol/L]"])(
    "%s over a column of mmol/L is said",
    (heading) => {
      expect(headingFault(heading, "mmol L^-1")).toContain("says mol/L and the column is in mmol/L.");
      expect(headingFault(heading, "mol L^-1")).toBeNull();
    },
  );

  it.each(["[A]0", "A", "", "ester, conc", "[A]0 / mmol/L", "mM", "t / s"])(
    "%s over a column of mmol/L passes",
    (heading) => {
      expect(headingFault(heading, "mmol L^-1")).toBeNull();
    },
  );

  it.each([
    ["rate / mol L-1 min-1", "mol/L/min"],
    ["v0 (mol/L/min)", "mol/L/min"],
    ["rate (mmol/(L·min))", "mmol/L/min"],
    ["v / mol L⁻¹ s⁻¹", "mol/L/s"],
    ["M/s", "mol/L/s"],
    ["v (µM s^-1)", "µmol/L/s"],
  ])("%s over a column of mmol/L/s is said", (heading, unit) => {
    expect(headingFault(heading, "mmol L^-1 s^-1")).toContain(`says ${unit} and`);
  });

  it.each(["rate", "v0", "rate / mmol L-1 s-1", "mM/s", "initial rate (run 3)"])("%s passes", (heading) => {
    expect(headingFault(heading, "mmol L^-1 s^-1")).toBeNull();
  });

  it("tells kelvin from degrees Celsius, and micromoles in either letter", () => {
    expect(headingFault("T / K", "°C")).toBe("The heading “T / K” says K and the column is in °C.");
    expect(headingFault("cell (°C)", "°C")).toBeNull();
    expect(headingFault("B / umol/L", "µmol L^-1")).toBeNull();
    expect(headingFault("Remark", "")).toBeNull();
  });
});

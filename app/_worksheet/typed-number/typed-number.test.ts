import { describe, expect, it } from "vitest";
import { parseNumber } from "./parse-number";
import { parseUncertain } from "./parse-uncertain";
import { typedNumber, typedUncertain } from "./print-typed";

describe("parseNumber", () => {
  it.each([
    ["1,5", 1.5],
    ["1.5", 1.5],
    ["−2", -2],
    ["+0,05", 0.05],
    ["1 234,5", 1234.5],
    ["17\u202F930", 17930],
    ["1.234,5", 1234.5],
    ["1,234.5", 1234.5],
    ["1e-3", 0.001],
    ["1,2 × 10^-3", 0.0012],
    ["1.2x10⁻³", 0.0012],
    [".5", 0.5],
  ])("reads %s", (typed, value) => {
    expect(parseNumber(typed)).toMatchObject({ status: "number", value });
  });

  it.each([
    "abc",
    "1..2",
    "1,2,3",
    "0x10",
    "Infinity",
    "NaN",
    "12,5 mM",
    "1e999",
    "--1",
    "1 2",
    "9".repeat(500),
  ])("refuses %s with a sentence", (typed) => {
    const reading = parseNumber(typed);
    expect(reading.status).toBe("not-a-number");
    expect(reading.status === "not-a-number" && reading.message.length).toBeGreaterThan(10);
  });

  it("calls blank text empty, never zero", () => {
    expect(parseNumber("  ")).toEqual({ status: "empty" });
  });
});

describe("parseUncertain", () => {
  it.each([
    ["25.0 ± 0.1", 25, 0.1],
    ["25,0 +- 0,1", 25, 0.1],
    ["25.0 +/- 0.1", 25, 0.1],
    ["25.0(1)", 25, 0.1],
    ["25,0 (12)", 25, 1.2],
    ["0.100(1)", 0.1, 0.001],
    ["17930 ± 0.4 %", 17930, 71.72],
    ["17 930(55)", 17930, 55],
    ["2.86(7)e-5", 2.86e-5, 7e-7],
    ["(2.86 ± 0.07) × 10⁻⁵", 2.86e-5, 7e-7],
    ["−3.5 ± 0.2", -3.5, 0.2],
    ["25", 25, 0],
  ])("reads %s", (typed, value, standardUncertainty) => {
    expect(parseUncertain(typed)).toEqual({ status: "uncertain", value, standardUncertainty });
  });

  it.each(["25 ±", "± 0.1", "25 ± −0.1", "1 ± 2 ± 3", "25 °C", "25(1", "25(x)", "(".repeat(300)])(
    "refuses %s",
    (typed) => {
      expect(parseUncertain(typed).status).toBe("not-readable");
    },
  );
});

describe("typedUncertain", () => {
  it.each([
    [25, 0.1, "25.0 ± 0.1"],
    [0.1, 0.001, "0.100 ± 0.001"],
    [17930, 55, "17930 ± 55"],
    [400, 0, "400"],
    [-3.5, 0.25, "−3.50 ± 0.25"],
  ])("prints %d, %d for a box", (value, standardUncertainty, text) => {
    expect(typedUncertain({ value, standardUncertainty })).toBe(text);
  });

  it("prints nothing that reads back as another number", () => {
    for (const value of [2.86e-5, 1 / 3, 1e9, 299.95 - 273.15, 5e-5 * 1e6, -0.2]) {
      expect(parseNumber(typedNumber(value))).toMatchObject({
        status: "number",
        value: Number(value.toPrecision(12)),
      });
    }
  });
});

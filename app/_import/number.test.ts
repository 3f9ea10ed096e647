import { describe, expect, it } from "vitest";
import { readCell } from "./number";

const point = { decimalMark: ".", stated: false } as const;
const comma = { decimalMark: ",", stated: false } as const;

describe("readCell", () => {
  it.each([
    ["0.1", 0.1],
    ["  12  ", 12],
    [".5", 0.5],
    ["5.", 5],
    ["+3", 3],
    ["−0.25", -0.25],
    ["- 4", -4],
    ["1e-3", 1e-3],
    ["2.5E+06", 2.5e6],
    ["6.02·10^13", 6.02e13],
    ["9007199254740993", 9007199254740992],
    ["0.1000000000000000055511151231257827", 0.1],
    ["4.9e-324", 4.9e-324],
    ["1e20", 1e20],
    ["12 345.5", 12345.5],
    ["1\u202f234.5", 1234.5],
    ["1,234.5", 1234.5],
  ])("%s is %d", (text, value) => {
    expect(readCell(text, point)).toEqual({ kind: "number", value });
  });

  it.each([
    ["0,1", 0.1],
    ["-1,5e-3", -1.5e-3],
    ["1.234,5", 1234.5],
    ["1.234.567", 1234567],
  ])("%s with a decimal comma is %d", (text, value) => {
    expect(readCell(text, comma)).toEqual({ kind: "number", value });
  });

  it("keeps both readings of a lone mark before three digits", () => {
    expect(readCell("1,234", point)).toEqual({ kind: "ambiguous", asDecimal: 1.234, asGrouped: 1234 });
    expect(readCell("-1.234", comma)).toEqual({ kind: "ambiguous", asDecimal: -1.234, asGrouped: -1234 });
    expect(readCell("1,234", { decimalMark: ".", stated: true })).toEqual({ kind: "number", value: 1234 });
  });

  it.each(["NaN", "nan", "Inf", "-inf", "∞", "#N/A", "n/a", "OVER", "---", "1.#INF"])(
    "%s is no reading",
    (text) => {
      expect(readCell(text, point).kind).toBe("no-reading");
    },
  );

  it.each(["12abc", "0.5 s", "1.2.3", "0x10", "1e", "--5", "1,23", "0,5", "1 23", "true", "٣", "1_000"])(
    "%s is text",
    (text) => {
      expect(readCell(text, point).kind).toBe("text");
    },
  );

  it("refuses what a double cannot hold", () => {
    expect(readCell("1e999", point).kind).toBe("out-of-range");
    expect(readCell("1e-999", point).kind).toBe("out-of-range");
    // What instruments write for an overflow: its square would be the end of every fit.
    expect(readCell("9.9E+37", point).kind).toBe("out-of-range");
    expect(readCell("-1.7976931348623157e308", point).kind).toBe("out-of-range");
    expect(readCell("0e-999", point)).toEqual({ kind: "number", value: 0 });
  });
});

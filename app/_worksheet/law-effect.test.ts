import { describe, expect, it } from "vitest";
import { type LawSnapshot, lawEffect } from "./law-effect";

function law(value: string, uncertainty: string | null = "0.3", order = "1", power = 0): LawSnapshot {
  return {
    status: "law",
    expression: {
      constant: "*k*",
      factors: [
        { symbol: "A", order: "1" },
        { symbol: "B", order },
      ],
    },
    constant: { symbol: "*k*", number: { value, uncertainty, power }, unit: "L mol^-1 s^-1" },
    internal: Number(value) * 10 ** power,
  };
}

const none: LawSnapshot = { status: "no-law", missing: "Two more levels of B are needed." };

describe("lawEffect", () => {
  it("says from where to where the constant moved, and when it did not", () => {
    expect(lawEffect(law("11.8"), law("11.7"))).toBe(
      "*k* moves from 11.8 ± 0.3 to 11.7 ± 0.3 L mol^-1 s^-1.",
    );
    expect(lawEffect(law("11.8"), law("11.8"))).toBe("*k* stays at 11.8 ± 0.3 L mol^-1 s^-1.");
  });

  it("tells a value that stays, printed to other digits, from one that moves", () => {
    expect(lawEffect(law("0.85", "0.03"), law("0.847", "0.019"))).toBe(
      "*k* keeps its value and its interval narrows: 0.85 ± 0.03 before, now 0.847 ± 0.019 L mol^-1 s^-1.",
    );
    expect(lawEffect(law("11.8"), law("11.8", "0.4"))).toContain("keeps its value and its interval widens");
    expect(lawEffect(law("1.9", null), law("1.9", "0.2"))).toContain("gains an interval");
    expect(lawEffect(law("0.85", "0.03"), law("0.836", "0.019"))).toContain("moves from");
  });

  it("says that an order counts as exact rather than that it moves from 1.00 to 1", () => {
    expect(lawEffect(law("11.8", "0.3", "1.00"), law("11.8"))).toMatch(
      /^The order in B now counts as 1 exactly\. /,
    );
    expect(lawEffect(law("11.8"), law("11.8", "0.3", "1.0"))).toMatch(/^The order in B is free, 1\.0\. /);
  });

  it("repeats the power of ten on both sides", () => {
    expect(lawEffect(law("2.86", "0.07", "1", -5), law("2.90", null, "1", -5))).toBe(
      "*k* moves from (2.86 ± 0.07) × 10^-5 L mol^-1 s^-1 to 2.90 × 10^-5 L mol^-1 s^-1.",
    );
  });

  it("names an order that moved before the constant", () => {
    expect(lawEffect(law("11.8"), law("9", "2", "0.93"))).toBe(
      "The order in B moves from 1 to 0.93. *k* moves from 11.8 ± 0.3 to 9 ± 2 L mol^-1 s^-1.",
    );
  });

  it("says that the constant is the same where its unit of time alone changed", () => {
    const seconds = law("2.00", "0.03");
    if (seconds.status !== "law") throw new Error("a law");
    const minutes = (value: string, internal: number): LawSnapshot => ({
      ...seconds,
      constant: {
        symbol: "*k*",
        number: { value, uncertainty: "1.8", power: 0 },
        unit: "L mol^-1 min^-1",
      },
      internal,
    });
    expect(lawEffect(seconds, minutes("120.0", 2 * (1 + 1e-13)))).toBe(
      "*k* is the same in another unit: 2.00 ± 0.03 L mol^-1 s^-1 is 120.0 ± 1.8 L mol^-1 min^-1.",
    );
    // Another value in another unit has moved.
    expect(lawEffect(seconds, minutes("126.0", 2.1))).toBe(
      "*k* was 2.00 ± 0.03 L mol^-1 s^-1; now *k* = 126.0 ± 1.8 L mol^-1 min^-1.",
    );
  });

  it("speaks of two constants where the unit changed", () => {
    const other = law("0.5");
    if (other.status !== "law") throw new Error("a law");
    const centre: LawSnapshot = {
      ...other,
      constant: {
        symbol: "rate at the centre",
        number: { value: "1.2", uncertainty: "0.1", power: 0 },
        unit: "µmol L^-1 s^-1",
      },
    };
    expect(lawEffect(law("11.8"), centre)).toBe(
      "*k* was 11.8 ± 0.3 L mol^-1 s^-1; now rate at the centre = 1.2 ± 0.1 µmol L^-1 s^-1.",
    );
  });

  it("tells when a law came or went, and stays silent while there is none", () => {
    expect(lawEffect(none, law("11.8"))).toBe("A law stands now: *k* = 11.8 ± 0.3 L mol^-1 s^-1.");
    expect(lawEffect(law("11.8"), none)).toBe("No law stands any more. Two more levels of B are needed.");
    expect(lawEffect(none, none)).toBe("");
  });
});

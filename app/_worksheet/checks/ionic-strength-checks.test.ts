import { describe, expect, it } from "vitest";
import type { Sheet, SheetStock } from "@/db/sheet/sheet.schema";
import { exampleRun, exampleSheet } from "@/tests/example-sheet";
import { ionicStrengthChecks } from "./ionic-strength-checks";

const stock = (id: string, contents: Readonly<Record<string, number>>): SheetStock => ({
  id,
  symbol: id,
  name: id,
  position: 0,
  contents: Object.fromEntries(
    Object.entries(contents).map(([species, value]) => [species, { value, standardUncertainty: 0 }]),
  ),
  dilution: null,
  lot: "",
  madeOn: "",
  howKnown: "",
});

/** A⁻ + B⁻, with a salt of A in one stock and of B in another, made up to 10 mL with the given volumes of B. */
function checked(charges: readonly [number, number], volumes: readonly number[]) {
  const plain = exampleSheet();
  const [a, b, p] = plain.species;
  if (a === undefined || b === undefined || p === undefined) throw new Error("three species");
  const sheet: Sheet = {
    ...plain,
    species: [
      { ...a, charge: charges[0] },
      { ...b, charge: charges[1] },
      { ...p, inLaw: false, charge: 1 },
    ],
    stocks: [stock("SA", { A: 0.01, P: 0.01 }), stock("SB", { B: 0.1, P: 0.1 })],
    mixing: { volumeUnit: "uL", markMicrolitre: 10_000, deliveries: [] },
    runs: volumes.map((volume, index) => exampleRun(index, {}, { volumes: { SA: 100, SB: volume } })),
  };
  const rate = { kind: "entered", molarPerSecond: 1e-6, standardError: null } as const;
  return ionicStrengthChecks({
    sheet,
    rule: null,
    runs: [],
    carrying: sheet.runs.map((run) => ({ run, rate })),
    law: { status: "no-law", missing: "", fit: null },
  });
}

describe("ionic strength between runs", () => {
  it("weakens where the primary salt effect passes 1 %, and says by how much", () => {
    // I from 1.10 × 10⁻³ to 0.0101 mol/L, z_A·z_B = 1: 4.605·0.51·(√I/(1+√I) taken between) = 0.14.
    const [check] = checked([-1, -1], [100, 1000]);
    expect(check).toMatchObject({ severity: "weakens", station: "runs", code: "ionic-strength-spread" });
    expect(check?.message).toContain("from 1.10 × 10⁻³ to 0.0101 mol L^-1");
    const moved = Number(/by (\d+) %/.exec(check?.message ?? "")?.[1]);
    const g = (strength: number) => Math.sqrt(strength) / (1 + Math.sqrt(strength));
    expect(moved).toBeCloseTo(100 * Math.expm1(2 * Math.LN10 * 0.51 * (g(0.0101) - g(0.0011))), -0.5);
  });

  it("holds where it is level, or moves k by less than 1 %", () => {
    expect(checked([-1, -1], [1000, 1000])[0]?.severity).toBe("holds");
    expect(checked([-1, -1], [1000, 1040])[0]).toMatchObject({
      severity: "holds",
      message: expect.stringContaining("moves"),
    });
  });

  it("is a note where one reactant is neutral, and nothing without charges or with one run", () => {
    expect(checked([0, -1], [100, 1000])[0]?.severity).toBe("note");
    expect(checked([-1, -1], [100])).toEqual([]);
  });
});

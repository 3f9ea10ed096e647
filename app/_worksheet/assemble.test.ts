import { describe, expect, test } from "vitest";
import { exampleRun, exampleSheet } from "@/tests/example-sheet";
import { completeExtent, rateScale, signalSpan } from "./assemble";

const run = exampleRun(0, { A: 50e-6, B: 2e-3 });

describe("rate of reaction from the signal", () => {
  test("v = (dS/dt)/(perMolar·ν) with the signed stoichiometric number of the followed species", () => {
    const sheet = exampleSheet();
    expect(rateScale(sheet)).toEqual({ status: "known", signalPerExtent: 18_000, sharedRelative: 0.01 });
    const falling = exampleSheet({
      followedSpeciesId: "A",
      species: sheet.species.map((one) => (one.id === "A" ? { ...one, stoichiometricNumber: -2 } : one)),
    });
    expect(rateScale(falling)).toMatchObject({ signalPerExtent: -36_000 });
  });

  test("a concentration needs no factor and shares no uncertainty", () => {
    const sheet = exampleSheet({ signal: { kind: "concentration", unit: "mol/L" } });
    expect(rateScale(sheet)).toEqual({ status: "known", signalPerExtent: 1, sharedRelative: 0 });
  });

  test("a set-up without a followed species, a signal or a stoichiometric number says what it lacks", () => {
    for (const [sheet, words] of [
      [exampleSheet({ followedSpeciesId: null }), "which species"],
      [exampleSheet({ signal: null }), "how the signal"],
      [
        exampleSheet({
          species: exampleSheet().species.map((one) => ({ ...one, stoichiometricNumber: 0 })),
        }),
        "stoichiometric number 0",
      ],
    ] as const) {
      const scale = rateScale(sheet);
      expect(scale.status === "unknown" && scale.reason).toContain(words);
    }
  });
});

describe("signal at complete conversion", () => {
  test("follows from the limiting reactant, c₀/|ν|", () => {
    expect(completeExtent(exampleSheet(), run)).toBeCloseTo(50e-6, 12);
    const greedy = exampleSheet({
      species: exampleSheet().species.map((one) =>
        one.id === "B" ? { ...one, stoichiometricNumber: -80 } : one,
      ),
    });
    expect(completeExtent(greedy, run)).toBeCloseTo(25e-6, 12);
    expect(signalSpan(exampleSheet(), run)).toBeCloseTo(0.9, 12);
  });

  test("is unknown without any reactant's concentration", () => {
    expect(signalSpan(exampleSheet(), exampleRun(0, {}))).toBeNull();
  });
});

import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { forRateLaw } from "./for-rate-law";
import { mixRuns } from "./mix-runs";
import type { Mixing, MixingInput, Portion, Total } from "./mixing";

// The same cases on every machine.
fc.configureGlobal({ seed: 1975 });

const names = ["A", "B", "A/10"] as const;
const volume = fc.double({ min: 0.1, max: 10, noNaN: true });
const relative = fc.double({ min: 0, max: 0.05, noNaN: true });
const measured = fc.record({
  volume,
  standardUncertainty: fc.double({ min: 0, max: 0.05, noNaN: true }),
  device: fc.constantFrom("pipette", "burette"),
});
const portion: fc.Arbitrary<Portion> = fc
  .tuple(measured, fc.constantFrom(...names, null))
  .map(([one, solution]) => ({ ...one, solution }));
const total: fc.Arbitrary<Total> = fc.oneof(
  fc.constant({ kind: "sum" as const }),
  measured.map((one) => ({ ...one, kind: "mark" as const, volume: 100 + one.volume })),
);
const sheet: fc.Arbitrary<MixingInput> = fc
  .record({
    errors: fc.tuple(relative, relative, relative, relative),
    step: fc.tuple(measured, measured),
    runs: fc.array(fc.record({ portions: fc.array(portion, { minLength: 1, maxLength: 4 }), total }), {
      minLength: 1,
      maxLength: 5,
    }),
  })
  .map(({ errors: [a, b, pipette, burette], step: [aliquot, flask], runs }) => ({
    devices: [
      { name: "pipette", relative: pipette },
      { name: "burette", relative: burette },
    ],
    charges: { A: 1, B: -1, C: 0 },
    solutions: [
      stockOf("A", 0.1, a, { A: 1, B: 1 }),
      stockOf("B", 2, b, { C: 1 }),
      {
        kind: "mixture" as const,
        name: "A/10",
        portions: [{ ...aliquot, solution: "A" }],
        total: { ...flask, kind: "mark" as const, volume: flask.volume + 10 },
      },
    ],
    runs: runs.map((run, j) => ({ ...run, label: `R${j}` })),
  }));

function stockOf(name: string, value: number, part: number, species: Readonly<Record<string, number>>) {
  const solute = { name, concentration: { value, standardUncertainty: part * value }, species };
  return { kind: "stock" as const, name, solutes: [solute] };
}

function row(mixing: Mixing, label: string) {
  const found = mixing.runs.find((one) => one.label === label);
  if (found?.status !== "mixed") throw new Error(found?.message ?? label);
  return found;
}

const near = (value: number, wanted: number) =>
  expect(Math.abs(value - wanted)).toBeLessThanOrEqual(1e-9 * Math.abs(wanted) + 1e-15);

describe("a sheet of mixtures", () => {
  it("does not depend on the unit of volume", () => {
    fc.assert(
      fc.property(sheet, fc.constantFrom(1e-3, 1e3, 1e-6), (input, factor) => {
        const scale = <T extends { readonly volume: number; readonly standardUncertainty?: number }>(
          one: T,
        ) => ({
          ...one,
          volume: factor * one.volume,
          standardUncertainty: factor * (one.standardUncertainty ?? 0),
        });
        const made = <T extends { readonly portions: readonly Portion[]; readonly total: Total | null }>(
          one: T,
        ) => ({
          ...one,
          portions: one.portions.map(scale),
          total: one.total?.kind === "mark" ? scale(one.total) : one.total,
        });
        const plain = mixRuns(input);
        const scaled = mixRuns({
          ...input,
          solutions: input.solutions.map((one) => (one.kind === "mixture" ? made(one) : one)),
          runs: input.runs.map(made),
        });
        for (const { label } of input.runs) {
          for (const species of plain.species) {
            const [one, other] = [row(plain, label), row(scaled, label)];
            near(other.concentrations[species] ?? 0, one.concentrations[species] ?? 0);
            near(other.standardUncertainties[species] ?? 0, one.standardUncertainties[species] ?? 0);
          }
        }
      }),
    );
  });

  it("does not depend on the order of its runs and solutions", () => {
    fc.assert(
      fc.property(sheet, (input) => {
        const plain = mixRuns(input);
        const turned = mixRuns({
          ...input,
          solutions: [...input.solutions].reverse(),
          runs: [...input.runs].reverse(),
        });
        for (const { label } of input.runs) {
          for (const species of plain.species) {
            const [one, other] = [row(plain, label), row(turned, label)];
            near(other.concentrations[species] ?? 0, one.concentrations[species] ?? 0);
            near(other.standardUncertainties[species] ?? 0, one.standardUncertainties[species] ?? 0);
          }
        }
      }),
    );
  });

  it("gives concentrations between zero and the strongest stock, and private and shared parts that add up", () => {
    fc.assert(
      fc.property(sheet, (input) => {
        const mixing = mixRuns(input);
        const { runs, shared } = forRateLaw(mixing, ["A", "C"]);
        runs.forEach(({ label, concentrations, relativeUncertainty }) => {
          for (const [species, most] of [
            ["A", 0.1],
            ["C", 2],
          ] as const) {
            const concentration = concentrations[species] ?? Number.NaN;
            expect(concentration).toBeGreaterThanOrEqual(0);
            expect(concentration).toBeLessThanOrEqual(most * (1 + 1e-12));
            if (concentration === 0) continue;
            const parts = shared.map((one) =>
              one.species.includes(species) && (one.runs?.includes(label) ?? true)
                ? one.relative * (one.factors?.[label]?.[species] ?? 1)
                : 0,
            );
            const all = Math.hypot(relativeUncertainty[species] ?? 0, ...parts);
            near(all * concentration, row(mixing, label).standardUncertainties[species] ?? 0);
          }
        });
      }),
    );
  });

  it("answers or refuses each row, and never with a NaN", () => {
    const any = fc.oneof(fc.double(), fc.constantFrom(0, 1, -1, 1e-300, 1e300, Number.NaN));
    fc.assert(
      fc.property(fc.array(any, { minLength: 6, maxLength: 6 }), fc.boolean(), ([a, b, c, d, e, f], mark) => {
        const mixing = mixRuns({
          devices: [{ name: "pipette", relative: a ?? 0 }],
          charges: { A: b ?? 0 },
          solutions: [stockOf("A", c ?? 0, 0.01, { A: 1 })],
          runs: [
            {
              label: "R",
              portions: [{ solution: "A", volume: d ?? 0, standardUncertainty: e ?? 0, device: "pipette" }],
              total: mark ? { kind: "mark", volume: f ?? 0 } : { kind: "sum" },
            },
          ],
        });
        expect(JSON.stringify([mixing, forRateLaw(mixing, ["A", "X"])], numbers)).not.toMatch(/NaN/);
      }),
      { numRuns: 500 },
    );
  });
});

/** JSON would turn them into null. */
function numbers(_key: string, value: unknown): unknown {
  return typeof value === "number" && !Number.isFinite(value) ? "NaN" : value;
}

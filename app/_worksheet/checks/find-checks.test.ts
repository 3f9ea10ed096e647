import { afterAll, beforeAll, expect, test } from "vitest";
import type { Sheet, SheetRun } from "@/db/sheet/sheet.schema";
import { type TemporaryDatabase, temporaryDatabase } from "@/db/testing/temporary-database";
import { writeTrace } from "@/db/trace/write-trace";
import { exampleRun, exampleSheet } from "@/tests/example-sheet";
import { analyseStudy } from "../analyse-study";

let temporary: TemporaryDatabase;
beforeAll(async () => {
  temporary = await temporaryDatabase();
});
afterAll(() => temporary.close());

/** Rates of 12 [A][B] for A and B over three levels each, with invented scatter of 1 %. */
function sheetWith(change: (index: number) => Partial<SheetRun>, rest: Partial<Sheet> = {}): Sheet {
  const recipes = [
    [2e-5, 2e-3],
    [5e-5, 2e-3],
    [1e-4, 2e-3],
    [5e-5, 1e-3],
    [5e-5, 4e-3],
    [5e-5, 2e-3],
  ] as const;
  return exampleSheet({
    runs: recipes.map(([A, B], index) =>
      exampleRun(
        index,
        { A, B },
        {
          enteredRate: {
            molarPerSecond: 12 * A * B * (1 + (index % 2 === 0 ? 0.01 : -0.01)),
            standardError: null,
          },
          ...change(index),
        },
      ),
    ),
    ...rest,
  });
}

async function checksOf(sheet: Sheet) {
  return (await analyseStudy(temporary.db, sheet)).checks;
}

test("a clean study has checks that hold, and none that weakens", async () => {
  const checks = await checksOf(sheetWith(() => ({})));
  expect(checks.filter((check) => check.severity === "blocks" || check.severity === "weakens")).toEqual([]);
  expect(checks.map((check) => check.code)).toEqual(expect.arrayContaining(["levels", "influence"]));
});

test("a rate that is negative blocks its run, and the way out is named", async () => {
  const checks = await checksOf(
    sheetWith((index) =>
      index === 0 ? { enteredRate: { molarPerSecond: -1e-7, standardError: null } } : {},
    ),
  );
  expect(checks[0]).toMatchObject({
    code: "rate-not-positive",
    severity: "blocks",
    runId: "run-0",
    settled: null,
  });
  expect(checks[0]?.message).toMatch(/^R01: the initial rate is negative.*or set the run aside\.$/);
});

test("a rate entered for a run that has a trace does not count, and the run says so", async () => {
  const timeSeconds = Float64Array.from({ length: 20 }, (_, index) => index);
  const sha256 = await temporary.db
    .transaction()
    .execute((trx) => writeTrace(trx, { timeSeconds, signal: timeSeconds.map((t) => 1e-3 * t) }));
  const checks = await checksOf(
    sheetWith((index) =>
      index === 0 ? { trace: { sha256, points: 20, uploadId: null, column: "column 2" } } : {},
    ),
  );
  const notes = checks.filter((check) => check.code === "entered-rate-unused");
  expect(notes).toMatchObject([{ severity: "note", runId: "run-0", station: "rates" }]);
  expect(notes[0]?.message).toContain("the rate entered by hand is kept and does not count");
});

test("a trace with fewer than two independent readings says so once, and no figure of its noise", async () => {
  const timeSeconds = Float64Array.from({ length: 12 }, (_, index) => 10 * index);
  const signal = timeSeconds.map((t) => 0.9 * (1 - Math.exp(-0.02 * t)));
  const sha256 = await temporary.db.transaction().execute((trx) => writeTrace(trx, { timeSeconds, signal }));
  const checks = await checksOf(
    sheetWith((index) =>
      index === 0
        ? { trace: { sha256, points: 12, uploadId: null, column: "column 2" }, enteredRate: null }
        : {},
    ),
  );
  const onNoise = checks.filter((check) => /noise|independent|correlate/i.test(check.message));
  expect(onNoise).toMatchObject([{ code: "few-effective-points", severity: "weakens", runId: "run-0" }]);
  expect(onNoise[0]?.message).toMatch(/^R01: it has too few readings to judge its noise/);
});

test("setting that run aside settles its check, which then stands last", async () => {
  const checks = await checksOf(
    sheetWith((index) =>
      index === 0
        ? {
            enteredRate: { molarPerSecond: -1e-7, standardError: null },
            setAside: { reason: "stirrer stopped", memberId: "m", at: "2026-01-05T10:00:00.000Z" },
          }
        : {},
    ),
  );
  expect(checks.at(-1)).toMatchObject({ code: "rate-not-positive", settled: "Set aside: stirrer stopped" });
});

test("temperatures that spread by 0.5 K weaken at 80 kJ/mol, by 2 K they block, by 0.05 K they hold", async () => {
  const spread = async (kelvin: number) => {
    const checks = await checksOf(
      sheetWith((index) => ({ temperatureKelvin: 298.15 + (index % 2 === 0 ? kelvin : -kelvin) })),
    );
    return checks.find((check) => check.code === "temperature-spread");
  };
  // E_a·s/(R·T²): 80 000 × 0.5/(8.314 × 298.15²) is 5.4 %; two values ± 0.5 K six times spread by 0.55 K.
  expect(await spread(0.5)).toMatchObject({ severity: "weakens", message: expect.stringContaining("5.9 %") });
  expect(await spread(2)).toMatchObject({ severity: "blocks" });
  expect(await spread(0.05)).toMatchObject({ severity: "holds" });
});

test("the activation energy of the set-up takes the place of the assumed one", async () => {
  const spread = async (value: number) => {
    const conditions = {
      ...exampleSheet().conditions,
      activationEnergy: { value, standardUncertainty: 1000 },
    };
    const checks = await checksOf(
      sheetWith((index) => ({ temperatureKelvin: 298.15 + (index % 2 === 0 ? 0.5 : -0.5) }), { conditions }),
    );
    return checks.find((check) => check.code === "temperature-spread")?.message;
  };
  // 40 000 × 0.548/(8.314 × 298.15²) is 3.0 %.
  expect(await spread(40_000)).toContain("At 40 kJ mol^-1 that scatters *k* by 3.0 %");
  expect(await spread(80_000)).toContain("At 80 kJ mol^-1 that");
});

test("a calibration without uncertainty is a note, a missing temperature weakens", async () => {
  const exact = await checksOf(
    sheetWith(() => ({}), {
      signal: {
        kind: "calibrated",
        quantity: "absorbance",
        unit: "",
        perMolar: { value: 18_000, standardUncertainty: 0 },
        blank: null,
        source: "typed",
      },
    }),
  );
  expect(exact.find((check) => check.code === "exact-calibration")?.severity).toBe("note");
  const cold = await checksOf(
    sheetWith(() => ({}), { conditions: { ...exampleSheet().conditions, temperatureKelvin: null } }),
  );
  expect(cold.find((check) => check.code === "temperature-missing")?.severity).toBe("weakens");
});

test("two levels of a species weaken, and a run that lacks a species of the law carries nothing", async () => {
  const amount = (molar: number) => ({ molar, relativeUncertainty: 0.01 });
  const checks = await checksOf(
    sheetWith((index): Partial<SheetRun> => {
      if (index === 0) return { concentrations: {} };
      if (index !== 2 && index !== 5) return {};
      return {
        concentrations: { A: amount(5e-4), B: amount(2e-3) },
        enteredRate: { molarPerSecond: 12 * 5e-4 * 2e-3, standardError: null },
      };
    }),
  );
  expect(checks.find((check) => check.code === "few-levels")).toMatchObject({
    severity: "weakens",
    message: expect.stringContaining("The order in A rests on two levels over a factor of 10."),
  });
  expect(checks.find((check) => check.code === "species-absent")?.message).toContain(
    "R01: it holds no A and no B",
  );
});

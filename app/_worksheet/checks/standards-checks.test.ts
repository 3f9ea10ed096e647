import { afterAll, beforeAll, expect, test } from "vitest";
import type { Sheet, SheetStandard } from "@/db/sheet/sheet.schema";
import { type TemporaryDatabase, temporaryDatabase } from "@/db/testing/temporary-database";
import { writeTrace } from "@/db/trace/write-trace";
import { exampleRun, exampleSheet } from "@/tests/example-sheet";
import { analyseStudy } from "../analyse-study";
import { recalibrated } from "../standards/recalibrated";
import { stationRailView } from "../station-rail.view";

let temporary: TemporaryDatabase;
beforeAll(async () => {
  temporary = await temporaryDatabase();
});
afterAll(() => temporary.close());

/** Signal of 18 L mmol⁻¹ with 0.3 % of scatter in turn; `bend` takes part of it away in proportion to concentration, per mmol/L. */
function standards(bend: number): SheetStandard[] {
  return [10, 20, 30, 40, 50, 60, 70, 80].map((millimolar, position) => ({
    id: `s${position}`,
    label: `S${position + 1}`,
    position,
    concentration: { value: millimolar / 1000, standardUncertainty: 0 },
    signals: [1.003, 0.997, 1.001].map((scatter) => 18 * millimolar * (1 - bend * millimolar) * scatter),
    isBlank: false,
    setAside: null,
    remark: "",
  }));
}

/** One run whose signal starts at nothing and rises in 200 s to that of `last` mmol/L. */
async function sheetOf(bend: number, last: number, change: Partial<Sheet> = {}): Promise<Sheet> {
  const timeSeconds = Float64Array.from({ length: 101 }, (_, i) => 2 * i);
  const signal = timeSeconds.map((t, i) => 18 * last * (t / 200) + (i % 2 === 0 ? 0.2 : -0.2));
  const sha256 = await temporary.db.transaction().execute((trx) => writeTrace(trx, { timeSeconds, signal }));
  const trace = { sha256, points: signal.length, uploadId: null, column: "S" };
  const window = { fromSeconds: 0, toSeconds: 200 };
  const sheet = exampleSheet({
    standards: standards(bend),
    runs: [exampleRun(0, { A: 0.5, B: 5 }, { trace, window })],
    ...change,
  });
  if (sheet.signal?.kind !== "calibrated") return sheet;
  return recalibrated({ ...sheet, signal: { ...sheet.signal, source: "standards" } });
}

async function checksOf(sheet: Sheet) {
  const analysis = await analyseStudy(temporary.db, sheet);
  const rail = stationRailView(sheet, analysis, (station) => station).find(
    ({ name }) => name === "Standards",
  );
  return { checks: analysis.checks.filter(({ station }) => station === "standards"), rail };
}

const STRAIGHTNESS = /curvature-shown|straightness/;

test("a line that is straight where the runs use it weakens nothing", async () => {
  const { checks, rail } = await checksOf(await sheetOf(0, 6));
  expect(checks.filter(({ code }) => STRAIGHTNESS.test(code))).toEqual([]);
  expect(rail).toMatchObject({ state: "holds", yield: expect.stringMatching(/^ε·l .*, 8 standards$/) });
});

test("a line that bends blocks where more than a fifth of the readings lie on the bend, and weakens below", async () => {
  const many = await checksOf(await sheetOf(0.002, 75));
  expect(many.checks).toContainEqual(
    expect.objectContaining({
      code: "curvature-shown",
      severity: "blocks",
      message: expect.stringContaining("readings in the windows of the runs"),
    }),
  );
  expect(many.rail?.state).toBe("blocks");
  const few = await checksOf(await sheetOf(0.002, 5));
  expect(
    few.checks.filter(({ code, severity }) => code === "curvature-shown" && severity === "blocks"),
  ).toEqual([]);
});

test("standards that no signal follows are looked at on the rail and carry no check of the law", async () => {
  const followed = await sheetOf(0.002, 75);
  if (followed.signal?.kind !== "calibrated") throw new Error("it is calibrated");
  const { checks, rail } = await checksOf({ ...followed, signal: { ...followed.signal, source: "typed" } });
  expect(checks).toEqual([]);
  expect(rail?.state).not.toBe("holds");
});

test("a signal that follows standards which make no line says that the last factor stands", async () => {
  const { checks, rail } = await checksOf({ ...(await sheetOf(0, 6)), standards: [] });
  expect(checks).toMatchObject([{ code: "no-line", severity: "weakens" }]);
  expect(rail).toMatchObject({ state: "weakens", yield: "none" });
});

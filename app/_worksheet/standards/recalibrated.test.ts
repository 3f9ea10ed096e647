import { describe, expect, it } from "vitest";
import type { Sheet, SheetStandard } from "@/db/sheet/sheet.schema";
import { exampleSheet } from "@/tests/example-sheet";
import { blankOfStandards } from "./blank-of-standards";
import { calibratedStandards } from "./calibrated-standards";
import { recalibrated } from "./recalibrated";

const standard = (
  position: number,
  micromolar: number,
  signals: readonly number[],
  change: Partial<SheetStandard> = {},
): SheetStandard => ({
  id: `d${position}`,
  label: `S${position}`,
  position,
  concentration: { value: micromolar * 1e-6, standardUncertainty: 0 },
  signals: [...signals],
  isBlank: false,
  setAside: null,
  remark: "",
  ...change,
});

/** Fluorescein, 0 to 12 pg/mL (Miller and Miller, Statistics for Analytical Chemistry), its unit taken as µmol/L here. */
const FLUORESCEIN = [2.1, 5.0, 9.0, 12.6, 17.3, 21.0, 24.7].map((signal, i) => standard(i, 2 * i, [signal]));

function sheetOf(standards: SheetStandard[], change: Partial<Sheet> = {}): Sheet {
  const sheet = exampleSheet({ standards, ...change });
  return sheet.signal?.kind === "calibrated"
    ? { ...sheet, signal: { ...sheet.signal, source: "standards" } }
    : sheet;
}

describe("a sheet whose signal follows its standards", () => {
  it("takes slope and error of the published line, and the stock's error on top", () => {
    const { signal } = recalibrated(sheetOf(FLUORESCEIN));
    expect(signal).toMatchObject({ perMolar: { value: expect.closeTo(1.9304e6, -2) } });
    const plain = signal?.kind === "calibrated" ? signal.perMolar.standardUncertainty : 0;
    expect(plain).toBeCloseTo(0.0409e6, -2);
    const sheet = sheetOf(FLUORESCEIN);
    const withStock = recalibrated({ ...sheet, calibration: { ...sheet.calibration, stockRelative: 0.01 } });
    expect(withStock.signal).toMatchObject({
      perMolar: { standardUncertainty: expect.closeTo(Math.hypot(plain, 0.01 * 1.930357e6), -1) },
    });
  });

  it("changes nothing when applied again, and keeps its factor while there is no line", () => {
    const once = recalibrated(sheetOf(FLUORESCEIN));
    expect(recalibrated(once)).toEqual(once);
    const empty = sheetOf([]);
    expect(recalibrated(empty)).toBe(empty);
    expect(calibratedStandards(empty)).toMatchObject({
      status: "no-line",
      message: expect.stringContaining("no standards yet"),
    });
  });

  it("leaves a typed factor alone", () => {
    const typed = exampleSheet({ standards: FLUORESCEIN });
    expect(recalibrated(typed)).toBe(typed);
  });

  it("keeps blanks, standards set aside and those outside the range out of the line", () => {
    const setAside = { reason: "bends away", memberId: "m", at: "2026-03-12T09:00:00.000Z" };
    const standards = [
      standard(8, 0, [2.0, 2.2], { isBlank: true }),
      ...FLUORESCEIN,
      standard(9, 20, [30], { setAside }),
      standard(10, 40, [31]),
    ];
    const sheet = sheetOf(standards);
    const ranged = { ...sheet, calibration: { ...sheet.calibration, rangeMolar: { low: 0, high: 12e-6 } } };
    const line = calibratedStandards(ranged);
    expect(line.used.map(({ label }) => label)).toEqual(["S0", "S1", "S2", "S3", "S4", "S5", "S6"]);
    expect(recalibrated(ranged).signal).toMatchObject({
      perMolar: { value: expect.closeTo(1.9304e6, -2) },
    });
    expect(blankOfStandards(ranged)).toEqual({
      value: expect.closeTo(2.1, 12),
      standardUncertainty: expect.closeTo(0.1, 12),
    });
  });

  it("leaves the blank of the reaction mixture as it was typed", () => {
    const sheet = sheetOf([standard(8, 0, [2.0, 2.2], { isBlank: true }), ...FLUORESCEIN]);
    if (sheet.signal?.kind !== "calibrated") throw new Error("it is calibrated");
    const blank = { value: 0.5, standardUncertainty: 0.01 };
    expect(recalibrated({ ...sheet, signal: { ...sheet.signal, blank } }).signal).toMatchObject({ blank });
  });

  it("weighs by the signal when asked, and says which standard stands against it", () => {
    const sheet = sheetOf(FLUORESCEIN);
    const weighted = { ...sheet, calibration: { ...sheet.calibration, weighting: "proportional" as const } };
    expect(calibratedStandards(weighted)).toMatchObject({ status: "calibrated" });
    const zero = { ...weighted, standards: [standard(0, 0, [0]), ...FLUORESCEIN.slice(1)] };
    expect(calibratedStandards(zero)).toMatchObject({
      status: "no-line",
      message: expect.stringContaining("S0 reads 0"),
    });
  });
});

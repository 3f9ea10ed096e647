import { deflateSync } from "node:zlib";
import { expect, test } from "vitest";
import { canonicalJson, sha256Of } from "../canonical-json";
import { unpackSheet } from "../revision/packed-sheet";
import { exampleRun } from "../testing/make-study";
import { randomSheet } from "../testing/random-sheet";
import { NO_PREPARATION, UNSAID_CONDITIONS, UNSAID_RUN, UNSAID_SIGNAL } from "./unsaid";

/** A sheet as the first version kept it: without what the second added. */
function firstVersion(kept: object): Record<string, unknown> {
  const without = (of: unknown, added: object) =>
    Object.fromEntries(
      Object.entries(typeof of === "object" && of !== null ? of : {}).filter(([key]) => !(key in added)),
    );
  const sheet = without(kept, NO_PREPARATION);
  return {
    ...sheet,
    version: 1,
    conditions: without(sheet.conditions, UNSAID_CONDITIONS),
    signal: sheet.signal === null ? null : without(sheet.signal, UNSAID_SIGNAL),
    runs: Array.isArray(sheet.runs) ? sheet.runs.map((run) => without(run, UNSAID_RUN)) : [],
  };
}

test("a revision of the first version is read as one of today, and its hash stays that of its bytes", () => {
  for (let seed = 1; seed <= 20; seed++) {
    const json = canonicalJson(firstVersion(randomSheet(seed)));
    const { sheet, sheetHash } = unpackSheet(deflateSync(json));
    expect(sheetHash).toBe(sha256Of(json));
    expect(sheet).toMatchObject({ version: 2, stocks: [], standards: [], scans: [] });
    // Nothing that was said is lost, nothing is made up.
    expect(canonicalJson(firstVersion(sheet))).toBe(json);
    for (const run of sheet.runs) expect(run).toMatchObject(UNSAID_RUN);
  }
});

test("a sheet of today is read as it is", () => {
  const sheet = { ...randomSheet(3), runs: [exampleRun("R01", { spikes: [4, 9], deadTimeSeconds: 2 })] };
  expect(unpackSheet(deflateSync(canonicalJson(sheet))).sheet).toEqual(sheet);
});

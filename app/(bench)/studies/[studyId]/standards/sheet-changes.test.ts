import { afterAll, beforeAll, expect, test } from "vitest";
import { workedOut } from "@/app/_worksheet/worked-out";
import type { Sheet } from "@/db/sheet/sheet.schema";
import { type Apply, changeStudy } from "@/db/study/change-study";
import { saveSetUp } from "@/db/study/save-set-up";
import { readStudy } from "@/db/study/study.queries";
import { undoRevision } from "@/db/study/undo-revision";
import { makeGroup, type TestGroup } from "@/db/testing/make-group";
import { makeStudy } from "@/db/testing/make-study";
import { type TemporaryDatabase, temporaryDatabase } from "@/db/testing/temporary-database";
import { readSetUpForm } from "../../_set-up/read-set-up-form";
import { setUpFormOf } from "../../_set-up/set-up-form";
import { readSettings } from "./read-settings";
import { withAside, withFollowing, withLines, withSettings } from "./sheet-changes";

/** Fluorescein, 0 to 12 pg/mL (Miller and Miller, Statistics for Analytical Chemistry); its unit is taken as µmol/L here. */
const LINES = "S0 0 2.1\nS1 2 5.0\nS2 4 9.0\nS3 6 12.6\nS4 8 17.3\nS5 10 21.0\nS6 12 24.7";
const SLOPE = 1.930357e6;

let temporary: TemporaryDatabase;
let group: TestGroup;
beforeAll(async () => {
  temporary = await temporaryDatabase();
  group = await makeGroup(temporary.db);
});
afterAll(() => temporary.close());

let made = 0;
const newId = () => `standard-${++made}`;
const note = { verb: "changed", summary: "Changed." };

async function study() {
  const studyId = await makeStudy(temporary.db, group.analyst);
  const now = async () => {
    const read = await readStudy(temporary.db, group.analyst, studyId);
    if (read === undefined) throw new Error("the study is there");
    return read;
  };
  const change = async (apply: Apply) => {
    const target = { studyId, base: (await now()).revision };
    return changeStudy(temporary.db, group.analyst, target, note, apply, workedOut);
  };
  return { studyId, now, change };
}

const factorOf = ({ signal }: Sheet) => (signal?.kind === "calibrated" ? signal.perMolar.value : null);
const sourceOf = ({ signal }: Sheet) => (signal?.kind === "calibrated" ? signal.source : null);

test("the signal follows the line from the change on that says so, and undo brings all of it back", async () => {
  const { studyId, now, change } = await study();
  await change((sheet) => withLines(sheet, LINES, "umol/L", newId));
  expect(factorOf((await now()).sheet)).toBe(10_000);

  await change((sheet) => withFollowing(sheet, true));
  const followed = await now();
  expect(factorOf(followed.sheet)).toBeCloseTo(SLOPE, -1);

  // Without the highest standard: 1.928571 in the published unit (NumPy 2.4, polyfit).
  const last = followed.sheet.standards.at(-1)?.id ?? "";
  const at = "2026-03-12T09:00:00.000Z";
  await change((sheet) =>
    withAside(sheet, last, { reason: "bends away", memberId: group.analyst.memberId, at }),
  );
  const aside = await now();
  expect(factorOf(aside.sheet)).toBeCloseTo(1.928571e6, -1);

  await undoRevision(temporary.db, group.analyst, { studyId, revision: aside.revision }, workedOut);
  const back = await now();
  expect(factorOf(back.sheet)).toBe(factorOf(followed.sheet));
  expect(back.sheet.standards).toEqual(followed.sheet.standards);

  await change((sheet) => withLines(sheet, "", "umol/L", newId));
  const emptied = await now();
  expect(emptied.sheet.standards).toEqual([]);
  await undoRevision(temporary.db, group.analyst, { studyId, revision: emptied.revision }, workedOut);
  expect((await now()).sheet.standards).toEqual(followed.sheet.standards);
});

test("a set-up that is saved untouched leaves the signal with the standards; another factor parts them", async () => {
  const { studyId, now, change } = await study();
  await change((sheet) => withLines(sheet, LINES, "umol/L", newId));
  await change((sheet) => withFollowing(sheet, true));
  const save = async (perMolar: string | null) => {
    const { sheet, revision } = await now();
    const form = setUpFormOf(sheet);
    const typed = {
      ...form,
      solvent: "ethanol",
      signal: { ...form.signal, perMolar: perMolar ?? form.signal.perMolar },
    };
    const reading = readSetUpForm(typed, newId);
    if (reading.status === "faults") throw new Error(JSON.stringify(reading.faults));
    await saveSetUp(temporary.db, group.analyst, { studyId, base: revision }, reading.setUp, workedOut);
  };
  await save(null);
  expect((await now()).sheet.conditions.solvent).toBe("ethanol");
  expect(sourceOf((await now()).sheet)).toBe("standards");
  await save("18000 ± 100");
  expect(sourceOf((await now()).sheet)).toBe("typed");
  expect(factorOf((await now()).sheet)).toBe(18_000);
});

test("a line of another species, a signal that is none and a standard that is gone are refused", async () => {
  const { now } = await study();
  const { sheet } = await now();
  const boxes = { studyId: "s", base: 1, unit: "umol/L", intercept: "none", weighting: "none" } as const;
  const read = readSettings({ ...boxes, speciesId: "a", low: "", high: "8", stock: "0,35" });
  if (read.status === "faults") throw new Error(JSON.stringify(read.faults));
  const ofA = withSettings(sheet, "a", read.settings);
  expect(ofA.calibration).toEqual({
    speciesId: "a",
    intercept: "none",
    weighting: "none",
    stockRelative: expect.closeTo(0.0035, 12),
    rangeMolar: { low: 0, high: expect.closeTo(8e-6, 18) },
  });
  expect(withFollowing(ofA, true)).toMatchObject({ refused: expect.stringContaining("not of p") });
  expect(withFollowing({ ...sheet, signal: null }, true)).toHaveProperty("refused");
  expect(withAside(sheet, "gone", null)).toHaveProperty("refused");
});

test("boxes that cannot be meant are named", () => {
  const boxes = {
    studyId: "s",
    base: 1,
    unit: "umol/L",
    speciesId: "a",
    intercept: "fitted",
    weighting: "none",
  } as const;
  expect(readSettings({ ...boxes, low: "9", high: "3", stock: "140" })).toMatchObject({
    faults: [{ path: "high" }, { path: "stock" }],
  });
  expect(readSettings({ ...boxes, low: "-1", high: "x", stock: "" })).toMatchObject({
    faults: [{ path: "low" }, { path: "high" }],
  });
});

import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, test } from "vitest";
import { verifyChainOfGroup } from "../audit/chain-verdict";
import type { Actor } from "../member/actor";
import { listRevisions, readRevisionSheet } from "../revision/revision.queries";
import {
  addRuns,
  removeRuns,
  restoreRuns,
  setRunsAside,
  setRunWindow,
  setTimeZero,
  takeRunsBack,
} from "../run/run.commands";
import type { Sheet, SheetRun } from "../sheet/sheet.schema";
import { makeGroup, type TestGroup } from "../testing/make-group";
import { exampleRun, exampleSetUp, makeStudy } from "../testing/make-study";
import { type TemporaryDatabase, temporaryDatabase } from "../testing/temporary-database";
import { type ChangeResult, type ChangeTarget, changeStudy } from "./change-study";
import { createStudy } from "./create-study";
import { saveSetUp } from "./save-set-up";
import { setOrders } from "./set-orders";
import { listStudies, readStudy } from "./study.queries";
import { undoRevision } from "./undo-revision";

let temporary: TemporaryDatabase;
let group: TestGroup;
let other: TestGroup;
let studyId: string;
/** The revision with three runs, R01 to R03. */
let base: number;

beforeAll(async () => {
  temporary = await temporaryDatabase();
  group = await makeGroup(temporary.db);
  other = await makeGroup(temporary.db, "elsewhere.example");
});
afterAll(() => temporary.close());

beforeEach(async () => {
  studyId = await makeStudy(temporary.db, group.analyst);
  base = revisionOf(
    await addRuns(
      temporary.db,
      group.analyst,
      { studyId, base: 1 },
      ["R01", "R02", "R03"].map((label) => exampleRun(label)),
    ),
  );
});

function revisionOf(result: ChangeResult): number {
  if (result.status !== "changed") throw new Error(JSON.stringify(result));
  return result.revision;
}

// Whatever a test did: tables, snapshots and chain still say the same.
afterEach(async () => {
  expect(await verifyChainOfGroup(temporary.db, group.groupId)).toMatchObject({ status: "holds" });
});

async function present(): Promise<{ revision: number; sheet: Sheet }> {
  const study = await readStudy(temporary.db, group.reader, studyId);
  if (study === undefined) throw new Error("the study is there");
  return study;
}

const run = async (label: string) => (await present()).sheet.runs.find((one) => one.label === label);

const rename = (name: string) => (sheet: Sheet) => ({ ...sheet, study: { ...sheet.study, name } });
const editRun = (
  db: TemporaryDatabase["db"],
  actor: Actor,
  target: ChangeTarget,
  runId: string,
  edit: Partial<SheetRun>,
) =>
  changeStudy(db, actor, target, { verb: "run edited", summary: `${runId} edited.` }, (sheet) => ({
    ...sheet,
    runs: sheet.runs.map((one) => (one.id === runId ? { ...one, ...edit } : one)),
  }));

const note = { verb: "renamed", summary: "Renamed." };

describe("who may change a study", () => {
  test("an outsider finds nothing, whatever they ask", async () => {
    const { db } = temporary;
    const target = { studyId, base };
    expect(await readStudy(db, other.lead, studyId)).toBeUndefined();
    expect(await listRevisions(db, other.lead, studyId)).toEqual([]);
    expect(await listStudies(db, other.lead)).toEqual([]);
    expect(await changeStudy(db, other.lead, target, note, rename("x"))).toEqual({ status: "not-found" });
    expect(await undoRevision(db, other.lead, { studyId, revision: base })).toEqual({ status: "not-found" });
    expect((await present()).revision).toBe(base);
  });

  test("a reader reads and changes nothing", async () => {
    const { db } = temporary;
    const target = { studyId, base };
    expect(await changeStudy(db, group.reader, target, note, rename("x"))).toEqual({ status: "forbidden" });
    expect(await undoRevision(db, group.reader, { studyId, revision: base })).toEqual({
      status: "forbidden",
    });
    expect(await createStudy(db, group.reader, exampleSetUp())).toEqual({ status: "forbidden" });
    expect((await present()).revision).toBe(base);
  });

  test("an outsider with a reader's role is told no more than their lead", async () => {
    const result = await changeStudy(temporary.db, other.reader, { studyId, base }, note, rename("x"));
    expect(result).toEqual({ status: "not-found" });
  });
});

describe("one change", () => {
  test("is a revision with its whole sheet and its entry in the history", async () => {
    const result = await changeStudy(
      temporary.db,
      group.lead,
      { studyId, base },
      note,
      rename("Another name"),
    );
    expect(result).toEqual({ status: "changed", revision: base + 1, summary: "Renamed." });
    const { sheet, revision } = await present();
    expect(revision).toBe(base + 1);
    expect(await readRevisionSheet(temporary.db, studyId, revision)).toEqual(sheet);
    const [latest] = await listRevisions(temporary.db, group.reader, studyId);
    expect(latest).toMatchObject({
      number: base + 1,
      verb: "renamed",
      memberId: group.lead.memberId,
      initials: "LD",
    });
  });

  test("that changes nothing makes no revision", async () => {
    const result = await changeStudy(temporary.db, group.lead, { studyId, base }, note, (sheet) =>
      structuredClone(sheet),
    );
    expect(result).toEqual({ status: "unchanged" });
    expect((await present()).revision).toBe(base);
  });

  test("that is refused by its own wish or by the sheet's rules leaves everything as it was", async () => {
    const before = await present();
    const wish = await changeStudy(temporary.db, group.lead, { studyId, base }, note, () => ({
      refused: "No.",
    }));
    expect(wish).toEqual({ status: "refused", message: "No." });
    const label = await editRun(temporary.db, group.lead, { studyId, base }, "run-R02", { label: "R01" });
    expect(label).toMatchObject({ status: "refused" });
    expect(await present()).toEqual(before);
  });

  test("to a number that no measurement gives is refused by name, in whatever place of the sheet", async () => {
    const target = { studyId, base };
    const concentration = await editRun(temporary.db, group.lead, target, "run-R02", {
      concentrations: { a: { molar: 1e308, relativeUncertainty: 0 } },
    });
    expect(concentration).toMatchObject({ status: "refused", message: expect.stringContaining("R02") });
    const rate = await editRun(temporary.db, group.lead, target, "run-R02", {
      enteredRate: { molarPerSecond: 1e-300, standardError: null },
    });
    expect(rate).toMatchObject({ status: "refused", message: expect.stringContaining("1e-300") });
    const start = await setTimeZero(temporary.db, group.lead, target, ["run-R02"], -1e21);
    expect(start).toMatchObject({ status: "refused", message: expect.stringContaining("time zero") });
  });

  test("that fails in the middle leaves nothing", async () => {
    const before = await present();
    const failing = changeStudy(
      temporary.db,
      group.lead,
      { studyId, base },
      {
        verb: "x",
        summary: () => {
          throw new Error("broken");
        },
      },
      rename("x"),
    );
    await expect(failing).rejects.toThrow("broken");
    expect(await present()).toEqual(before);
  });

  test("cannot make a run vanish from the sheet", async () => {
    const vanishing = changeStudy(temporary.db, group.lead, { studyId, base }, note, (sheet) => ({
      ...sheet,
      runs: [],
    }));
    await expect(vanishing).rejects.toThrow("bin");
  });

  test("marks the runs that it touched, and only those", async () => {
    const next = revisionOf(
      await setTimeZero(temporary.db, group.analyst, { studyId, base }, ["run-R02"], 0.8),
    );
    expect((await present()).sheet.runs.map((one) => one.changedIn)).toEqual([base, next, base]);
  });
});

describe("two people at once", () => {
  test("different rows from the same revision both stand", async () => {
    const { db } = temporary;
    revisionOf(await setRunsAside(db, group.lead, { studyId, base }, ["run-R01"], "bubble"));
    const late = await setRunWindow(db, group.analyst, { studyId, base }, "run-R02", {
      fromSeconds: 1,
      toSeconds: 9,
    });
    expect(late).toMatchObject({ status: "changed", revision: base + 2 });
    expect((await run("R01"))?.setAside?.reason).toBe("bubble");
    expect((await run("R02"))?.window).toEqual({ fromSeconds: 1, toSeconds: 9 });
  });

  test("the same run is a conflict that names it and who changed it, and nothing of the second is kept", async () => {
    const { db } = temporary;
    revisionOf(await editRun(db, group.lead, { studyId, base }, "run-R02", { remark: "mine" }));
    revisionOf(
      await editRun(db, group.analyst, { studyId, base: base + 1 }, "run-R01", { remark: "elsewhere" }),
    );
    const late = await editRun(db, group.analyst, { studyId, base }, "run-R02", { remark: "yours" });
    expect(late).toEqual({
      status: "conflict",
      message:
        "Since you opened this page, R02 was changed by LD. Your change was not made; look at the new state and repeat it.",
    });
    expect((await run("R02"))?.remark).toBe("mine");
  });

  test("the same change twice is no conflict", async () => {
    const { db } = temporary;
    revisionOf(await editRun(db, group.lead, { studyId, base }, "run-R02", { remark: "same" }));
    expect(await editRun(db, group.analyst, { studyId, base }, "run-R02", { remark: "same" })).toEqual({
      status: "unchanged",
    });
  });

  test("a row that both changed to the same keeps the first one's revision beside what else the second changed", async () => {
    const { db } = temporary;
    const first = revisionOf(await setTimeZero(db, group.lead, { studyId, base }, ["run-R01"], 0.8));
    const second = revisionOf(
      await setTimeZero(db, group.analyst, { studyId, base }, ["run-R01", "run-R02"], 0.8),
    );
    expect((await present()).sheet.runs.map((one) => one.changedIn)).toEqual([first, second, base]);
  });

  test("a form that saves everything leaves alone what it did not change", async () => {
    const { db } = temporary;
    const { species, followedSpeciesId, conditions, signal, study } = (await present()).sheet;
    const form = { species, followedSpeciesId, conditions, signal, study };
    revisionOf(await changeStudy(db, group.lead, { studyId, base }, note, rename("New name")));
    const late = await saveSetUp(
      db,
      group.analyst,
      { studyId, base },
      { ...form, conditions: { ...conditions, solvent: "ethanol" } },
    );
    expect(late).toMatchObject({ status: "changed", summary: "Changed the solvent." });
    const { sheet } = await present();
    expect(sheet.study.name).toBe("New name");
    expect(sheet.conditions.solvent).toBe("ethanol");
  });

  test("what follows from the rest is worked out on the sheet as it will stand, and clashes with nobody", async () => {
    // Each run's remark follows from the study's name, as concentrations follow from stocks.
    const derive = (sheet: Sheet): Sheet => ({
      ...sheet,
      runs: sheet.runs.map((one) => ({ ...one, remark: sheet.study.name })),
    });
    const { db } = temporary;
    revisionOf(await editRun(db, group.lead, { studyId, base }, "run-R02", { block: "day 2" }));
    revisionOf(await addRuns(db, group.lead, { studyId, base: base + 1 }, [exampleRun("R04")]));
    const revision = revisionOf(
      await changeStudy(db, group.analyst, { studyId, base }, note, rename("Renamed"), derive),
    );
    const { sheet } = await present();
    expect(sheet.runs.map(({ label, remark, block }) => [label, remark, block])).toEqual([
      ["R01", "Renamed", null],
      ["R02", "Renamed", "day 2"],
      ["R03", "Renamed", null],
      ["R04", "Renamed", null],
    ]);
    expect(sheet.runs.every(({ changedIn }) => changedIn === revision)).toBe(true);
  });

  test("runs added by both stand side by side, and a label taken meanwhile is refused", async () => {
    const { db } = temporary;
    revisionOf(await addRuns(db, group.lead, { studyId, base }, [exampleRun("R04")]));
    revisionOf(await addRuns(db, group.analyst, { studyId, base }, [exampleRun("R05")]));
    const taken = await addRuns(db, group.analyst, { studyId, base }, [exampleRun("R04", { id: "other" })]);
    expect(taken).toMatchObject({ status: "refused" });
    expect((await present()).sheet.runs.map((one) => one.label).sort()).toEqual([
      "R01",
      "R02",
      "R03",
      "R04",
      "R05",
    ]);
  });

  test("twenty changes sent together are twenty revisions", async () => {
    const { db } = temporary;
    const labels = Array.from({ length: 20 }, (_, index) => `N${index}`);
    const results = await Promise.all(
      labels.map((label) => addRuns(db, group.analyst, { studyId, base }, [exampleRun(label)])),
    );
    expect(results.map(revisionOf).sort((a, b) => a - b)).toEqual(labels.map((_, index) => base + 1 + index));
    expect((await present()).sheet.runs).toHaveLength(23);
  });

  test("a revision that never was is a conflict", async () => {
    const result = await changeStudy(temporary.db, group.lead, { studyId, base: 99 }, note, rename("x"));
    expect(result).toMatchObject({ status: "conflict" });
  });
});

describe("runs", () => {
  test("are set aside with a reason and taken back", async () => {
    const { db } = temporary;
    const target = (revision: number) => ({ studyId, base: revision });
    expect(await setRunsAside(db, group.analyst, target(base), ["run-R01"], "  ")).toMatchObject({
      status: "refused",
    });
    const aside = await setRunsAside(db, group.analyst, target(base), ["run-R01", "run-R03"], " warm cell ");
    expect(aside).toMatchObject({ summary: "R01 and R03 set aside: warm cell." });
    expect((await run("R03"))?.setAside).toMatchObject({
      reason: "warm cell",
      memberId: group.analyst.memberId,
    });
    revisionOf(await takeRunsBack(db, group.analyst, target(base + 1), ["run-R01"]));
    expect((await run("R01"))?.setAside).toBeNull();
    expect((await run("R03"))?.setAside).not.toBeNull();
  });

  test("go to the bin and come back, unless their label was given away", async () => {
    const { db } = temporary;
    const removed = revisionOf(await removeRuns(db, group.analyst, { studyId, base }, ["run-R02"]));
    expect((await run("R02"))?.removedIn).toBe(removed);
    const restored = revisionOf(
      await restoreRuns(db, group.analyst, { studyId, base: removed }, ["run-R02"]),
    );
    expect((await run("R02"))?.removedIn).toBeNull();
    const again = revisionOf(await removeRuns(db, group.analyst, { studyId, base: restored }, ["run-R02"]));
    const taken = revisionOf(
      await addRuns(db, group.analyst, { studyId, base: again }, [exampleRun("R02", { id: "new" })]),
    );
    expect(await restoreRuns(db, group.analyst, { studyId, base: taken }, ["run-R02"])).toMatchObject({
      status: "refused",
    });
  });

  test("that are unknown refuse the whole wish", async () => {
    const result = await removeRuns(temporary.db, group.analyst, { studyId, base }, ["run-R01", "nowhere"]);
    expect(result).toMatchObject({ status: "refused" });
    expect((await run("R01"))?.removedIn).toBeNull();
  });

  test("are at most 2 000 in a study, said in a sentence", async () => {
    const many = Array.from({ length: 1998 }, (_, index) => exampleRun(`M${index}`));
    const result = await addRuns(temporary.db, group.analyst, { studyId, base }, many);
    expect(result).toMatchObject({ status: "refused" });
    if (result.status === "refused") expect(result.message).toContain("2\u202f000");
    revisionOf(await addRuns(temporary.db, group.analyst, { studyId, base }, many.slice(1)));
    expect((await present()).sheet.runs).toHaveLength(2000);
  });
});

test("orders are held and freed, for species of the law only", async () => {
  const { db } = temporary;
  const held = await setOrders(db, group.analyst, { studyId, base }, { a: 1, c: null });
  expect(held).toMatchObject({ status: "changed", summary: "Order in A held at 1, order in C free." });
  expect((await present()).sheet.orders).toEqual({ a: 1, c: null });
  expect(await setOrders(db, group.analyst, { studyId, base: base + 1 }, { p: 1 })).toMatchObject({
    status: "refused",
  });
});

describe("undo", () => {
  test("restores what the revision touched by a new revision, and undoing that is the redo", async () => {
    const { db } = temporary;
    const before = await run("R01");
    const aside = revisionOf(await setRunsAside(db, group.analyst, { studyId, base }, ["run-R01"], "bubble"));
    const setAside = (await run("R01"))?.setAside;
    const undone = await undoRevision(db, group.lead, { studyId, revision: aside });
    expect(undone).toMatchObject({ status: "changed", summary: "Undid: R01 set aside: bubble." });
    expect(await run("R01")).toEqual({ ...before, changedIn: aside + 1 });
    const redone = await undoRevision(db, group.lead, { studyId, revision: revisionOf(undone) });
    expect(redone).toMatchObject({ status: "changed", summary: "Redid: R01 set aside: bubble." });
    expect((await run("R01"))?.setAside).toEqual(setAside);
    expect(await listRevisions(db, group.reader, studyId)).toHaveLength(base + 3);
  });

  test("leaves later changes of other rows alone", async () => {
    const { db } = temporary;
    const aside = revisionOf(await setRunsAside(db, group.analyst, { studyId, base }, ["run-R01"], "bubble"));
    revisionOf(await editRun(db, group.analyst, { studyId, base: aside }, "run-R02", { remark: "later" }));
    revisionOf(await undoRevision(db, group.analyst, { studyId, revision: aside }));
    expect((await run("R01"))?.setAside).toBeNull();
    expect((await run("R02"))?.remark).toBe("later");
  });

  test("is refused by name when the row changed since", async () => {
    const { db } = temporary;
    const aside = revisionOf(await setRunsAside(db, group.analyst, { studyId, base }, ["run-R01"], "bubble"));
    revisionOf(await editRun(db, group.analyst, { studyId, base: aside }, "run-R01", { remark: "later" }));
    expect(await undoRevision(db, group.analyst, { studyId, revision: aside })).toEqual({
      status: "refused",
      message: `Revision ${aside} cannot be undone by itself, since R01 changed after it. Undo the later change first, or edit by hand.`,
    });
    expect((await run("R01"))?.remark).toBe("later");
  });

  test("puts runs that were added into the bin, and the redo brings them back", async () => {
    const { db } = temporary;
    const undone = revisionOf(await undoRevision(db, group.analyst, { studyId, revision: base }));
    expect((await present()).sheet.runs.map((one) => one.removedIn)).toEqual([undone, undone, undone]);
    revisionOf(await undoRevision(db, group.analyst, { studyId, revision: undone }));
    expect((await present()).sheet.runs.map((one) => one.removedIn)).toEqual([null, null, null]);
  });

  test("brings back a species with its order", async () => {
    const { db } = temporary;
    const held = revisionOf(await setOrders(db, group.analyst, { studyId, base }, { c: 0.5 }));
    const setUp = exampleSetUp();
    const without = { ...setUp, species: setUp.species.filter((one) => one.id !== "c") };
    const saved = revisionOf(await saveSetUp(db, group.analyst, { studyId, base: held }, without));
    expect((await present()).sheet.orders).toEqual({});
    revisionOf(await undoRevision(db, group.analyst, { studyId, revision: saved }));
    const { sheet } = await present();
    expect(sheet.orders).toEqual({ c: 0.5 });
    expect(sheet.species.map((one) => one.id)).toEqual(["a", "c", "p"]);
  });

  test("of the first revision is refused, of none not found", async () => {
    const { db } = temporary;
    expect(await undoRevision(db, group.analyst, { studyId, revision: 1 })).toMatchObject({
      status: "refused",
    });
    expect(await undoRevision(db, group.analyst, { studyId, revision: 99 })).toEqual({ status: "not-found" });
  });
});

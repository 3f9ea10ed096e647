import { afterAll, beforeAll, expect, test } from "vitest";
import { canonicalJson } from "../canonical-json";
import { packSheet, unpackSheet } from "../revision/packed-sheet";
import { makeGroup, type TestGroup } from "../testing/make-group";
import { exampleRun, makeStudy } from "../testing/make-study";
import { randomSheet } from "../testing/random-sheet";
import { type TemporaryDatabase, temporaryDatabase } from "../testing/temporary-database";
import { readSheet } from "./read-sheet";
import type { Sheet } from "./sheet.schema";
import { sheetProblem } from "./sheet-problem";
import { rowsOf, sheetOf, touchedRows } from "./sheet-rows";
import { writeSheet } from "./write-sheet";

let temporary: TemporaryDatabase;
let group: TestGroup;

beforeAll(async () => {
  temporary = await temporaryDatabase();
  group = await makeGroup(temporary.db);
});
afterAll(() => temporary.close());

const at = "2026-03-14T10:42:07.000Z";
const write = (studyId: string, revision: number, sheet: Sheet, previous?: Sheet) =>
  temporary.db.transaction().execute((trx) => writeSheet(trx, { studyId, revision, at }, sheet, previous));

test("random sheets come back from the tables equal to the last bit", async () => {
  let rows = 0;
  for (let seed = 1; seed <= 60; seed++) {
    const studyId = await makeStudy(temporary.db, group.lead);
    const before = await readSheet(temporary.db, studyId);
    const sheet = randomSheet(seed);
    await write(studyId, 2, sheet, before);
    expect(canonicalJson(await readSheet(temporary.db, studyId))).toBe(canonicalJson(sheet));
    rows += rowsOf(sheet).size;
  }
  // The draws must reach into every section, else the comparison says little.
  expect(rows).toBeGreaterThan(1000);
});

test("one random sheet replaces another, and writing only what differs leaves the same tables", async () => {
  const studyId = await makeStudy(temporary.db, group.lead);
  let previous = await readSheet(temporary.db, studyId);
  for (let seed = 101; seed <= 130; seed++) {
    const sheet = randomSheet(seed);
    await write(studyId, seed, sheet, previous);
    expect(canonicalJson(await readSheet(temporary.db, studyId))).toBe(canonicalJson(sheet));
    previous = sheet;
  }
});

test("a species that leaves the sheet keeps its row, marked with the revision that took it out", async () => {
  const studyId = await makeStudy(temporary.db, group.lead);
  const sheet = await readSheet(temporary.db, studyId);
  if (sheet === undefined) throw new Error("the study is there");
  await write(studyId, 2, { ...sheet, species: sheet.species.filter(({ id }) => id !== "c") }, sheet);
  const row = await temporary.db
    .selectFrom("species")
    .select(["symbol", "removed_in"])
    .where("study_id", "=", studyId)
    .where("id", "=", "c")
    .executeTakeFirst();
  expect(row).toEqual({ symbol: "C", removed_in: 2 });
});

test("a packed sheet unpacks to the same sheet and the same hash", () => {
  for (let seed = 1; seed <= 20; seed++) {
    const sheet = randomSheet(seed);
    const { bytes, sheetHash } = packSheet(sheet);
    const back = unpackSheet(bytes);
    expect(back.sheetHash).toBe(sheetHash);
    expect(canonicalJson(back.sheet)).toBe(canonicalJson(sheet));
  }
});

test("rows make the sheet they came from, and differ exactly where sheets differ", () => {
  for (let seed = 1; seed <= 20; seed++) {
    const sheet = randomSheet(seed);
    expect(sheetOf(sheet.version, rowsOf(sheet))).toEqual(sheet);
    expect(touchedRows(rowsOf(sheet), rowsOf(structuredClone(sheet))).size).toBe(0);
    const renamed = { ...sheet, study: { ...sheet.study, name: `${sheet.study.name}x` } };
    expect([...touchedRows(rowsOf(sheet), rowsOf(renamed))]).toEqual(["study/name"]);
  }
});

test("the order of keys does not change the hash, the order of values does", () => {
  expect(canonicalJson({ b: 1, a: { d: [2, 1], c: null } })).toBe('{"a":{"c":null,"d":[2,1]},"b":1}');
});

test("two runs may share a label only when one of them is in the bin", async () => {
  const studyId = await makeStudy(temporary.db, group.lead);
  const sheet = await readSheet(temporary.db, studyId);
  if (sheet === undefined) throw new Error("the study is there");
  const one = exampleRun("R01");
  const other = exampleRun("R01", { id: "another" });
  expect(sheetProblem({ ...sheet, runs: [one, other] })).toContain("R01");
  expect(sheetProblem({ ...sheet, runs: [one, { ...other, removedIn: 3 }] })).toBeUndefined();
});

test("what cannot be kept is said in a sentence that names the place", async () => {
  const studyId = await makeStudy(temporary.db, group.lead);
  const sheet = await readSheet(temporary.db, studyId);
  if (sheet === undefined) throw new Error("the study is there");
  const [a, ...others] = sheet.species;
  if (a === undefined) throw new Error("the example has species");
  const window = { fromSeconds: 3, toSeconds: 3 };
  const trace = { sha256: "0".repeat(64), points: 2_500_001, uploadId: null, column: "" };
  expect(sheetProblem({ ...sheet, species: [a, { ...a, id: "a2" }, ...others] })).toContain("symbol A");
  expect(sheetProblem({ ...sheet, species: [{ ...a, symbol: "" }, ...others] })).toContain("needs a symbol");
  expect(sheetProblem({ ...sheet, followedSpeciesId: "gone" })).toContain("followed");
  expect(sheetProblem({ ...sheet, followedSpeciesId: "c" })).toContain("stoichiometric number 0");
  expect(sheetProblem({ ...sheet, runs: [exampleRun("R07", { window })] })).toContain("R07");
  const long = [exampleRun("R01", { trace }), exampleRun("R02", { trace })];
  expect(sheetProblem({ ...sheet, runs: long })).toContain("5\u202f000\u202f002");
});

import { afterAll, beforeAll, expect, test } from "vitest";
import { addRuns } from "../run/run.commands";
import { makeGroup, type TestGroup } from "../testing/make-group";
import { makeStudy } from "../testing/make-study";
import { type TemporaryDatabase, temporaryDatabase } from "../testing/temporary-database";
import { lastEntries } from "./last-entries";

let temporary: TemporaryDatabase;
let group: TestGroup;
let studyId: string;

beforeAll(async () => {
  temporary = await temporaryDatabase();
  group = await makeGroup(temporary.db);
  studyId = await makeStudy(temporary.db, group.lead);
  const runs = [{ id: "run-1", label: "R01", concentrations: {} }];
  // The two entries must not fall into one millisecond, or their order would be chance.
  await new Promise((resolve) => setTimeout(resolve, 5));
  const added = await addRuns(temporary.db, group.analyst, { studyId, base: 1 }, runs);
  expect(added.status).toBe("changed");
});

afterAll(() => temporary.close());

test("names who changed a study, latest first, each once", async () => {
  const entry = (await lastEntries(temporary.db, group.reader)).get(studyId);
  expect(entry?.by).toEqual([group.analyst.initials, group.lead.initials]);
});

test("tells an outsider nothing", async () => {
  const other = await makeGroup(temporary.db, "other.example");
  expect((await lastEntries(temporary.db, other.lead)).size).toBe(0);
});

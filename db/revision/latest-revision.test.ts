import { afterAll, beforeAll, expect, test } from "vitest";
import { addRuns } from "../run/run.commands";
import { makeGroup } from "../testing/make-group";
import { exampleRun, makeStudy } from "../testing/make-study";
import { type TemporaryDatabase, temporaryDatabase } from "../testing/temporary-database";
import { readLatestRevision } from "./latest-revision";

let temporary: TemporaryDatabase;

beforeAll(async () => {
  temporary = await temporaryDatabase();
});

afterAll(() => temporary.close());

test("members see the newest revision and whose it is, an outsider sees nothing", async () => {
  const { db } = temporary;
  const { analyst, reader } = await makeGroup(db);
  const { lead: outsider } = await makeGroup(db, "elsewhere.example");
  const studyId = await makeStudy(db, analyst);
  const base = (await readLatestRevision(db, analyst, studyId))?.revision ?? 0;
  await addRuns(db, analyst, { studyId, base }, [exampleRun("R01")]);
  expect(await readLatestRevision(db, reader, studyId)).toEqual({
    revision: base + 1,
    summary: "R01 added.",
    mine: false,
    name: analyst.name,
  });
  expect((await readLatestRevision(db, analyst, studyId))?.mine).toBe(true);
  expect(await readLatestRevision(db, outsider, studyId)).toBeUndefined();
});

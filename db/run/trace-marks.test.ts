import { afterAll, beforeAll, beforeEach, expect, test } from "vitest";
import type { SheetRun } from "../sheet/sheet.schema";
import type { ChangeResult } from "../study/change-study";
import { readStudy } from "../study/study.queries";
import { undoRevision } from "../study/undo-revision";
import { makeGroup, type TestGroup } from "../testing/make-group";
import { makeStudy } from "../testing/make-study";
import { type TemporaryDatabase, temporaryDatabase } from "../testing/temporary-database";
import { addTraces } from "./add-traces";
import { setSpikes, setTraceMarks } from "./trace-marks.commands";

let temporary: TemporaryDatabase;
let group: TestGroup;
let studyId: string;
let base: number;

beforeAll(async () => {
  temporary = await temporaryDatabase();
  group = await makeGroup(temporary.db);
});
afterAll(() => temporary.close());

beforeEach(async () => {
  studyId = await makeStudy(temporary.db, group.analyst);
  const timeSeconds = Float64Array.from({ length: 50 }, (_, index) => index);
  const trace = { timeSeconds, signal: timeSeconds.map((time) => 0.01 * time) };
  const added = await addTraces(
    temporary.db,
    group.analyst,
    { studyId, base: 1 },
    { uploadId: null, reading: "pasted", runs: [{ label: "R01", concentrations: {}, trace, column: "A" }] },
  );
  base = revisionOf(added);
});

function revisionOf(result: ChangeResult): number {
  if (result.status !== "changed") throw new Error(JSON.stringify(result));
  return result.revision;
}

async function run(): Promise<SheetRun> {
  const study = await readStudy(temporary.db, group.reader, studyId);
  const only = study?.sheet.runs[0];
  if (only === undefined) throw new Error("there is one run");
  return only;
}

test("marks are part of the sheet, told in words, and undone as one revision; readings stay", async () => {
  const before = await run();
  const endSignal = { value: 0.9, standardUncertainty: 0.01 };
  const changed = await setTraceMarks(temporary.db, group.analyst, { studyId, base }, before.id, {
    deadTimeSeconds: 2.5,
    trim: { fromSeconds: 0, toSeconds: 40 },
    endSignal,
  });
  expect(changed).toMatchObject({
    summary: "R01 dead time 2.5 s, its trace counts from 0 s to 40 s, signal at the end 0.9.",
  });
  expect(await run()).toMatchObject({ deadTimeSeconds: 2.5, endSignal, trace: before.trace });
  await undoRevision(temporary.db, group.analyst, { studyId, revision: revisionOf(changed) });
  expect(await run()).toMatchObject({ deadTimeSeconds: 0, trim: null, endSignal: null, trace: before.trace });
});

test("what is not given stays", async () => {
  const { id } = await run();
  const first = revisionOf(
    await setTraceMarks(temporary.db, group.analyst, { studyId, base }, id, { deadTimeSeconds: 3 }),
  );
  await setTraceMarks(temporary.db, group.analyst, { studyId, base: first }, id, {
    trim: { fromSeconds: 1, toSeconds: 9 },
  });
  expect(await run()).toMatchObject({ deadTimeSeconds: 3, trim: { fromSeconds: 1, toSeconds: 9 } });
});

test("spikes are kept once each, in order, and only where there is a reading", async () => {
  const { id } = await run();
  const marked = await setSpikes(temporary.db, group.analyst, { studyId, base }, id, [9, 4, 9]);
  expect(marked).toMatchObject({ summary: "R01 has 2 readings marked as spikes." });
  expect((await run()).spikes).toEqual([4, 9]);
  const beyond = await setSpikes(
    temporary.db,
    group.analyst,
    { studyId, base: revisionOf(marked) },
    id,
    [50],
  );
  expect(beyond).toMatchObject({ status: "refused", message: expect.stringContaining("not in the trace") });
  expect(
    await setSpikes(temporary.db, group.reader, { studyId, base: revisionOf(marked) }, id, []),
  ).toMatchObject({ status: "forbidden" });
  await setSpikes(temporary.db, group.analyst, { studyId, base: revisionOf(marked) }, id, []);
  expect((await run()).spikes).toEqual([]);
});

test("a part that ends before it starts is refused by the run's name", async () => {
  const { id } = await run();
  const refused = await setTraceMarks(temporary.db, group.analyst, { studyId, base }, id, {
    trim: { fromSeconds: 9, toSeconds: 1 },
  });
  expect(refused).toMatchObject({ status: "refused", message: expect.stringContaining("R01") });
});

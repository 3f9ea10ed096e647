import { execFileSync } from "node:child_process";
import { createHash } from "node:crypto";
import { readFileSync } from "node:fs";
import path from "node:path";
import { afterAll, beforeAll, expect, test } from "vitest";
import type { Actor } from "@/db/member/actor";
import { addTraces } from "@/db/run/add-traces";
import { addRuns } from "@/db/run/run.commands";
import { readStudy } from "@/db/study/study.queries";
import { makeGroup, type TestGroup } from "@/db/testing/make-group";
import { makeStudy } from "@/db/testing/make-study";
import { type TemporaryDatabase, temporaryDatabase } from "@/db/testing/temporary-database";
import { readTrace } from "@/db/trace/read-trace";
import { receiveUpload } from "@/db/upload/receive-upload";
import { openUpload } from "@/db/upload/upload.queries";
import { previewUpload, readUpload } from "./read-upload";
import { storedFrom } from "./study-context";
import { readingInWords, tracedRuns } from "./traced-runs";

/** From received bytes to runs of a study, on a real SQLite file and with the real pool. */

let temporary: TemporaryDatabase;
let group: TestGroup;

beforeAll(async () => {
  // The pool loads its worker from dist/, as in production.
  execFileSync(process.execPath, [path.resolve(import.meta.dirname, "../_workers/build.mjs")]);
  temporary = await temporaryDatabase();
  group = await makeGroup(temporary.db);
});
afterAll(() => temporary.close());

async function* pieces(bytes: Uint8Array): AsyncGenerator<Uint8Array> {
  for (let start = 0; start < bytes.length; start += 65_536) yield bytes.subarray(start, start + 65_536);
}

async function received(studyId: string, bytes: Uint8Array, actor: Actor = group.analyst) {
  const file = { studyId, fileName: "runs.csv", declaredBytes: bytes.length };
  const result = await receiveUpload(temporary.db, actor, file, pieces(bytes));
  if (result.status !== "received") throw new Error(result.status);
  const upload = await openUpload(temporary.db, actor, { studyId, uploadId: result.uploadId });
  if (upload === undefined) throw new Error("the file waits");
  return upload;
}

async function sheetOf(studyId: string) {
  const study = await readStudy(temporary.db, group.reader, studyId);
  if (study === undefined) throw new Error("the study is there");
  return study;
}

test("a file becomes runs with its readings, its recipe and its raw bytes; a planned run is filled in place", async () => {
  const { db } = temporary;
  const studyId = await makeStudy(db, group.lead);
  await addRuns(db, group.analyst, { studyId, base: 1 }, [
    { id: "planned", label: "R01", concentrations: { c: { molar: 0.02, relativeUncertainty: 0.01 } } },
  ]);
  const bytes = new TextEncoder().encode(
    "[A] / mmol/L;0,5;1,0\r\nt / min;R01;R02\r\n0;0,010;0,020\r\n0,5;0,015;0,031\r\n1;0,019;0,040\r\n",
  );
  const upload = await received(studyId, bytes);
  const before = await sheetOf(studyId);
  const reading = await readUpload(upload, before.sheet, {});
  if (reading.status !== "read") throw new Error(reading.message);
  const recipes = Object.fromEntries(
    reading.traces.map((trace) => [
      trace.source,
      Object.fromEntries(Object.entries(trace.recipe).map(([id, { molar }]) => [id, molar])),
    ]),
  );
  const result = await addTraces(
    db,
    group.analyst,
    { studyId, base: before.revision },
    {
      uploadId: upload.uploadId,
      reading: readingInWords(reading),
      runs: tracedRuns(reading, recipes, before.sheet),
    },
  );
  expect(result.status).toBe("changed");

  const { sheet } = await sheetOf(studyId);
  const [first, second] = sheet.runs;
  expect(first).toMatchObject({
    id: "planned",
    label: "R01",
    concentrations: {
      a: { molar: 0.0005, relativeUncertainty: 0 },
      c: { molar: 0.02, relativeUncertainty: 0.01 },
    },
    trace: { points: 3, column: "column 2, R01", uploadId: upload.uploadId },
  });
  expect(second).toMatchObject({ label: "R02", concentrations: { a: { molar: 0.001 } } });
  const stored = await readTrace(db, second?.trace?.sha256 ?? "");
  expect([...stored.timeSeconds]).toEqual([0, 30, 60]);
  expect([...stored.signal]).toEqual([0.02, 0.031, 0.04]);
  expect(sheet.uploads[0]?.sha256).toBe(createHash("sha256").update(bytes).digest("hex"));
  expect(sheet.uploads[0]?.reading).toContain("decimal mark ,");
  expect(storedFrom(sheet, sheet.uploads[0]?.sha256 ?? "")).toEqual(["R01", "R02"]);
  expect(storedFrom(sheet, "0".repeat(64))).toEqual([]);
});

test("a large file is read in the pool to the same numbers as a small one at once", async () => {
  const studyId = await makeStudy(temporary.db, group.lead);
  const { sheet } = await sheetOf(studyId);
  const lines = Array.from(
    { length: 20_000 },
    (_, i) => `${i / 10},${(0.01 + i * 1e-5).toFixed(6)},${i % 7}`,
  );
  const small = await received(
    studyId,
    new TextEncoder().encode(`t / s,R1,R2\n${lines.slice(0, 100).join("\n")}\n`),
  );
  const large = await received(studyId, new TextEncoder().encode(`t / s,R1,R2\n${lines.join("\n")}\n`));
  expect(small.size).toBeLessThan(256 * 1024);
  expect(large.size).toBeGreaterThan(256 * 1024);

  const atOnce = await readUpload(small, sheet, {});
  const inPool = await readUpload(large, sheet, {});
  if (atOnce.status !== "read" || inPool.status !== "read") throw new Error("both are read");
  expect(inPool.traces.map((trace) => trace.signal.length)).toEqual([20_000, 20_000]);
  for (const [i, trace] of atOnce.traces.entries()) {
    expect([...(inPool.traces[i]?.signal.subarray(0, 100) ?? [])]).toEqual([...trace.signal]);
  }
  const preview = await previewUpload(large, sheet, {});
  if (preview.status !== "read") throw new Error(preview.message);
  expect(preview.traces.map((trace) => trace.readings)).toEqual([20_000, 20_000]);
  expect(preview.traces[0]?.signal.length).toBeLessThan(600);
});

test("corrections travel to the pool, and a refusal comes back from it", async () => {
  const studyId = await makeStudy(temporary.db, group.lead);
  const { sheet } = await sheetOf(studyId);
  const words = await received(studyId, new TextEncoder().encode("nothing but words here\n".repeat(20_000)));
  expect(await previewUpload(words, sheet, {})).toMatchObject({ status: "refused" });
  // Never four digits before the mark: those would tell a decimal comma.
  const lines = Array.from({ length: 30_000 }, (_, i) => `${(i % 900) + 1},000;${(i % 900) + 1},234`).join(
    "\n",
  );
  const open = await received(studyId, new TextEncoder().encode(`t;R1\n${lines}\n`));
  const asked = await previewUpload(open, sheet, {});
  expect(asked).toMatchObject({ status: "read", decimalMark: { value: null } });
  const answered = await readUpload(open, sheet, { decimalMark: "," });
  if (answered.status !== "read") throw new Error(answered.message);
  expect(answered.traces[0]?.signal[0]).toBe(1.234);
});

test("a corpus file that must be refused stores nothing", async () => {
  const studyId = await makeStudy(temporary.db, group.lead);
  const before = await sheetOf(studyId);
  const upload = await received(
    studyId,
    readFileSync(path.join(import.meta.dirname, "corpus/cut-off-workbook.xlsx")),
  );
  expect(await readUpload(upload, before.sheet, {})).toMatchObject({ status: "refused" });
  expect((await sheetOf(studyId)).revision).toBe(before.revision);
});

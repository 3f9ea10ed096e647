import { createHash, randomBytes } from "node:crypto";
import { sql } from "kysely";
import { afterEach, beforeEach, expect, test } from "vitest";
import { PART_BYTES } from "../blob/blob.commands";
import { BYTES_PER_FILE, BYTES_PER_GROUP } from "../limits";
import { addTraces } from "../run/add-traces";
import { addRuns } from "../run/run.commands";
import { changeStudy } from "../study/change-study";
import { readStudy } from "../study/study.queries";
import { makeGroup, type TestGroup } from "../testing/make-group";
import { exampleRun, makeStudy } from "../testing/make-study";
import { type TemporaryDatabase, temporaryDatabase } from "../testing/temporary-database";
import { readTrace } from "../trace/read-trace";
import { dropLeftovers } from "./drop-leftovers";
import { dropUpload } from "./drop-upload";
import { receiveUpload } from "./receive-upload";
import { openUpload } from "./upload.queries";

let temporary: TemporaryDatabase;
let group: TestGroup;
let studyId: string;

beforeEach(async () => {
  temporary = await temporaryDatabase();
  group = await makeGroup(temporary.db);
  studyId = await makeStudy(temporary.db, group.analyst);
});
afterEach(() => temporary.close());

/** The bytes in pieces of 64 000, as a socket brings them: no multiple of a part. */
async function* inPieces(bytes: Uint8Array): AsyncGenerator<Uint8Array> {
  for (let start = 0; start < bytes.byteLength; start += 64_000) yield bytes.subarray(start, start + 64_000);
}

const receive = (bytes: Uint8Array, declaredBytes: number | null = bytes.byteLength) =>
  receiveUpload(
    temporary.db,
    group.analyst,
    { studyId, fileName: "runs.csv", declaredBytes },
    inPieces(bytes),
  );

async function hashOf(pieces: AsyncIterable<Uint8Array>): Promise<{ sha256: string; size: number }> {
  const hash = createHash("sha256");
  let size = 0;
  for await (const piece of pieces) {
    expect(piece.byteLength).toBeLessThanOrEqual(PART_BYTES);
    hash.update(piece);
    size += piece.byteLength;
  }
  return { sha256: hash.digest("hex"), size };
}

async function leftInBlobs(): Promise<number> {
  const { db } = temporary;
  const blobs = await db.selectFrom("blob").select("id").execute();
  const parts = await db.selectFrom("blob_part").select("n").execute();
  const incoming = await db.selectFrom("incoming_upload").select("id").execute();
  return blobs.length + parts.length + incoming.length;
}

const oneRun = (uploadId: string | null, label = "R01") => ({
  uploadId,
  reading: "comma, decimal point, columns time and R01",
  runs: [
    {
      label,
      concentrations: {},
      column: "R01",
      trace: { timeSeconds: Float64Array.of(0, 1, 2), signal: Float64Array.of(0, 0.1, 0.2) },
    },
  ],
});

test("a file of 30 MB comes back byte for byte, waiting and stored", async () => {
  const bytes = randomBytes(30_000_000);
  const sha256 = createHash("sha256").update(bytes).digest("hex");
  const received = await receive(bytes);
  expect(received).toMatchObject({ status: "received", sha256, size: 30_000_000 });
  if (received.status !== "received") return;
  const target = { studyId, uploadId: received.uploadId };

  const waiting = await openUpload(temporary.db, group.reader, target);
  expect(waiting).toMatchObject({ state: "waiting", fileName: "runs.csv", sha256 });
  if (waiting === undefined) return;
  expect(await hashOf(waiting.bytes())).toEqual({ sha256, size: 30_000_000 });

  const added = await addTraces(temporary.db, group.analyst, { studyId, base: 1 }, oneRun(received.uploadId));
  expect(added.status).toBe("changed");
  const stored = await openUpload(temporary.db, group.reader, target);
  expect(stored?.state).toBe("stored");
  if (stored === undefined) return;
  expect(await hashOf(stored.bytes())).toEqual({ sha256, size: 30_000_000 });
});

test("reading a file slowly holds no transaction: the log can be truncated meanwhile", async () => {
  const received = await receive(randomBytes(5_000_000));
  if (received.status !== "received") throw new Error(received.status);
  const file = await openUpload(temporary.db, group.reader, { studyId, uploadId: received.uploadId });
  if (file === undefined) throw new Error("the file waits");
  const pieces = file.bytes()[Symbol.asyncIterator]();
  await pieces.next();
  const checkpoint = await sql<{ busy: number; log: number }>`pragma wal_checkpoint(truncate)`.execute(
    temporary.db,
  );
  expect(checkpoint.rows[0]).toMatchObject({ busy: 0, log: 0 });
  expect((await pieces.next()).done).toBe(false);
});

test("a file over the limit is refused, declared or not, and nothing of it is left", async () => {
  const tooLarge = BYTES_PER_FILE + 1;
  const declared = await receive(new Uint8Array(0), tooLarge);
  expect(declared).toMatchObject({ status: "refused", code: "too-large" });

  let sent = 0;
  async function* endless(): AsyncGenerator<Uint8Array> {
    const piece = new Uint8Array(PART_BYTES);
    for (;;) {
      sent += piece.byteLength;
      yield piece;
    }
  }
  const file = { studyId, fileName: "endless.csv", declaredBytes: null };
  const undeclared = await receiveUpload(temporary.db, group.analyst, file, endless());
  expect(undeclared).toMatchObject({ status: "refused", code: "too-large" });
  if (undeclared.status === "refused") expect(undeclared.message).toContain("50\u202fMB");
  expect(sent).toBeLessThan(BYTES_PER_FILE + 2 * PART_BYTES);
  expect(await leftInBlobs()).toBe(0);
});

test("a planned run takes readings where it stands, once; a second time is refused and nothing is stored", async () => {
  const { db } = temporary;
  const study = await makeStudy(db, group.lead);
  const planned = {
    id: "planned",
    label: "R01",
    concentrations: { a: { molar: 0.001, relativeUncertainty: 0 } },
  };
  await addRuns(db, group.analyst, { studyId: study, base: 1 }, [planned]);
  const readings = oneRun(null);
  const wanted = { ...readings, runs: readings.runs.map((run) => ({ ...run, plannedRunId: "planned" })) };
  expect(await addTraces(db, group.analyst, { studyId: study, base: 2 }, wanted)).toMatchObject({
    status: "changed",
  });
  const after = await readStudy(db, group.reader, study);
  expect(after?.sheet.runs).toHaveLength(1);
  expect(after?.sheet.runs[0]).toMatchObject({ id: "planned", trace: { points: 3 } });
  const kept = await leftInBlobs();
  const again = await addTraces(db, group.analyst, { studyId: study, base: 3 }, wanted);
  expect(again).toMatchObject({ status: "refused" });
  expect((await readStudy(db, group.reader, study))?.revision).toBe(after?.revision);
  expect(await leftInBlobs()).toBe(kept);
});

test("a planned run that was mixed from stocks keeps the concentrations that follow from its volumes", async () => {
  const { db } = temporary;
  const study = await makeStudy(db, group.lead);
  const worked = { molar: 0.00125, relativeUncertainty: 0.004 };
  const made = await changeStudy(
    db,
    group.analyst,
    { studyId: study, base: 1 },
    { verb: "runs added", summary: "R01 added." },
    (sheet) => ({
      ...sheet,
      stocks: [
        {
          id: "s",
          symbol: "A",
          name: "A in water",
          position: 0,
          contents: { a: { value: 0.0025, standardUncertainty: 0 } },
          dilution: null,
          lot: "",
          madeOn: "",
          howKnown: "",
        },
      ],
      runs: [{ ...exampleRun("R01"), enteredRate: null, volumes: { s: 500 }, concentrations: { a: worked } }],
    }),
  );
  expect(made.status).toBe("changed");
  const readings = oneRun(null);
  const said = { a: { molar: 0.002, relativeUncertainty: 0 }, c: { molar: 0.01, relativeUncertainty: 0 } };
  const runs = readings.runs.map((run) => ({ ...run, plannedRunId: "run-R01", concentrations: said }));
  await addTraces(db, group.analyst, { studyId: study, base: 2 }, { ...readings, runs });
  const [run] = (await readStudy(db, group.reader, study))?.sheet.runs ?? [];
  expect(run?.trace?.points).toBe(3);
  expect(run?.concentrations).toEqual({ a: worked, c: said.c });
});

test("an empty file and one that broke off are refused by a sentence, and nothing of them is left", async () => {
  expect(await receive(new Uint8Array(0))).toMatchObject({ status: "refused", code: "empty" });
  const short = await receive(randomBytes(100_000), 200_000);
  expect(short).toMatchObject({ status: "refused", code: "incomplete" });
  if (short.status === "refused") expect(short.message).toContain("100000 of 200000 bytes");
  expect(await leftInBlobs()).toBe(0);
});

test("files that arrive beside each other count against the group's room together", async () => {
  const { db } = temporary;
  const first = await receive(Buffer.from("t,c\n0,1\n"));
  if (first.status !== "received") throw new Error(first.status);
  async function* besideAnother(): AsyncGenerator<Uint8Array> {
    yield Buffer.from("t,c\n");
    // The other one is whole, and fills the room, while this one is still arriving.
    await db
      .updateTable("incoming_upload")
      .set({ size: BYTES_PER_GROUP })
      .where("id", "=", first.status === "received" ? first.uploadId : "")
      .execute();
    yield Buffer.from("0,1\n");
  }
  const file = { studyId, fileName: "late.csv", declaredBytes: null };
  expect(await receiveUpload(db, group.analyst, file, besideAnother())).toMatchObject({
    status: "refused",
    code: "group-full",
  });
});

test("a connection that fails midway leaves nothing", async () => {
  async function* failing(): AsyncGenerator<Uint8Array> {
    yield randomBytes(3_000_000);
    throw new Error("connection reset");
  }
  const file = { studyId, fileName: "x.csv", declaredBytes: null };
  await expect(receiveUpload(temporary.db, group.analyst, file, failing())).rejects.toThrow(
    "connection reset",
  );
  expect(await leftInBlobs()).toBe(0);
});

test("start-up drops what was arriving and keeps what waits, a day long", async () => {
  const { db } = temporary;
  const waiting = await receive(randomBytes(2_000_000));
  if (waiting.status !== "received") throw new Error(waiting.status);
  // The process ends while a second file arrives.
  async function* cutOff(): AsyncGenerator<Uint8Array> {
    yield randomBytes(2_500_000);
    await new Promise(() => undefined);
  }
  void receiveUpload(db, group.analyst, { studyId, fileName: "y.csv", declaredBytes: null }, cutOff());
  await expect.poll(async () => (await db.selectFrom("blob_part").select("n").execute()).length).toBe(4);

  expect(await dropLeftovers(db)).toBe(1);
  expect((await db.selectFrom("blob_part").select("n").execute()).length).toBe(2);
  const target = { studyId, uploadId: waiting.uploadId };
  expect(await openUpload(db, group.analyst, target)).toBeDefined();

  const nextDay = new Date(Date.now() + 25 * 3600 * 1000);
  expect(await dropLeftovers(db, nextDay)).toBe(1);
  expect(await openUpload(db, group.analyst, target)).toBeUndefined();
  expect(await leftInBlobs()).toBe(0);
});

test("stored files and traces outlive every start", async () => {
  const { db } = temporary;
  const received = await receive(randomBytes(1000));
  if (received.status !== "received") throw new Error(received.status);
  await addTraces(db, group.analyst, { studyId, base: 1 }, oneRun(received.uploadId));
  await dropLeftovers(db, new Date("2100-01-01T00:00:00.000Z"));
  expect(await openUpload(db, group.reader, { studyId, uploadId: received.uploadId })).toBeDefined();
  const study = await readStudy(db, group.reader, studyId);
  const sha256 = study?.sheet.runs[0]?.trace?.sha256 ?? "";
  expect((await readTrace(db, sha256)).signal).toEqual(Float64Array.of(0, 0.1, 0.2));
});

test("a file can be stored once; its runs cannot be stored twice", async () => {
  const received = await receive(randomBytes(1000));
  if (received.status !== "received") throw new Error(received.status);
  const { db } = temporary;
  const first = await addTraces(db, group.analyst, { studyId, base: 1 }, oneRun(received.uploadId));
  expect(first).toMatchObject({ status: "changed", revision: 2 });
  const second = await addTraces(db, group.analyst, { studyId, base: 2 }, oneRun(received.uploadId, "R02"));
  expect(second.status).toBe("refused");
});

test("equal bytes are kept once, whoever sends them", async () => {
  const bytes = randomBytes(2_000_000);
  const { db } = temporary;
  for (const [index, label] of ["R01", "R02"].entries()) {
    const received = await receive(bytes);
    if (received.status !== "received") throw new Error(received.status);
    const added = await addTraces(
      db,
      group.analyst,
      { studyId, base: index + 1 },
      oneRun(received.uploadId, label),
    );
    expect(added.status).toBe("changed");
    expect(await openUpload(db, group.reader, { studyId, uploadId: received.uploadId })).toBeDefined();
  }
  const blobs = await db.selectFrom("blob").select(["state", "codec"]).orderBy("codec").execute();
  expect(blobs).toEqual([
    { state: "stored", codec: "deflate" },
    { state: "stored", codec: "none" },
  ]);
});

test("a refused import leaves the file waiting and no trace behind", async () => {
  const { db } = temporary;
  const received = await receive(randomBytes(1000));
  if (received.status !== "received") throw new Error(received.status);
  const twice = oneRun(received.uploadId);
  const refused = await addTraces(
    db,
    group.analyst,
    { studyId, base: 1 },
    {
      ...twice,
      runs: [...twice.runs, ...twice.runs],
    },
  );
  expect(refused).toMatchObject({ status: "refused" });
  if (refused.status === "refused") expect(refused.message).toContain("R01");
  expect(await db.selectFrom("blob").select("codec").execute()).toEqual([{ codec: "none" }]);
  expect(await openUpload(db, group.analyst, { studyId, uploadId: received.uploadId })).toBeDefined();
});

test("readers and outsiders can neither send, see nor drop a file", async () => {
  const { db } = temporary;
  const other = await makeGroup(db, "elsewhere.example");
  const file = { studyId, fileName: "x.csv", declaredBytes: null };
  const bytes = randomBytes(1000);
  expect(await receiveUpload(db, group.reader, file, inPieces(bytes))).toEqual({ status: "forbidden" });
  expect(await receiveUpload(db, other.lead, file, inPieces(bytes))).toEqual({ status: "not-found" });
  const received = await receive(bytes);
  if (received.status !== "received") throw new Error(received.status);
  const target = { studyId, uploadId: received.uploadId };
  expect(await openUpload(db, other.lead, target)).toBeUndefined();
  expect(await dropUpload(db, other.lead, target)).toBe(false);
  expect(await dropUpload(db, group.reader, target)).toBe(false);
  const runs = oneRun(received.uploadId);
  expect(await addTraces(db, other.lead, { studyId, base: 1 }, runs)).toEqual({ status: "not-found" });
  expect(await addTraces(db, group.reader, { studyId, base: 1 }, runs)).toEqual({ status: "forbidden" });
  expect(await dropUpload(db, group.analyst, target)).toBe(true);
  expect(await leftInBlobs()).toBe(0);
});

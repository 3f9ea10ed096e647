import { createHash } from "node:crypto";
import { afterAll, beforeAll, expect, test } from "vitest";
import { PART_BYTES } from "../blob/blob.commands";
import { type TemporaryDatabase, temporaryDatabase } from "../testing/temporary-database";
import { readTrace, readTraces } from "./read-trace";
import { packTrace } from "./trace-bytes";
import { sealTraces, stageTraces, writeTrace } from "./write-trace";

let temporary: TemporaryDatabase;

beforeAll(async () => {
  temporary = await temporaryDatabase();
});
afterAll(() => temporary.close());

const write = (timeSeconds: number[], signal: number[]) =>
  temporary.db
    .transaction()
    .execute((trx) =>
      writeTrace(trx, { timeSeconds: Float64Array.from(timeSeconds), signal: Float64Array.from(signal) }),
    );

test("a trace is named by the SHA-256 of its little-endian pairs", async () => {
  // Written out by hand: 0, 1 and 2, -0.5 as IEEE 754 doubles, least significant byte first.
  const pairs = Buffer.from(
    "0000000000000000" + "000000000000f03f" + "0000000000000040" + "000000000000e0bf",
    "hex",
  );
  expect(await write([0, 2], [1, -0.5])).toBe(createHash("sha256").update(pairs).digest("hex"));
});

test("readings come back bit for bit, the smallest and the oddest too", async () => {
  const timeSeconds = [-1, 0, Number.MIN_VALUE, 0.1 + 0.2, Number.MAX_VALUE];
  const signal = [-0, 5e-324, 1 / 3, -1e308, 0.1];
  const trace = await readTrace(temporary.db, await write(timeSeconds, signal));
  expect([...trace.timeSeconds]).toEqual(timeSeconds);
  expect(trace.signal.every((value, index) => Object.is(value, signal[index]))).toBe(true);
});

test("a trace of a million points goes through parts and comes back equal", async () => {
  const points = 1_000_000;
  const timeSeconds = Float64Array.from({ length: points }, (_, index) => index * 0.01);
  const signal = Float64Array.from(
    { length: points },
    (_, index) => Math.sin(index) * 1e-3 + 1 / (1 + index),
  );
  const packed = await packTrace({ timeSeconds, signal });
  const staged = await stageTraces(temporary.db, [packed]);
  await temporary.db.transaction().execute((trx) => sealTraces(trx, staged));
  const sizes = await temporary.db
    .selectFrom("blob_part")
    .select((eb) => eb.fn<number>("length", ["bytes"]).as("size"))
    .where("blob_id", "=", staged[0]?.blobId ?? 0)
    .execute();
  expect(sizes.length).toBeGreaterThan(1);
  for (const { size } of sizes) expect(size).toBeLessThanOrEqual(PART_BYTES);
  const back = await readTrace(temporary.db, packed.sha256);
  expect(Buffer.from(back.signal.buffer).equals(Buffer.from(signal.buffer))).toBe(true);
  expect(Buffer.from(back.timeSeconds.buffer).equals(Buffer.from(timeSeconds.buffer))).toBe(true);
});

test("many traces are read at once, each under its own hash", async () => {
  const hashes: string[] = [];
  for (let run = 0; run < 150; run++) hashes.push(await write([0, 1, 2], [run, run + 1, run + 2]));
  const traces = await readTraces(temporary.db, [...hashes, ...hashes]);
  expect(traces.size).toBe(150);
  for (const [run, sha256] of hashes.entries()) expect(traces.get(sha256)?.signal[0]).toBe(run);
});

test("a trace that is not kept is an error, never an empty one", async () => {
  const missing = "0".repeat(64);
  await expect(readTrace(temporary.db, missing)).rejects.toThrow(missing);
  await expect(readTraces(temporary.db, [missing])).rejects.toThrow(missing);
});

import { execFile, spawn } from "node:child_process";
import { once } from "node:events";
import { mkdtempSync, rmSync, statSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import { promisify } from "node:util";
import { sql } from "kysely";
import { afterEach, beforeEach, expect, test } from "vitest";
import { verifyChainOfGroup } from "./audit/chain-verdict";
import { connect } from "./connect";
import { readRevisionSheet } from "./revision/revision.queries";
import { increaseInTurn, type Tally, withTally } from "./testing/increase-in-turn";
import { makeGroup } from "./testing/make-group";
import { makeStudy } from "./testing/make-study";
import { type TemporaryDatabase, temporaryDatabase } from "./testing/temporary-database";

let temporary: TemporaryDatabase;

beforeEach(async () => {
  temporary = await temporaryDatabase();
});
afterEach(() => temporary.close());

test("a connection writes with full synchronisation to a log of bounded size, with foreign keys", async () => {
  const pragma = async (name: string) => {
    const { rows } = await sql<Record<string, unknown>>`pragma ${sql.raw(name)}`.execute(temporary.db);
    return Object.values(rows[0] ?? {})[0];
  };
  expect(await pragma("journal_mode")).toBe("wal");
  // 2 is FULL: https://www.sqlite.org/pragma.html#pragma_synchronous
  expect(await pragma("synchronous")).toBe(2);
  expect(await pragma("foreign_keys")).toBe(1);
  expect(await pragma("busy_timeout")).toBe(5000);
  expect(await pragma("journal_size_limit")).toBe(64 * 1024 * 1024);
});

test("a database is made for its owner's eyes alone, with all that SQLite puts beside it", async () => {
  const folder = path.join(mkdtempSync(path.join(tmpdir(), "ratewright-mode-")), "data");
  const file = path.join(folder, "new.sqlite");
  const db = connect(file);
  try {
    await sql`create table held (value text)`.execute(db);
    const mode = (one: string) => statSync(one).mode & 0o777;
    expect(mode(folder)).toBe(0o700);
    expect([file, `${file}-wal`, `${file}-shm`].map(mode)).toEqual([0o600, 0o600, 0o600]);
  } finally {
    await db.destroy();
    rmSync(path.dirname(folder), { recursive: true });
  }
});

test("transactions that read first and write later take turns between processes", async () => {
  const db = await withTally(temporary.db);
  await db.insertInto("tally").values({ count: 0 }).execute();
  const beside = promisify(execFile)(process.execPath, [
    "--import",
    "tsx",
    "db/testing/increase-in-turn.ts",
    temporary.file,
    "300",
  ]);
  // Until the other process is there; then both run at once.
  await expect
    .poll(async () => (await db.selectFrom("tally").select("count").executeTakeFirst())?.count, {
      timeout: 20_000,
      interval: 2,
    })
    .toBeGreaterThan(0);
  await increaseInTurn(temporary.db, 300);
  await beside;
  const row = await db.selectFrom("tally").select("count").executeTakeFirstOrThrow();
  expect(row.count).toBe(600);
});

test("a read-only transaction takes no lock from a writer in another process", async () => {
  const db = await withTally(temporary.db);
  const other = connect(temporary.file).withTables<{ tally: Tally }>();
  try {
    await sql`pragma busy_timeout = 0`.execute(other);
    await db.transaction().execute(async (trx) => {
      await trx.insertInto("tally").values({ count: 1 }).execute();
      const seen = await other
        .transaction()
        .setAccessMode("read only")
        .execute((reading) => reading.selectFrom("tally").select("count").execute());
      expect(seen).toEqual([]);
      await expect(other.transaction().execute(async () => undefined)).rejects.toThrow("locked");
    });
  } finally {
    await other.destroy();
  }
});

test("a row that belongs to nothing is refused", async () => {
  const orphan = { blob_id: 99, n: 0, bytes: new Uint8Array(1) };
  await expect(temporary.db.insertInto("blob_part").values(orphan).execute()).rejects.toThrow("FOREIGN KEY");
});

test("four writers killed at a random moment: what was acknowledged is there whole, with its entry", {
  timeout: 120_000,
}, async () => {
  const { db, file } = temporary;
  const group = await makeGroup(db);
  const studyId = await makeStudy(db, group.analyst);
  const acknowledged = new Map<number, string>();
  for (let round = 0; round < 3; round++) {
    const writers = [0, 1, 2, 3].map((n) => [file, group.analyst.memberId, studyId, `K${round}.${n}`]);
    for (const line of await writeThenKill(writers, 20)) {
      const [label = "", revision = ""] = line.split(" ");
      acknowledged.set(Number(revision), label);
    }
    const check = await sql<{ quick_check: string }>`pragma quick_check`.execute(db);
    expect(check.rows).toEqual([{ quick_check: "ok" }]);
    expect(await verifyChainOfGroup(db, group.groupId)).toMatchObject({ status: "holds" });
  }
  expect(acknowledged.size).toBeGreaterThanOrEqual(60);
  for (const [revision, label] of acknowledged) {
    const sheet = await readRevisionSheet(db, studyId, revision);
    expect(sheet?.runs.some((run) => run.label === label)).toBe(true);
    const entry = await db
      .selectFrom("audit_entry")
      .select("summary")
      .where("study_id", "=", studyId)
      .where("revision", "=", revision)
      .executeTakeFirst();
    expect(entry?.summary).toBe(`${label} added.`);
  }
});

/**
 * Starts a writer for each list of arguments, kills all of them hard at a random moment after they acknowledged
 * `count` changes together, and gives the lines they wrote.
 */
async function writeThenKill(writers: readonly (readonly string[])[], count: number): Promise<string[]> {
  const lines: string[] = [];
  const errors: string[] = [];
  let killing = false;
  const processes = writers.map((args) =>
    spawn(process.execPath, ["--import", "tsx", "db/testing/write-until-killed.ts", ...args], {
      stdio: ["ignore", "pipe", "pipe"],
    }),
  );
  const ended = processes.map(async (writer) => {
    writer.stderr.on("data", (chunk) => errors.push(String(chunk)));
    let open = "";
    writer.stdout.on("data", (chunk) => {
      // A last line without its end was cut off in the pipe and counts as not acknowledged.
      const pieces = (open + String(chunk)).split("\n");
      open = pieces.pop() ?? "";
      lines.push(...pieces);
      if (lines.length < count || killing) return;
      killing = true;
      setTimeout(() => {
        for (const one of processes) one.kill("SIGKILL");
      }, Math.random() * 20);
    });
    await once(writer, "close");
    if (writer.signalCode !== "SIGKILL") throw new Error(`A writer ended by itself: ${errors.join("")}`);
  });
  await Promise.all(ended);
  return lines;
}

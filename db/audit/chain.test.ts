import { execFile } from "node:child_process";
import { promisify } from "node:util";
import { afterEach, beforeEach, expect, test } from "vitest";
import { packSheet } from "../revision/packed-sheet";
import { readRevisionSheet } from "../revision/revision.queries";
import { addRuns, setRunsAside } from "../run/run.commands";
import { createShareLink } from "../share-link/share-link.commands";
import { makeGroup, type TestGroup } from "../testing/make-group";
import { exampleRun, makeStudy } from "../testing/make-study";
import { type TemporaryDatabase, temporaryDatabase } from "../testing/temporary-database";
import { entryHash } from "./append-entry";
import { auditEntryRow } from "./audit.table";
import { verifyChainOfGroup } from "./chain-verdict";

let temporary: TemporaryDatabase;
let group: TestGroup;
let studyId: string;

/** Entries 1 to 8: group made, three members, study, runs, set aside, link. */
beforeEach(async () => {
  temporary = await temporaryDatabase();
  group = await makeGroup(temporary.db);
  studyId = await makeStudy(temporary.db, group.analyst);
  await addRuns(temporary.db, group.analyst, { studyId, base: 1 }, [exampleRun("R01"), exampleRun("R02")]);
  await setRunsAside(temporary.db, group.analyst, { studyId, base: 2 }, ["run-R02"], "bubble");
  const link = { studyId, label: "", expiresAt: null, frozenRevision: null };
  await createShareLink(temporary.db, group.lead, link);
});
afterEach(() => temporary.close());

const verify = (head?: string) => verifyChainOfGroup(temporary.db, group.groupId, head);
const entries = async () =>
  (
    await temporary.db
      .selectFrom("audit_entry")
      .selectAll()
      .where("group_id", "=", group.groupId)
      .orderBy("number")
      .execute()
  ).map((row) => auditEntryRow.parse(row));

test("holds studies and group events of one group in one row, each with its predecessor's hash", async () => {
  expect((await entries()).map((entry) => entry.verb)).toEqual([
    "group made",
    "member added",
    "member added",
    "member added",
    "created",
    "runs added",
    "set aside",
    "link made",
  ]);
  const verdict = await verify();
  expect(verdict).toMatchObject({ status: "holds", entries: 8, head: (await entries()).at(-1)?.hash });
});

test("names no person: a name and an e-mail are nowhere in it", async () => {
  const text = JSON.stringify(await entries());
  const people = await temporary.db.selectFrom("account").select(["name", "email"]).execute();
  for (const { name, email } of people) {
    expect(text).not.toContain(name);
    expect(text).not.toContain(email);
  }
});

test("another group's events do not touch it", async () => {
  const before = await verify();
  await makeGroup(temporary.db, "elsewhere.example");
  expect(await verify()).toEqual(before);
});

test("every changed column of an entry is found, at that entry", async () => {
  const original = (await entries())[6];
  if (original === undefined) throw new Error("entry 7 is there");
  const tampered = {
    summary: "R02 set aside: warm cell.",
    verb: "taken back",
    member_id: group.lead.memberId,
    at: "2026-01-01T00:00:00.000Z",
    sheet_hash: "0".repeat(64),
  };
  for (const [column, value] of Object.entries(tampered)) {
    const row = temporary.db.updateTable("audit_entry").where("hash", "=", original.hash);
    await row.set({ [column]: value }).execute();
    expect(await verify(), column).toMatchObject({ status: "broken", entry: 7 });
    await row
      .set({ [column]: original[column === "sheet_hash" ? "sheet_hash" : (column as keyof typeof original)] })
      .execute();
  }
  expect(await verify()).toMatchObject({ status: "holds" });
});

test("an entry rewritten with its own hash no longer carries the next one", async () => {
  const original = (await entries())[5];
  if (original === undefined) throw new Error("entry 6 is there");
  const forged = { ...original, summary: "Nothing happened." };
  await temporary.db
    .updateTable("audit_entry")
    .set({ summary: forged.summary, hash: entryHash(forged) })
    .where("hash", "=", original.hash)
    .execute();
  expect(await verify()).toMatchObject({ status: "broken", entry: 7 });
});

test("an entry taken out of the middle is found", async () => {
  await temporary.db
    .deleteFrom("audit_entry")
    .where("group_id", "=", group.groupId)
    .where("number", "=", 3)
    .execute();
  expect(await verify()).toMatchObject({ status: "broken", message: "Entry 3 is missing." });
});

test("a snapshot exchanged for another sheet, or for rubbish, is found at its entry", async () => {
  const sheet = await readRevisionSheet(temporary.db, studyId, 2);
  if (sheet === undefined) throw new Error("revision 2 is kept");
  const row = temporary.db.updateTable("revision").where("study_id", "=", studyId).where("number", "=", 2);
  const other = packSheet({ ...sheet, study: { ...sheet.study, name: "Another" } });
  await row.set({ sheet: other.bytes }).execute();
  expect(await verify()).toMatchObject({ status: "broken", entry: 6 });
  await row.set({ sheet: new Uint8Array([1, 2, 3]) }).execute();
  expect(await verify()).toMatchObject({ status: "broken", entry: 6 });
});

test("tables changed behind the door are found", async () => {
  const { db } = temporary;
  await db
    .updateTable("run")
    .set({ entered_rate_molar_per_second: 9 })
    .where("study_id", "=", studyId)
    .execute();
  expect(await verify()).toMatchObject({ status: "broken" });
});

test("a tail cut off together with its study's tables is found by a head that was written down", async () => {
  const { db } = temporary;
  const before = await verify();
  if (before.status !== "holds") throw new Error("the chain holds");
  await db.deleteFrom("audit_entry").where("hash", "=", before.head).execute();
  expect(await verify()).toMatchObject({ status: "holds", entries: 7 });
  expect(await verify(before.head)).toMatchObject({ status: "broken" });
});

test("a head that was written down earlier is still part of the grown chain", async () => {
  const before = await verify();
  if (before.status !== "holds") throw new Error("the chain holds");
  await addRuns(temporary.db, group.analyst, { studyId, base: 3 }, [exampleRun("R03")]);
  expect(await verify(before.head)).toMatchObject({ status: "holds", entries: 9 });
});

test("the command prints the head and fails on a broken chain", async () => {
  const verdict = await verify();
  if (verdict.status !== "holds") throw new Error("the chain holds");
  const run = () =>
    promisify(execFile)(
      process.execPath,
      ["--import", "tsx", "db/audit/verify-chain.ts", "--head", verdict.head],
      {
        env: { ...process.env, DATABASE_FILE: temporary.file },
      },
    );
  expect((await run()).stdout).toContain(`8 entries hold. Head ${verdict.head}`);
  await temporary.db.updateTable("audit_entry").set({ summary: "x" }).where("number", "=", 2).execute();
  await expect(run()).rejects.toMatchObject({
    code: 1,
    stdout: expect.stringContaining("BROKEN at entry 2"),
  });
});

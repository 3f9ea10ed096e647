import { afterAll, beforeAll, expect, test } from "vitest";
import { makeGroup, type TestGroup } from "../testing/make-group";
import { type TemporaryDatabase, temporaryDatabase } from "../testing/temporary-database";
import { endAllSessions, endSession, SESSION_LIMITS, startSession } from "./session.commands";
import { actorOfSession } from "./session.queries";

let temporary: TemporaryDatabase;
let group: TestGroup;
const start = new Date("2026-03-14T08:00:00.000Z");
const after = (seconds: number) => new Date(start.getTime() + seconds * 1000);

beforeAll(async () => {
  temporary = await temporaryDatabase();
  group = await makeGroup(temporary.db);
});
afterAll(() => temporary.close());

test("a session says who holds it, and an unknown secret nothing", async () => {
  const secret = await startSession(temporary.db, group.analyst.accountId, start);
  expect(await actorOfSession(temporary.db, secret, after(1))).toEqual(group.analyst);
  expect(await actorOfSession(temporary.db, `${secret}x`, after(1))).toBeUndefined();
});

test("the secret is nowhere in the database file", async () => {
  const secret = await startSession(temporary.db, group.analyst.accountId, start);
  const rows = await temporary.db.selectFrom("session").selectAll().execute();
  expect(JSON.stringify(rows)).not.toContain(secret);
});

test("a session ends when idle for too long, and being seen keeps it alive", async () => {
  const secret = await startSession(temporary.db, group.analyst.accountId, start);
  const idle = SESSION_LIMITS.idleSeconds;
  expect(await actorOfSession(temporary.db, secret, after(idle - 1))).toBeDefined();
  expect(await actorOfSession(temporary.db, secret, after(2 * idle - 2))).toBeDefined();
  expect(await actorOfSession(temporary.db, secret, after(3 * idle))).toBeUndefined();
});

test("a session ends at its absolute limit however often it is seen", async () => {
  const secret = await startSession(temporary.db, group.analyst.accountId, start);
  const { idleSeconds, absoluteSeconds } = SESSION_LIMITS;
  for (let second = 0; second < absoluteSeconds; second += idleSeconds / 2) {
    expect(await actorOfSession(temporary.db, secret, after(second))).toBeDefined();
  }
  expect(await actorOfSession(temporary.db, secret, after(absoluteSeconds))).toBeUndefined();
});

test("signing out ends one session, signing out everywhere all of them", async () => {
  const [one, two, three] = await Promise.all(
    [1, 2, 3].map(() => startSession(temporary.db, group.lead.accountId, start)),
  );
  if (one === undefined || two === undefined || three === undefined) throw new Error("three sessions");
  await endSession(temporary.db, one, after(1));
  expect(await actorOfSession(temporary.db, one, after(2))).toBeUndefined();
  expect(await actorOfSession(temporary.db, two, after(2))).toEqual(group.lead);
  await endAllSessions(temporary.db, group.lead.accountId, after(3));
  expect(await actorOfSession(temporary.db, two, after(4))).toBeUndefined();
  expect(await actorOfSession(temporary.db, three, after(4))).toBeUndefined();
});

test("a changed role and a removed member act on the next request", async () => {
  const secret = await startSession(temporary.db, group.analyst.accountId, start);
  const member = temporary.db.updateTable("member").where("id", "=", group.analyst.memberId);
  await member.set({ role: "reader" }).execute();
  expect(await actorOfSession(temporary.db, secret, after(1))).toMatchObject({ role: "reader" });
  await member.set({ removed_at: after(2).toISOString() }).execute();
  expect(await actorOfSession(temporary.db, secret, after(3))).toBeUndefined();
});

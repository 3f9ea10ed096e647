import { execFile } from "node:child_process";
import { promisify } from "node:util";
import { afterAll, beforeAll, expect, test } from "vitest";
import { makeGroup, type TestGroup } from "../testing/make-group";
import { type TemporaryDatabase, temporaryDatabase } from "../testing/temporary-database";
import { createToken, revokeToken } from "./token.commands";
import { actorOfToken } from "./token.queries";

let temporary: TemporaryDatabase;
let group: TestGroup;

beforeAll(async () => {
  temporary = await temporaryDatabase();
  group = await makeGroup(temporary.db);
});
afterAll(() => temporary.close());

test("a token acts as its owner, and only its hash is kept", async () => {
  const made = await createToken(temporary.db, group.analyst, {
    name: "notebook",
    scope: "read",
    expiresAt: null,
  });
  expect(Buffer.from(made.token, "base64url")).toHaveLength(32);
  expect(await actorOfToken(temporary.db, made.token)).toEqual({ actor: group.analyst, scope: "read" });
  const rows = await temporary.db.selectFrom("personal_token").selectAll().execute();
  expect(JSON.stringify(rows)).not.toContain(made.token);
});

test("an unknown, an expired and a revoked token are nobody", async () => {
  const expiresAt = new Date("2026-03-14T08:00:00.000Z");
  const expiring = await createToken(temporary.db, group.lead, { name: "short", scope: "write", expiresAt });
  const before = new Date(expiresAt.getTime() - 1);
  expect(await actorOfToken(temporary.db, expiring.token, before)).toBeDefined();
  expect(await actorOfToken(temporary.db, expiring.token, expiresAt)).toBeUndefined();

  const revoked = await createToken(temporary.db, group.lead, {
    name: "lost",
    scope: "write",
    expiresAt: null,
  });
  expect(await revokeToken(temporary.db, group.analyst, revoked.id)).toBe(false);
  expect(await revokeToken(temporary.db, group.lead, revoked.id)).toBe(true);
  expect(await revokeToken(temporary.db, group.lead, revoked.id)).toBe(false);
  expect(await actorOfToken(temporary.db, revoked.token)).toBeUndefined();

  expect(await actorOfToken(temporary.db, "never made")).toBeUndefined();
});

test("making and revoking a token are entries of the group's chain", async () => {
  const made = await createToken(temporary.db, group.reader, { name: "x", scope: "read", expiresAt: null });
  await revokeToken(temporary.db, group.reader, made.id);
  const entries = await temporary.db
    .selectFrom("audit_entry")
    .select(["verb", "member_id", "summary"])
    .where("group_id", "=", group.groupId)
    .orderBy("number", "desc")
    .limit(2)
    .execute();
  expect(entries.map((entry) => entry.verb)).toEqual(["token revoked", "token made"]);
  for (const entry of entries) {
    expect(entry.member_id).toBe(group.reader.memberId);
    expect(entry.summary).toContain(made.id);
    expect(entry.summary).not.toContain(made.token);
  }
});

test("the command prints a token that works, lists the accounts without an e-mail, and refuses an unknown one", async () => {
  const command = (...args: string[]) =>
    promisify(execFile)(process.execPath, ["--import", "tsx", "db/token/make-token.ts", ...args], {
      env: { ...process.env, DATABASE_FILE: temporary.file },
    });
  const [made, listed, unknown] = await Promise.allSettled([
    command("analyst@group.example", "--scope", "read"),
    command(),
    command("nobody@group.example"),
  ]);
  if (made.status !== "fulfilled" || listed.status !== "fulfilled") throw new Error("both commands succeed");
  expect(await actorOfToken(temporary.db, made.value.stdout.trim())).toEqual({
    actor: group.analyst,
    scope: "read",
  });
  expect(listed.value.stdout).toBe("");
  expect(listed.value.stderr).toContain("reader@group.example");
  expect(unknown).toMatchObject({ status: "rejected", reason: { code: 2, stdout: "" } });
});

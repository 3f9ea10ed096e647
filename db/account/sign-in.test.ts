import { afterAll, beforeAll, expect, test } from "vitest";
import { startSession } from "../session/session.commands";
import { actorOfSession } from "../session/session.queries";
import { makeGroup, TEST_PASSWORD, type TestGroup } from "../testing/make-group";
import { type TemporaryDatabase, temporaryDatabase } from "../testing/temporary-database";
import { setPassword } from "./set-password";
import { verifySignIn } from "./sign-in";

let temporary: TemporaryDatabase;
let group: TestGroup;

beforeAll(async () => {
  temporary = await temporaryDatabase();
  group = await makeGroup(temporary.db);
});
afterAll(() => temporary.close());

test("a password is kept as argon2id with 19 MiB and two passes", async () => {
  const rows = await temporary.db.selectFrom("account").select("password_hash").execute();
  expect(rows).toHaveLength(3);
  for (const row of rows) expect(row.password_hash).toMatch(/^\$argon2id\$v=19\$m=19456,t=2,p=1\$/);
});

test("the right password opens the account whatever the case of the e-mail, a wrong one does not", async () => {
  const right = await verifySignIn(temporary.db, " Lead@Group.Example ", TEST_PASSWORD);
  expect(right).toEqual({ accountId: group.lead.accountId });
  expect(await verifySignIn(temporary.db, "lead@group.example", `${TEST_PASSWORD}.`)).toBeUndefined();
});

test("an unknown e-mail costs as much work as a wrong password", async () => {
  const timed = async (email: string) => {
    const start = performance.now();
    expect(await verifySignIn(temporary.db, email, "wrong")).toBeUndefined();
    return performance.now() - start;
  };
  await timed("nobody@group.example");
  const unknown: number[] = [];
  const wrong: number[] = [];
  for (let round = 0; round < 7; round++) {
    unknown.push(await timed("nobody@group.example"));
    wrong.push(await timed("lead@group.example"));
  }
  // Without the decoy the ratio is near 100; half and double leave room for a busy machine.
  const ratio = median(wrong) / median(unknown);
  expect(ratio).toBeGreaterThan(0.5);
  expect(ratio).toBeLessThan(2);
});

test("a new password replaces the old one and ends every session", async () => {
  const secret = await startSession(temporary.db, group.reader.accountId);
  await setPassword(temporary.db, group.reader.accountId, "another long password");
  expect(await actorOfSession(temporary.db, secret)).toBeUndefined();
  expect(await verifySignIn(temporary.db, "reader@group.example", TEST_PASSWORD)).toBeUndefined();
  expect(await verifySignIn(temporary.db, "reader@group.example", "another long password")).toEqual({
    accountId: group.reader.accountId,
  });
});

function median(values: number[]): number {
  return [...values].sort((a, b) => a - b)[Math.floor(values.length / 2)] ?? Number.NaN;
}

import { afterAll, beforeAll, beforeEach, expect, test } from "vitest";
import { addRuns } from "../run/run.commands";
import { makeGroup, type TestGroup } from "../testing/make-group";
import { exampleRun, makeStudy } from "../testing/make-study";
import { type TemporaryDatabase, temporaryDatabase } from "../testing/temporary-database";
import { createShareLink, type NewShareLink, revokeShareLink } from "./share-link.commands";
import { listShareLinks, openShareLink } from "./share-link.queries";

let temporary: TemporaryDatabase;
let group: TestGroup;
let other: TestGroup;
let studyId: string;

beforeAll(async () => {
  temporary = await temporaryDatabase();
  group = await makeGroup(temporary.db);
  other = await makeGroup(temporary.db, "elsewhere.example");
});
afterAll(() => temporary.close());
beforeEach(async () => {
  studyId = await makeStudy(temporary.db, group.analyst);
});

async function share(rest: Partial<NewShareLink> = {}): Promise<{ id: string; token: string }> {
  const link = { studyId, label: "Partner", expiresAt: null, frozenRevision: null, ...rest };
  const made = await createShareLink(temporary.db, group.analyst, link);
  if (made.status !== "created") throw new Error(made.status);
  return made;
}

test("a token of 256 bits opens the study, and only its hash is kept", async () => {
  const { token } = await share();
  expect(Buffer.from(token, "base64url")).toHaveLength(32);
  const shared = await openShareLink(temporary.db, token);
  expect(shared).toMatchObject({
    studyId,
    name: "An example study",
    groupName: "Group of group.example",
    revision: 1,
  });
  const rows = await temporary.db.selectFrom("share_link").selectAll().execute();
  expect(JSON.stringify(rows)).not.toContain(token);
});

test("unknown, expired and revoked tokens are the same nothing", async () => {
  const { db } = temporary;
  const expiresAt = new Date(Date.now() + 1000);
  const expiring = await share({ expiresAt });
  expect(await openShareLink(db, expiring.token, new Date(expiresAt.getTime() - 1))).toBeDefined();
  expect(await openShareLink(db, expiring.token, expiresAt)).toBeUndefined();

  const revoked = await share();
  expect(await openShareLink(db, revoked.token)).toBeDefined();
  expect(await revokeShareLink(db, group.lead, revoked.id)).toEqual({ status: "revoked" });
  expect(await openShareLink(db, revoked.token)).toBeUndefined();
  expect(await revokeShareLink(db, group.lead, revoked.id)).toEqual({ status: "revoked" });

  expect(await openShareLink(db, "unknown")).toBeUndefined();
  expect(await openShareLink(db, "")).toBeUndefined();
});

test("a live link follows the study, a frozen one stays", async () => {
  const { db } = temporary;
  const live = await share();
  const frozen = await share({ frozenRevision: 1 });
  await addRuns(db, group.analyst, { studyId, base: 1 }, [exampleRun("R01")]);
  expect((await openShareLink(db, live.token))?.sheet.runs).toHaveLength(1);
  expect(await openShareLink(db, live.token)).toMatchObject({ revision: 2, frozenRevision: null });
  expect((await openShareLink(db, frozen.token))?.sheet.runs).toHaveLength(0);
  expect(await openShareLink(db, frozen.token)).toMatchObject({ revision: 1, frozenRevision: 1 });
});

test("requests are counted while the link is good, and not after", async () => {
  const { db } = temporary;
  const { id, token } = await share();
  const line = async () => (await listShareLinks(db, group.reader, studyId)).find((link) => link.id === id);
  expect(await line()).toMatchObject({ requests: 0, lastRequestedAt: null, revokedAt: null, madeBy: "AN" });
  const at = new Date("2027-01-02T03:04:05.000Z");
  await openShareLink(db, token);
  await openShareLink(db, token, at);
  expect(await line()).toMatchObject({ requests: 2, lastRequestedAt: at.toISOString() });
  await revokeShareLink(db, group.analyst, id, at);
  await openShareLink(db, token);
  expect(await line()).toMatchObject({ requests: 2, revokedAt: at.toISOString() });
});

test("readers see the links and neither make nor revoke them; outsiders find nothing", async () => {
  const { db } = temporary;
  const { id, token } = await share();
  const link = { studyId, label: "", expiresAt: null, frozenRevision: null };
  expect(await createShareLink(db, group.reader, link)).toEqual({ status: "forbidden" });
  expect(await revokeShareLink(db, group.reader, id)).toEqual({ status: "forbidden" });
  expect(await listShareLinks(db, group.reader, studyId)).toHaveLength(1);
  expect(await createShareLink(db, other.lead, link)).toEqual({ status: "not-found" });
  expect(await revokeShareLink(db, other.lead, id)).toEqual({ status: "not-found" });
  expect(await listShareLinks(db, other.lead, studyId)).toEqual([]);
  expect(await openShareLink(db, token)).toBeDefined();
});

test("a link that would be over already, or shows a revision that never was, is refused", async () => {
  const { db } = temporary;
  const link = { studyId, label: "", expiresAt: new Date(Date.now() - 1), frozenRevision: null };
  expect(await createShareLink(db, group.lead, link)).toMatchObject({ status: "refused" });
  const future = { ...link, expiresAt: null, frozenRevision: 2 };
  expect(await createShareLink(db, group.lead, future)).toMatchObject({ status: "refused" });
});

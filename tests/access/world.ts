import { randomBytes } from "node:crypto";
import { Readable } from "node:stream";
import { connect } from "@/db/connect";
import { createShareLink } from "@/db/share-link/share-link.commands";
import type { Sheet } from "@/db/sheet/sheet.schema";
import { changeStudy } from "@/db/study/change-study";
import { readStudy } from "@/db/study/study.queries";
import { makeGroup, TEST_PASSWORD } from "@/db/testing/make-group";
import { exampleRun, exampleSetUp, makeStudy } from "@/db/testing/make-study";
import { writeTrace } from "@/db/trace/write-trace";
import { receiveUpload } from "@/db/upload/receive-upload";
import { browserRun } from "../browser-run";
import { Visitor } from "./visitor";

/**
 * Two groups on the running server. The study belongs to one, the outsider leads the other; whatever the study holds
 * carries a marker that no other text on the server contains.
 */
export interface World {
  readonly studyId: string;
  readonly revision: number;
  /** As the members of its group see it at `revision`. */
  readonly sheet: Sheet;
  readonly runId: string;
  readonly linkId: string;
  readonly linkToken: string;
  /** A file that waits for its preview. */
  readonly uploadId: string;
  readonly groupId: string;
  readonly memberId: string;
  readonly marker: string;
  /** The domain of the outsider's group: lead@, analyst@ and reader@ have TEST_PASSWORD. */
  readonly outside: string;
  readonly insider: Visitor;
  readonly outsider: Visitor;
  readonly signedOut: Visitor;
  /** A session of a colleague of the outsider, for calls that end the sessions of an account. */
  readonly passingOutsider: () => Promise<Visitor>;
}

/** @param file keeps the worlds of several test files on one server apart; lower case. */
export async function makeWorld(file: string): Promise<World> {
  const { databaseFile, origin } = browserRun();
  // Playwright makes the world of a file anew after a failed test.
  const name = `${file}-${randomBytes(3).toString("hex")}`;
  const db = connect(databaseFile);
  const marker = `marker-${name}-8c41`;
  const theirs = await makeGroup(db, `${marker}.example`);
  const outside = `outside-${name}.example`;
  await makeGroup(db, outside);
  const studyId = await makeStudy(db, theirs.lead, exampleSetUp(`Study ${marker}`));
  const study = await readStudy(db, theirs.lead, studyId);
  const trace = { timeSeconds: Float64Array.of(0, 1, 2, 3), signal: Float64Array.of(0.1, 0.2, 0.3, 0.4) };
  const sha256 = await db.transaction().execute((trx) => writeTrace(trx, trace));
  const run = exampleRun(`R ${marker}`, {
    id: `run-${name}`,
    remark: `Remark ${marker}`,
    enteredRate: null,
    trace: { sha256, points: trace.signal.length, uploadId: null, column: `Column ${marker}` },
  });
  const changed = await changeStudy(
    db,
    theirs.lead,
    { studyId, base: study?.revision ?? 0 },
    { verb: "added", summary: `Added a run ${marker}.` },
    (sheet) => ({ ...sheet, runs: [run] }),
  );
  const link = await createShareLink(db, theirs.lead, {
    studyId,
    label: `Link ${marker}`,
    expiresAt: null,
    frozenRevision: null,
  });
  const upload = await receiveUpload(
    db,
    theirs.lead,
    { studyId, fileName: `${marker}.csv`, declaredBytes: null },
    Readable.from([Buffer.from(`t / s,${marker}\n0,0.1\n1,0.2\n2,0.3\n`)]),
  );
  const filled = await readStudy(db, theirs.lead, studyId);
  await db.destroy();
  if (
    changed.status !== "changed" ||
    link.status !== "created" ||
    upload.status !== "received" ||
    filled === undefined
  ) {
    throw new Error(
      `The study of the other group could not be filled: ${changed.status}, ${link.status}, ${upload.status}`,
    );
  }
  return {
    studyId,
    revision: changed.revision,
    sheet: filled.sheet,
    runId: run.id,
    linkId: link.id,
    linkToken: link.token,
    uploadId: upload.uploadId,
    groupId: theirs.groupId,
    memberId: theirs.lead.memberId,
    marker,
    outside,
    insider: await signedIn(origin, `lead@${marker}.example`),
    outsider: await signedIn(origin, `lead@${outside}`),
    signedOut: new Visitor(origin),
    passingOutsider: () => signedIn(origin, `analyst@${outside}`),
  };
}

async function signedIn(origin: string, email: string): Promise<Visitor> {
  const visitor = new Visitor(origin);
  const { status, refusal } = await visitor.signIn(email, TEST_PASSWORD);
  if (status !== 200) {
    throw new Error(`${email} could not sign in: ${status} ${refusal}`);
  }
  return visitor;
}

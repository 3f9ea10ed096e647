import { z } from "zod";
import { moment } from "../column";
import type { Handle } from "../database";
import type { Actor } from "../member/actor";
import { readRevisionSheet } from "../revision/revision.queries";
import { secretHash } from "../secret";
import { readSheet } from "../sheet/read-sheet";
import type { Sheet } from "../sheet/sheet.schema";
import { shareLinkRow } from "./share-link.table";

const shareLinkLine = shareLinkRow.pick({ id: true, label: true }).extend({
  frozenRevision: shareLinkRow.shape.frozen_revision,
  createdAt: moment,
  expiresAt: moment.nullable(),
  revokedAt: moment.nullable(),
  lastRequestedAt: moment.nullable(),
  requests: z.number(),
  madeBy: z.string(),
});

/** `madeBy` are initials. */
export type ShareLinkLine = z.infer<typeof shareLinkLine>;

/** The links to a study, newest first, revoked ones too; nothing for an outsider. */
export async function listShareLinks(db: Handle, actor: Actor, studyId: string): Promise<ShareLinkLine[]> {
  const rows = await db
    .selectFrom("share_link")
    .innerJoin("study", "study.id", "share_link.study_id")
    .innerJoin("member", "member.id", "share_link.member_id")
    .innerJoin("account", "account.id", "member.account_id")
    .select([
      "share_link.id",
      "share_link.label",
      "share_link.frozen_revision as frozenRevision",
      "share_link.created_at as createdAt",
      "share_link.expires_at as expiresAt",
      "share_link.revoked_at as revokedAt",
      "share_link.last_requested_at as lastRequestedAt",
      "share_link.requests",
      "account.initials as madeBy",
    ])
    .where("share_link.study_id", "=", studyId)
    .where("study.group_id", "=", actor.groupId)
    .orderBy("share_link.created_at", "desc")
    .execute();
  return rows.map((row) => shareLinkLine.parse(row));
}

/** What a link shows to whoever holds it: the sheet and no names of people. */
export interface SharedStudy {
  readonly linkId: string;
  readonly studyId: string;
  /** Of the study within its group. */
  readonly number: number;
  readonly name: string;
  readonly groupName: string;
  readonly sheet: Sheet;
  /** The revision that `sheet` is. */
  readonly revision: number;
  /** Null where the link follows the study. */
  readonly frozenRevision: number | null;
  readonly updatedAt: string;
  readonly expiresAt: string | null;
}

/**
 * The study behind a link's token. Unknown, expired and revoked tokens are the same undefined. Counts the request:
 * mail scanners follow links too, so it is shown as 'last requested' and never as 'opened'.
 */
export async function openShareLink(
  db: Handle,
  token: string,
  now = new Date(),
): Promise<SharedStudy | undefined> {
  const shared = db.isTransaction
    ? await findShared(db, token, now)
    : await db
        .transaction()
        .setAccessMode("read only")
        .execute((trx) => findShared(trx, token, now));
  if (shared === undefined) return undefined;
  await db
    .updateTable("share_link")
    .set((eb) => ({ last_requested_at: now.toISOString(), requests: eb("requests", "+", 1) }))
    .where("id", "=", shared.linkId)
    .execute();
  return shared;
}

async function findShared(db: Handle, token: string, now: Date): Promise<SharedStudy | undefined> {
  const row = await db
    .selectFrom("share_link")
    .innerJoin("study", "study.id", "share_link.study_id")
    .innerJoin("research_group", "research_group.id", "study.group_id")
    .select([
      "share_link.id as linkId",
      "share_link.study_id as studyId",
      "share_link.frozen_revision as frozenRevision",
      "share_link.expires_at as expiresAt",
      "study.number",
      "study.revision as latest",
      "study.updated_at as updatedAt",
      "research_group.name as groupName",
    ])
    .where("share_link.token_hash", "=", secretHash(token))
    .where("share_link.revoked_at", "is", null)
    .where((eb) =>
      eb.or([eb("share_link.expires_at", "is", null), eb("share_link.expires_at", ">", now.toISOString())]),
    )
    .executeTakeFirst();
  if (row === undefined) return undefined;
  const { latest, frozenRevision, ...rest } = row;
  const sheet =
    frozenRevision === null
      ? await readSheet(db, row.studyId)
      : await readRevisionSheet(db, row.studyId, frozenRevision);
  if (sheet === undefined) throw new Error(`Link ${row.linkId} shows a revision that is not kept.`);
  return {
    ...rest,
    name: sheet.study.name,
    sheet,
    revision: frozenRevision ?? latest,
    frozenRevision,
  };
}

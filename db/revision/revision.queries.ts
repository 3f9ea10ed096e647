import { z } from "zod";
import { bytes, moment, sha256Column } from "../column";
import type { Handle } from "../database";
import type { Actor } from "../member/actor";
import type { Sheet } from "../sheet/sheet.schema";
import { unpackSheet } from "./packed-sheet";

const revisionSummary = z.object({
  number: z.number(),
  verb: z.string(),
  summary: z.string(),
  at: moment,
  memberId: z.string().nullable(),
  name: z.string().nullable(),
  initials: z.string().nullable(),
  sheetHash: sha256Column,
  hash: sha256Column,
});

/** One line of a study's history; `name` is null for what the program did by itself. */
export type RevisionSummary = z.infer<typeof revisionSummary>;

/** The history of a study, newest first; empty for an outsider. */
export async function listRevisions(db: Handle, actor: Actor, studyId: string): Promise<RevisionSummary[]> {
  const rows = await db
    .selectFrom("audit_entry")
    .innerJoin("study", "study.id", "audit_entry.study_id")
    .leftJoin("member", "member.id", "audit_entry.member_id")
    .leftJoin("account", "account.id", "member.account_id")
    .select([
      "audit_entry.revision as number",
      "audit_entry.verb",
      "audit_entry.summary",
      "audit_entry.at",
      "audit_entry.member_id as memberId",
      "account.name",
      "account.initials",
      "audit_entry.sheet_hash as sheetHash",
      "audit_entry.hash",
    ])
    .where("audit_entry.study_id", "=", studyId)
    .where("audit_entry.revision", "is not", null)
    .where("study.group_id", "=", actor.groupId)
    .orderBy("audit_entry.revision", "desc")
    .execute();
  return rows.map((row) => revisionSummary.parse(row));
}

/**
 * The sheet as it was at revision `number`; undefined where there is none. Decides nothing about who may see it: for
 * changes, undo, frozen links and verification, which have done so.
 */
export async function readRevisionSheet(
  db: Handle,
  studyId: string,
  number: number,
): Promise<Sheet | undefined> {
  const row = await db
    .selectFrom("revision")
    .select("sheet")
    .where("study_id", "=", studyId)
    .where("number", "=", number)
    .executeTakeFirst();
  return row === undefined ? undefined : unpackSheet(bytes.parse(row.sheet)).sheet;
}

import { z } from "zod";
import { moment } from "../column";
import type { Handle } from "../database";
import type { Actor } from "../member/actor";

const entry = z.object({ studyId: z.string(), initials: z.string(), at: moment });

export interface LastEntry {
  readonly at: string;
  /** Initials of those who changed the study, latest first. */
  readonly by: readonly string[];
}

/** When the group's studies were last changed and by whom, by study id. */
export async function lastEntries(db: Handle, actor: Actor): Promise<ReadonlyMap<string, LastEntry>> {
  const rows = await db
    .selectFrom("audit_entry")
    .innerJoin("study", "study.id", "audit_entry.study_id")
    .innerJoin("member", "member.id", "audit_entry.member_id")
    .innerJoin("account", "account.id", "member.account_id")
    .select((eb) => ["study.id as studyId", "account.initials", eb.fn.max("audit_entry.at").as("at")])
    .where("study.group_id", "=", actor.groupId)
    .where("audit_entry.revision", "is not", null)
    .groupBy(["study.id", "member.id"])
    .execute();
  const entries = rows
    .map((row) => entry.parse(row))
    .sort((a, b) => (a.at < b.at ? 1 : a.at > b.at ? -1 : 0));
  const byStudy = new Map<string, LastEntry>();
  for (const { studyId, initials, at } of entries) {
    const known = byStudy.get(studyId);
    byStudy.set(studyId, { at: known?.at ?? at, by: [...(known?.by ?? []), initials] });
  }
  return byStudy;
}

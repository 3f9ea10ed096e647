import { z } from "zod";
import type { Handle } from "../database";
import type { Actor } from "../member/actor";

const latestRevision = z.object({
  revision: z.number(),
  summary: z.string(),
  /** Whoever asks made this revision, here or in another window. */
  mine: z.boolean(),
  /** Null for what the program did by itself. */
  name: z.string().nullable(),
});

export type LatestRevision = z.infer<typeof latestRevision>;

/** The newest revision of a study and who made it, one small row for pages that watch; undefined for an outsider. */
export async function readLatestRevision(
  db: Handle,
  actor: Actor,
  studyId: string,
): Promise<LatestRevision | undefined> {
  const row = await db
    .selectFrom("study")
    .innerJoin("audit_entry", (join) =>
      join
        .onRef("audit_entry.study_id", "=", "study.id")
        .onRef("audit_entry.revision", "=", "study.revision"),
    )
    .leftJoin("member", "member.id", "audit_entry.member_id")
    .leftJoin("account", "account.id", "member.account_id")
    .select(["study.revision", "audit_entry.summary", "audit_entry.member_id as memberId", "account.name"])
    .where("study.id", "=", studyId)
    .where("study.group_id", "=", actor.groupId)
    .executeTakeFirst();
  if (row === undefined) return undefined;
  const { memberId, ...rest } = row;
  return latestRevision.parse({ ...rest, mine: memberId === actor.memberId });
}

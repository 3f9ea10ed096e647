import type { Transaction } from "kysely";
import type { Database } from "../database";
import type { Actor } from "../member/actor";
import { readRevisionSheet } from "../revision/revision.queries";
import { rowsOf, sameRow } from "../sheet/sheet-rows";

/**
 * Who changed any of these rows after revision `base`, for the sentence of a conflict: "you, in another window" or
 * initials. Reads the snapshots between; conflicts are rare.
 */
export async function whoChanged(
  trx: Transaction<Database>,
  actor: Actor,
  { studyId, base }: { studyId: string; base: number },
  keys: readonly string[],
): Promise<string> {
  const entries = await trx
    .selectFrom("audit_entry")
    .leftJoin("member", "member.id", "audit_entry.member_id")
    .leftJoin("account", "account.id", "member.account_id")
    .select(["audit_entry.revision", "audit_entry.member_id", "account.initials"])
    .where("audit_entry.study_id", "=", studyId)
    .where("audit_entry.revision", ">", base)
    .orderBy("audit_entry.revision")
    .execute();
  const who = new Set<string>();
  let before = await readRevisionSheet(trx, studyId, base);
  for (const entry of entries) {
    const after = await readRevisionSheet(trx, studyId, entry.revision ?? base);
    if (before !== undefined && after !== undefined) {
      const [from, to] = [rowsOf(before), rowsOf(after)];
      if (keys.some((key) => !sameRow(key, from, to))) {
        who.add(
          entry.member_id === actor.memberId ? "you, in another window" : (entry.initials ?? "the program"),
        );
      }
    }
    before = after;
  }
  return [...who].join(" and ");
}

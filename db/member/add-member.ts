import type { Transaction } from "kysely";
import { appendEntry } from "../audit/append-entry";
import type { Database } from "../database";
import { newIdentifier } from "../identifier";
import type { Role } from "./member.table";

/** Makes the account a member of the group and gives the member's id. `by` is null for the installation itself. */
export async function addMember(
  trx: Transaction<Database>,
  member: { groupId: string; accountId: string; role: Role },
  by: string | null,
): Promise<string> {
  const id = newIdentifier();
  const at = new Date().toISOString();
  await trx
    .insertInto("member")
    .values({
      id,
      group_id: member.groupId,
      account_id: member.accountId,
      role: member.role,
      joined_at: at,
      removed_at: null,
    })
    .execute();
  await appendEntry(trx, {
    groupId: member.groupId,
    memberId: by,
    verb: "member added",
    summary: `Member ${id} joined as ${member.role}.`,
    at,
  });
  return id;
}

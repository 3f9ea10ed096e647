import { z } from "zod";
import type { Handle } from "../database";
import { role } from "../member/member.table";

const accountLine = z.object({
  accountId: z.string(),
  memberId: z.string(),
  email: z.string(),
  name: z.string(),
  role,
  groupName: z.string(),
});

export type AccountLine = z.infer<typeof accountLine>;

/** Every account with its group, for whoever runs the installation; never for a page. */
export async function listAccounts(db: Handle): Promise<AccountLine[]> {
  const rows = await db
    .selectFrom("account")
    .innerJoin("member", "member.account_id", "account.id")
    .innerJoin("research_group", "research_group.id", "member.group_id")
    .select([
      "account.id as accountId",
      "member.id as memberId",
      "account.email",
      "account.name",
      "member.role",
      "research_group.name as groupName",
    ])
    .where("member.removed_at", "is", null)
    .orderBy("account.email")
    .execute();
  return rows.map((row) => accountLine.parse(row));
}

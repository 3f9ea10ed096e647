import type { Handle } from "../database";
import { type Actor, actor } from "./actor";

function presentMembers(db: Handle) {
  return db
    .selectFrom("member")
    .innerJoin("account", "account.id", "member.account_id")
    .select([
      "member.id as memberId",
      "member.account_id as accountId",
      "member.group_id as groupId",
      "member.role",
      "account.name",
      "account.initials",
    ])
    .where("member.removed_at", "is", null);
}

/** Who the account is in its group. An account belongs to one group for now: the one it joined first counts. */
export async function actorOfAccount(db: Handle, accountId: string): Promise<Actor | undefined> {
  const row = await presentMembers(db)
    .where("member.account_id", "=", accountId)
    .orderBy("member.joined_at")
    .limit(1)
    .executeTakeFirst();
  return row === undefined ? undefined : actor.parse(row);
}

export async function actorOfMember(db: Handle, memberId: string): Promise<Actor | undefined> {
  const row = await presentMembers(db).where("member.id", "=", memberId).executeTakeFirst();
  return row === undefined ? undefined : actor.parse(row);
}

/** Everybody who is or was in the actor's group, by member id: for initials beside a reason or a revision. */
export async function listMembers(db: Handle, asking: Actor): Promise<Map<string, Actor>> {
  const rows = await db
    .selectFrom("member")
    .innerJoin("account", "account.id", "member.account_id")
    .select([
      "member.id as memberId",
      "member.account_id as accountId",
      "member.group_id as groupId",
      "member.role",
      "account.name",
      "account.initials",
    ])
    .where("member.group_id", "=", asking.groupId)
    .execute();
  return new Map(rows.map((row) => [row.memberId, actor.parse(row)]));
}

import type { Handle } from "../database";
import type { Actor } from "../member/actor";
import { actorOfMember } from "../member/member.queries";
import { secretHash } from "../secret";
import { personalTokenRow, type TokenScope } from "./token.table";

/** `last_used_at` is written at most this often. */
const USED_EVERY_SECONDS = 60;

/** Who calls with this token and what it lets them do; undefined for one that is unknown, expired or revoked. */
export async function actorOfToken(
  db: Handle,
  token: string,
  now = new Date(),
): Promise<{ actor: Actor; scope: TokenScope } | undefined> {
  const row = await db
    .selectFrom("personal_token")
    .selectAll()
    .where("token_hash", "=", secretHash(token))
    .executeTakeFirst();
  if (row === undefined) return undefined;
  const found = personalTokenRow.parse(row);
  if (found.revoked_at !== null) return undefined;
  if (found.expires_at !== null && now.getTime() >= Date.parse(found.expires_at)) return undefined;
  const actor = await actorOfMember(db, found.member_id);
  if (actor === undefined) return undefined;
  const lastUsed = found.last_used_at === null ? 0 : Date.parse(found.last_used_at);
  if (now.getTime() - lastUsed >= USED_EVERY_SECONDS * 1000) {
    await db
      .updateTable("personal_token")
      .set({ last_used_at: now.toISOString() })
      .where("id", "=", found.id)
      .execute();
  }
  return { actor, scope: found.scope };
}

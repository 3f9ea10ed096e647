import type { Kysely } from "kysely";
import { appendEntry } from "../audit/append-entry";
import type { Database } from "../database";
import { newIdentifier } from "../identifier";
import type { Actor } from "../member/actor";
import { newSecret } from "../secret";
import type { TokenScope } from "./token.table";

/**
 * A personal token for scripts. It acts as its owner and never with more than `scope`. The token itself is in the
 * answer and nowhere else.
 */
export async function createToken(
  db: Kysely<Database>,
  actor: Actor,
  token: { name: string; scope: TokenScope; expiresAt: Date | null },
): Promise<{ id: string; token: string }> {
  const { secret, hash } = newSecret();
  const id = newIdentifier();
  const at = new Date().toISOString();
  await db.transaction().execute(async (trx) => {
    await trx
      .insertInto("personal_token")
      .values({
        id,
        member_id: actor.memberId,
        name: token.name,
        token_hash: hash,
        scope: token.scope,
        created_at: at,
        expires_at: token.expiresAt?.toISOString() ?? null,
        last_used_at: null,
        revoked_at: null,
      })
      .execute();
    await appendEntry(trx, {
      groupId: actor.groupId,
      memberId: actor.memberId,
      verb: "token made",
      summary: `Personal token ${id} made, to ${token.scope}.`,
      at,
    });
  });
  return { id, token: secret };
}

/** Ends a token of the actor's own; false where there is none that is still good. */
export async function revokeToken(db: Kysely<Database>, actor: Actor, tokenId: string): Promise<boolean> {
  const at = new Date().toISOString();
  return db.transaction().execute(async (trx) => {
    const { numUpdatedRows } = await trx
      .updateTable("personal_token")
      .set({ revoked_at: at })
      .where("id", "=", tokenId)
      .where("member_id", "=", actor.memberId)
      .where("revoked_at", "is", null)
      .executeTakeFirst();
    if (numUpdatedRows === 0n) return false;
    await appendEntry(trx, {
      groupId: actor.groupId,
      memberId: actor.memberId,
      verb: "token revoked",
      summary: `Personal token ${tokenId} revoked.`,
      at,
    });
    return true;
  });
}

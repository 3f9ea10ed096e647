import type { Handle } from "../database";
import { newSecret, secretHash } from "../secret";

/** A working day away from the bench ends a session; a week ends it in any case. */
export const SESSION_LIMITS = { idleSeconds: 8 * 3600, absoluteSeconds: 7 * 24 * 3600 } as const;

/** Starts a session and gives its secret, which only the cookie keeps. */
export async function startSession(db: Handle, accountId: string, now = new Date()): Promise<string> {
  const { secret, hash } = newSecret();
  await db
    .insertInto("session")
    .values({
      token_hash: hash,
      account_id: accountId,
      created_at: now.toISOString(),
      last_seen_at: now.toISOString(),
      idle_seconds: SESSION_LIMITS.idleSeconds,
      expires_at: new Date(now.getTime() + SESSION_LIMITS.absoluteSeconds * 1000).toISOString(),
      ended_at: null,
    })
    .execute();
  return secret;
}

export async function endSession(db: Handle, secret: string, now = new Date()): Promise<void> {
  await db
    .updateTable("session")
    .set({ ended_at: now.toISOString() })
    .where("token_hash", "=", secretHash(secret))
    .where("ended_at", "is", null)
    .execute();
}

/** Signs the account out everywhere, from the next request on. */
export async function endAllSessions(db: Handle, accountId: string, now = new Date()): Promise<void> {
  await db
    .updateTable("session")
    .set({ ended_at: now.toISOString() })
    .where("account_id", "=", accountId)
    .where("ended_at", "is", null)
    .execute();
}

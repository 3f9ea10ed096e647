import type { Handle } from "../database";
import type { Actor } from "../member/actor";
import { actorOfAccount } from "../member/member.queries";
import { secretHash } from "../secret";
import { type SessionTable, sessionRow } from "./session.table";

/** `last_seen_at` is written at most this often: a page view should not cost a write. */
const SEEN_EVERY_SECONDS = 60;

/**
 * Who holds this session, asked anew on every request: a changed role, a removed member and a sign-out everywhere
 * act on the next one. Undefined for a session that is unknown, ended, idle for too long or past its limit.
 */
export async function actorOfSession(
  db: Handle,
  secret: string,
  now = new Date(),
): Promise<Actor | undefined> {
  const row = await db
    .selectFrom("session")
    .selectAll()
    .where("token_hash", "=", secretHash(secret))
    .executeTakeFirst();
  if (row === undefined) return undefined;
  const session = sessionRow.parse(row);
  if (!isLive(session, now)) return undefined;
  if (secondsSince(session.last_seen_at, now) >= SEEN_EVERY_SECONDS) {
    await db
      .updateTable("session")
      .set({ last_seen_at: now.toISOString() })
      .where("token_hash", "=", session.token_hash)
      .execute();
  }
  return actorOfAccount(db, session.account_id);
}

function isLive(session: SessionTable, now: Date): boolean {
  return (
    session.ended_at === null &&
    secondsSince(session.last_seen_at, now) < session.idle_seconds &&
    now.getTime() < Date.parse(session.expires_at)
  );
}

function secondsSince(moment: string, now: Date): number {
  return (now.getTime() - Date.parse(moment)) / 1000;
}

import "server-only";
import path from "node:path";
import { RateLimiterRes, RateLimiterSQLite } from "rate-limiter-flexible";
import { openFile } from "@/db/connect";
import { env } from "./env";

declare global {
  // One set of counters for all bundles, as for the database.
  var ratewrightLimiters: Limiters | undefined;
}

interface Limiters {
  readonly signIn: RateLimiterSQLite;
  readonly api: RateLimiterSQLite;
}

/** Counted by account (the address typed, the member), never by network address, which a proxy may hide. */
export type LimitName = keyof Limiters;

const SIGN_IN_ATTEMPTS = { points: 10, duration: 15 * 60 };
/** Fifty a second: far above what open pages ask, so that only a script gone wild meets it. */
const API_CALLS = { points: 3000, duration: 60 };

/**
 * Takes one from what `key` may still do.
 *
 * @returns null, or the seconds to wait where nothing is left.
 */
export async function takeFromLimit(name: LimitName, key: string): Promise<number | null> {
  try {
    await limiters()[name].consume(key);
    return null;
  } catch (refusal) {
    if (refusal instanceof RateLimiterRes) {
      return Math.max(1, Math.ceil(refusal.msBeforeNext / 1000));
    }
    throw refusal;
  }
}

/** Starts anew for `key`, after a sign-in that succeeded. */
export async function resetLimit(name: LimitName, key: string): Promise<void> {
  await limiters()[name].delete(key);
}

function limiters(): Limiters {
  globalThis.ratewrightLimiters ??= openLimiters();
  return globalThis.ratewrightLimiters;
}

/**
 * The counters have a file of their own. They outlive a restart, yet a second connection to the database, in the
 * same thread, would wait in vain for a transaction that is open between two awaits; on the first connection a count
 * would be rolled back with it. Losing them loses no work, so they are not synced.
 */
function openLimiters(): Limiters {
  const file = path.join(path.dirname(env.databaseFile), "rate-limits.sqlite");
  const connection = openFile(file);
  connection.pragma("synchronous = OFF");
  connection.exec(
    "create table if not exists attempts (key text primary key, points integer not null default 0, expire integer)",
  );
  const open = (keyPrefix: string, limit: { points: number; duration: number }) =>
    new RateLimiterSQLite({
      storeClient: connection,
      storeType: "better-sqlite3",
      tableName: "attempts",
      tableCreated: true,
      clearExpiredByTimeout: true,
      keyPrefix,
      ...limit,
    });
  return { signIn: open("sign-in", SIGN_IN_ATTEMPTS), api: open("api", API_CALLS) };
}

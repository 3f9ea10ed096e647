import { database } from "./app/_server/database";
import { env } from "./app/_server/env";
import { pruneAnalyses } from "./db/analysis/prune-analyses";
import { hasInventedGroup } from "./db/group/group.queries";
import { migrateToLatest } from "./db/migrate-to-latest";
import { dropLeftovers } from "./db/upload/drop-leftovers";

/** What computed results may take up between starts; they are made again when asked for. */
const ANALYSES_KEPT_BYTES = 256 * 1024 ** 2;

/** Before the first request: the tables are brought up to date and what a crash left half-done is dropped. */
export async function onStart(): Promise<void> {
  const db = database();
  await migrateToLatest(db);
  if (!env.isLoopback && (await hasInventedGroup(db))) {
    throw new Error(
      `${env.databaseFile} holds the demo group, whose accounts are for one machine only. With PUBLIC_URL set, name another file in DATABASE_FILE.`,
    );
  }
  await dropLeftovers(db);
  await pruneAnalyses(db, ANALYSES_KEPT_BYTES);
}

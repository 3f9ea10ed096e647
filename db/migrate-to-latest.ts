import { type Kysely, Migrator } from "kysely";
import { migrations } from "../migrations";
import type { Database } from "./database";

/** Brings the tables up to date, each migration in a transaction of its own; throws at the first that fails. */
export async function migrateToLatest(db: Kysely<Database>): Promise<string[]> {
  const migrator = new Migrator({
    db,
    provider: { getMigrations: () => Promise.resolve({ ...migrations }) },
  });
  const { error, results } = await migrator.migrateToLatest();
  if (error !== undefined) throw error;
  return (results ?? []).map((result) => result.migrationName);
}

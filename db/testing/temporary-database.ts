import { mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import type { Kysely } from "kysely";
import { connect } from "../connect";
import type { Database } from "../database";
import { migrateToLatest } from "../migrate-to-latest";

export interface TemporaryDatabase {
  readonly db: Kysely<Database>;
  readonly file: string;
  /** Closes the handle and removes the file. */
  close(): Promise<void>;
}

/** A real SQLite file of its own with all migrations, for one test file. */
export async function temporaryDatabase(): Promise<TemporaryDatabase> {
  const folder = mkdtempSync(path.join(tmpdir(), "ratewright-"));
  const file = path.join(folder, "test.sqlite");
  const db = connect(file);
  await migrateToLatest(db);
  return {
    db,
    file,
    async close() {
      await db.destroy();
      rmSync(folder, { recursive: true, force: true });
    },
  };
}

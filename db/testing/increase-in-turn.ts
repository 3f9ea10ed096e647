import { fileURLToPath } from "node:url";
import { type Kysely, sql } from "kysely";
import { connect } from "../connect";
import type { Database } from "../database";

/** A table with one counter, for tests of connections only. */
export interface Tally {
  readonly count: number;
}

type DatabaseWithTally = Database & { tally: Tally };

export async function withTally(db: Kysely<Database>): Promise<Kysely<DatabaseWithTally>> {
  await sql`create table if not exists tally (count integer not null)`.execute(db);
  return db.withTables<{ tally: Tally }>();
}

/** Reads a counter and writes it back one higher, each time in a transaction, as a second process beside a first. */
export async function increaseInTurn(db: Kysely<DatabaseWithTally>, times: number): Promise<void> {
  for (let done = 0; done < times; done++) {
    await db.transaction().execute(async (trx) => {
      const row = await trx.selectFrom("tally").select("count").executeTakeFirstOrThrow();
      await trx
        .updateTable("tally")
        .set({ count: row.count + 1 })
        .execute();
    });
  }
}

// Run as a script: database file, how often.
if (process.argv[1] === fileURLToPath(import.meta.url)) {
  const [file = "", times = "0"] = process.argv.slice(2);
  const db = connect(file);
  await increaseInTurn(await withTally(db), Number(times));
  await db.destroy();
}

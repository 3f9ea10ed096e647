import { fileURLToPath } from "node:url";
import type { Kysely } from "kysely";
import { connect } from "../connect";
import type { Database } from "../database";

/** Reads a counter and writes it back one higher, each time in a transaction, as a second process beside a first. */
export async function increaseInTurn(db: Kysely<Database>, times: number): Promise<void> {
  for (let done = 0; done < times; done++) {
    await db.transaction().execute(async (trx) => {
      const row = await trx.selectFrom("sign_in_limit").select("points").executeTakeFirstOrThrow();
      await trx
        .updateTable("sign_in_limit")
        .set({ points: row.points + 1 })
        .execute();
    });
  }
}

// Run as a script: database file, how often.
if (process.argv[1] === fileURLToPath(import.meta.url)) {
  const [file = "", times = "0"] = process.argv.slice(2);
  const db = connect(file);
  await increaseInTurn(db, Number(times));
  await db.destroy();
}

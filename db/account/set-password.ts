import type { Kysely } from "kysely";
import type { Database } from "../database";
import { endAllSessions } from "../session/session.commands";
import { hashPassword } from "./password";

/** Sets a new password and ends every session of the account: whoever had the old one is out. */
export async function setPassword(db: Kysely<Database>, accountId: string, password: string): Promise<void> {
  const passwordHash = await hashPassword(password);
  await db.transaction().execute(async (trx) => {
    await trx
      .updateTable("account")
      .set({ password_hash: passwordHash })
      .where("id", "=", accountId)
      .execute();
    await endAllSessions(trx, accountId);
  });
}

import type { Handle } from "../database";
import { normalEmail } from "./create-account";
import { hashPassword, passwordMatches } from "./password";

let decoy: Promise<string> | undefined;

/**
 * The account whose e-mail and password these are, else undefined. An unknown e-mail costs the same work as a wrong
 * password, so that the time of the answer tells nobody which accounts exist.
 */
export async function verifySignIn(
  db: Handle,
  email: string,
  password: string,
): Promise<{ accountId: string } | undefined> {
  const account = await db
    .selectFrom("account")
    .select(["id", "password_hash"])
    .where("email", "=", normalEmail(email))
    .executeTakeFirst();
  decoy ??= hashPassword("no account has this password");
  const matches = await passwordMatches(account?.password_hash ?? (await decoy), password);
  return account !== undefined && matches ? { accountId: account.id } : undefined;
}

import type { Handle } from "../database";
import { newIdentifier } from "../identifier";
import { hashPassword } from "./password";

export interface NewAccount {
  readonly email: string;
  readonly name: string;
  readonly initials: string;
  readonly password: string;
}

/** An account and its id; it belongs to no group yet. `email` must be new: the unique column throws otherwise. */
export async function createAccount(db: Handle, account: NewAccount): Promise<string> {
  // Hashing takes tens of milliseconds, which nobody who writes should wait for.
  if (db.isTransaction) throw new Error("Hash the password first and use insertAccount in a transaction.");
  return insertAccount(db, account, await hashPassword(account.password));
}

/** As `createAccount`, with a password that was hashed before: for a transaction. */
export async function insertAccount(
  db: Handle,
  account: Omit<NewAccount, "password">,
  passwordHash: string,
): Promise<string> {
  const id = newIdentifier();
  await db
    .insertInto("account")
    .values({
      id,
      email: normalEmail(account.email),
      name: account.name,
      initials: account.initials,
      password_hash: passwordHash,
      created_at: new Date().toISOString(),
    })
    .execute();
  return id;
}

export function normalEmail(email: string): string {
  return email.trim().toLowerCase();
}

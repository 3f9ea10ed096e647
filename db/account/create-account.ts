import type { Handle } from "../database";
import { newIdentifier } from "../identifier";
import { hashPassword } from "./password";

export interface NewAccount {
  readonly email: string;
  readonly name: string;
  readonly initials: string;
  readonly password: string;
}

/**
 * An account and its id; it belongs to no group yet. `email` must be new: the unique column throws otherwise.
 * Hashing takes tens of milliseconds, so call it outside a transaction.
 */
export async function createAccount(db: Handle, account: NewAccount): Promise<string> {
  const passwordHash = await hashPassword(account.password);
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

import { hash, verify } from "@node-rs/argon2";

/**
 * 19 MiB, two passes, one lane: a set of the OWASP Password Storage Cheat Sheet for argon2id, which is the
 * library's algorithm unless told otherwise (its enum cannot be imported as a type-only constant).
 */
const settings = { memoryCost: 19_456, timeCost: 2, parallelism: 1 };

export function hashPassword(password: string): Promise<string> {
  return hash(password, settings);
}

/** Takes as long for a wrong password as for the right one; throws where `passwordHash` is no such hash. */
export function passwordMatches(passwordHash: string, password: string): Promise<boolean> {
  return verify(passwordHash, password);
}

import { randomBytes } from "node:crypto";
import { sha256Of } from "./canonical-json";

/**
 * A secret of 256 bits for a link, a token or a session, safe in an address. It is shown once; the database keeps
 * its SHA-256 only. A plain hash is enough: a random secret of this length cannot be guessed from it.
 */
export function newSecret(): { secret: string; hash: string } {
  const secret = randomBytes(32).toString("base64url");
  return { secret, hash: secretHash(secret) };
}

export function secretHash(secret: string): string {
  return sha256Of(secret);
}

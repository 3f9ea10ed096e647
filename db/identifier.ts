import { randomBytes } from "node:crypto";

/** A random id of 120 bits, safe in an address. Never counted up: an id tells nothing about other rows. */
export function newIdentifier(): string {
  return randomBytes(15).toString("base64url");
}

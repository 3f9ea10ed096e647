import { createHash } from "node:crypto";

/**
 * JSON with the keys of every object in code-unit order, so that equal contents give equal text and equal hashes.
 * Numbers are written as ECMAScript writes them (the shortest text that reads back to the same double).
 */
export function canonicalJson(value: unknown): string {
  return JSON.stringify(value, (_key, member: unknown) =>
    member !== null && typeof member === "object" && !Array.isArray(member)
      ? Object.fromEntries(Object.entries(member).sort(([a], [b]) => (a < b ? -1 : 1)))
      : member,
  );
}

/** SHA-256 in hexadecimal of text (as UTF-8) or bytes. */
export function sha256Of(content: string | Uint8Array): string {
  return createHash("sha256").update(content).digest("hex");
}

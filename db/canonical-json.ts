import { createHash } from "node:crypto";

/**
 * JSON with the keys of every object in code-unit order, so that equal contents give equal text and equal hashes.
 * Numbers are written as ECMAScript writes them (the shortest text that reads back to the same double); what JSON
 * has no word for (NaN, infinities, undefined in a list) throws. Undefined members are left out.
 */
export function canonicalJson(value: unknown): string {
  if (typeof value === "number" && !Number.isFinite(value)) {
    throw new Error(`${value} has no form in JSON.`);
  }
  if (value === null || typeof value !== "object") {
    const text = JSON.stringify(value);
    if (text === undefined) throw new Error(`A value of type ${typeof value} has no form in JSON.`);
    return text;
  }
  if (Array.isArray(value)) return `[${value.map(canonicalJson).join(",")}]`;
  const members = Object.entries(value)
    .filter(([, member]) => member !== undefined)
    .sort(([a], [b]) => (a < b ? -1 : 1))
    .map(([key, member]) => `${JSON.stringify(key)}:${canonicalJson(member)}`);
  return `{${members.join(",")}}`;
}

/** SHA-256 in hexadecimal of text (as UTF-8) or bytes. */
export function sha256Of(content: string | Uint8Array): string {
  return createHash("sha256").update(content).digest("hex");
}

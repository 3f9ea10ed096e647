import { z } from "zod";

/** Column types that SQLite has no word for. */
export const flag = z.union([z.literal(0), z.literal(1)]);
export const sha256Column = z.string().regex(/^[0-9a-f]{64}$/);
/** ISO 8601 in UTC, as `Date.toISOString` writes it, so that text order is time order. */
export const moment = z.iso.datetime();
export const bytes = z.custom<Uint8Array>((value) => value instanceof Uint8Array, "expected bytes");

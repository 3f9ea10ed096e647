import type { Kysely } from "kysely";
import type { Database, Handle } from "../database";
import { type Actor, mayActAs } from "../member/actor";
import { importLayoutRow } from "./import-layout.table";

export interface RememberedLayout {
  /** Parsed JSON; the reader of files knows its shape. */
  readonly corrections: unknown;
  readonly fileName: string;
  readonly at: string;
}

/** Keeps how files of this heading were read, for the whole group; the latest reading counts. */
export async function rememberLayout(
  db: Kysely<Database>,
  actor: Actor,
  layout: { readonly headingHash: string; readonly corrections: unknown; readonly fileName: string },
): Promise<void> {
  if (!mayActAs(actor.role, "analyst")) return;
  const row = {
    corrections: JSON.stringify(layout.corrections),
    file_name: layout.fileName,
    member_id: actor.memberId,
    at: new Date().toISOString(),
  };
  await db
    .insertInto("import_layout")
    .values({ group_id: actor.groupId, heading_hash: layout.headingHash, ...row })
    .onConflict((conflict) => conflict.columns(["group_id", "heading_hash"]).doUpdateSet(row))
    .execute();
}

/** How the actor's group read files of this heading before; undefined where it never corrected one. */
export async function recallLayout(
  db: Handle,
  actor: Actor,
  headingHash: string,
): Promise<RememberedLayout | undefined> {
  const kept = await db
    .selectFrom("import_layout")
    .selectAll()
    .where("group_id", "=", actor.groupId)
    .where("heading_hash", "=", headingHash)
    .executeTakeFirst();
  if (kept === undefined) return undefined;
  const row = importLayoutRow.parse(kept);
  const corrections: unknown = JSON.parse(row.corrections);
  return { corrections, fileName: row.file_name, at: row.at };
}

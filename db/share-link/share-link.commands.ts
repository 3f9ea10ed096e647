import type { Kysely } from "kysely";
import { appendEntry } from "../audit/append-entry";
import type { Database } from "../database";
import { newIdentifier } from "../identifier";
import { type Actor, mayActAs } from "../member/actor";
import { newSecret } from "../secret";

export interface NewShareLink {
  readonly studyId: string;
  /** For whom or what, for the list of links. */
  readonly label: string;
  readonly expiresAt: Date | null;
  /** A revision of the study to show for good, or null to follow it. */
  readonly frozenRevision: number | null;
}

export type ShareLinkResult =
  | { readonly status: "created"; readonly id: string; readonly token: string }
  | { readonly status: "refused"; readonly message: string }
  | { readonly status: "not-found" }
  | { readonly status: "forbidden" };

/**
 * A read-only link to one study, made by leads and analysts. The token, 256 bits, is in the answer and nowhere
 * else; a lost one is replaced, not looked up.
 */
export async function createShareLink(
  db: Kysely<Database>,
  actor: Actor,
  link: NewShareLink,
  now = new Date(),
): Promise<ShareLinkResult> {
  const { secret, hash } = newSecret();
  const id = newIdentifier();
  return db.transaction().execute(async (trx): Promise<ShareLinkResult> => {
    const study = await trx
      .selectFrom("study")
      .select(["revision", "number"])
      .where("id", "=", link.studyId)
      .where("group_id", "=", actor.groupId)
      .executeTakeFirst();
    if (study === undefined) return { status: "not-found" };
    if (!mayActAs(actor.role, "analyst")) return { status: "forbidden" };
    if (link.expiresAt !== null && link.expiresAt.getTime() <= now.getTime()) {
      return { status: "refused", message: "The link would have expired already. Choose a later day." };
    }
    if (
      link.frozenRevision !== null &&
      !(link.frozenRevision >= 1 && link.frozenRevision <= study.revision)
    ) {
      return {
        status: "refused",
        message: `This study has no revision ${link.frozenRevision}. Choose one up to ${study.revision}.`,
      };
    }
    const at = now.toISOString();
    await trx
      .insertInto("share_link")
      .values({
        id,
        study_id: link.studyId,
        token_hash: hash,
        label: link.label,
        frozen_revision: link.frozenRevision,
        member_id: actor.memberId,
        created_at: at,
        expires_at: link.expiresAt?.toISOString() ?? null,
        revoked_at: null,
        last_requested_at: null,
        requests: 0,
      })
      .execute();
    const shows =
      link.frozenRevision === null ? "follows the study" : `frozen at revision ${link.frozenRevision}`;
    await appendEntry(trx, {
      groupId: actor.groupId,
      memberId: actor.memberId,
      verb: "link made",
      summary: `Read-only link ${id} to study ${study.number} made, ${shows}.`,
      at,
      studyId: link.studyId,
    });
    return { status: "created", id, token: secret };
  });
}

export type RevokeResult = { readonly status: "revoked" | "not-found" | "forbidden" };

/** Ends a link at once and for good. Revoking one that is revoked already changes nothing. */
export async function revokeShareLink(
  db: Kysely<Database>,
  actor: Actor,
  linkId: string,
  now = new Date(),
): Promise<RevokeResult> {
  return db.transaction().execute(async (trx): Promise<RevokeResult> => {
    const link = await trx
      .selectFrom("share_link")
      .innerJoin("study", "study.id", "share_link.study_id")
      .select(["share_link.revoked_at", "share_link.study_id", "study.number"])
      .where("share_link.id", "=", linkId)
      .where("study.group_id", "=", actor.groupId)
      .executeTakeFirst();
    if (link === undefined) return { status: "not-found" };
    if (!mayActAs(actor.role, "analyst")) return { status: "forbidden" };
    if (link.revoked_at !== null) return { status: "revoked" };
    const at = now.toISOString();
    await trx.updateTable("share_link").set({ revoked_at: at }).where("id", "=", linkId).execute();
    await appendEntry(trx, {
      groupId: actor.groupId,
      memberId: actor.memberId,
      verb: "link revoked",
      summary: `Read-only link ${linkId} to study ${link.number} revoked.`,
      at,
      studyId: link.study_id,
    });
    return { status: "revoked" };
  });
}

import "server-only";
import { notFound } from "next/navigation";
import { cache } from "react";
import { type Actor, mayActAs } from "@/db/member/actor";
import type { Sheet } from "@/db/sheet/sheet.schema";
import { readStudy, type OpenStudy as StoredStudy } from "@/db/study/study.queries";
import { database } from "./database";
import { requireMember } from "./session";

export interface OpenStudy {
  readonly actor: Actor;
  readonly study: StoredStudy;
  readonly sheet: Sheet;
  readonly revision: number;
  /** Analysts and leads. The command decides again; this only spares readers buttons that would refuse. */
  readonly canEdit: boolean;
}

/**
 * The study of a page's address as its visitor may see it: signed out goes to sign-in, another group's study and an
 * unknown one are the same 404. Every page and layout of a study awaits this before it renders anything, once per
 * request for all of them. A layout alone guards nothing: its page renders beside it.
 */
export const openStudy = cache(async (studyId: string): Promise<OpenStudy> => {
  const actor = await requireMember();
  const study = await readStudy(database(), actor, studyId);
  if (study === undefined) {
    notFound();
  }
  return {
    actor,
    study,
    sheet: study.sheet,
    revision: study.revision,
    canEdit: mayActAs(actor.role, "analyst"),
  };
});

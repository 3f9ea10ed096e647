import "server-only";
import { revalidatePath } from "next/cache";
import { notFound } from "next/navigation";
import type { StandingLawView } from "@/app/_ui/law-view";
import { analyseStudy } from "@/app/_worksheet/analyse-study";
import { type LawSnapshot, lawEffect, lawSnapshot } from "@/app/_worksheet/law-effect";
import { standingLawView } from "@/app/_worksheet/standing-law.view";
import { stationAddress } from "@/app/_worksheet/station";
import type { Handle } from "@/db/database";
import type { Actor } from "@/db/member/actor";
import type { Sheet } from "@/db/sheet/sheet.schema";
import type { ChangeResult } from "@/db/study/change-study";
import { readStudy } from "@/db/study/study.queries";
import { type ActionResult, done } from "./action-result";
import { type Changed, changeOutcome } from "./change-outcome";

/** A change that went through, with what it did to the law: prose for the toast, "" where there is no law to move. */
export interface ChangedLaw extends Changed {
  readonly effect: string;
  /** The law after it for the strip, which need not wait for the rest of the page; null where nothing changed. */
  readonly standing: { readonly revision: number; readonly view: StandingLawView } | null;
}

/**
 * Makes a change to a study, tells what it did to the standing law, and lets every station of the study be drawn
 * anew, so that the law at their head follows.
 */
export async function changeWithEffect(
  db: Handle,
  actor: Actor,
  studyId: string,
  change: () => Promise<ChangeResult>,
): Promise<ActionResult<ChangedLaw>> {
  const before = await lawOf(db, actor, studyId);
  const outcome = changeOutcome(await change());
  if (!outcome.ok) return outcome;
  if (outcome.value.revision === null) return done({ ...outcome.value, effect: "", standing: null });
  const after = await lawOf(db, actor, studyId);
  revalidatePath(`/studies/${studyId}`, "layout");
  const view = standingLawView(after.sheet, after.analysis, stationAddress(studyId));
  return done({
    ...outcome.value,
    effect: lawEffect(lawSnapshot(before.sheet, before.analysis), lawSnapshot(after.sheet, after.analysis)),
    standing: { revision: after.revision, view },
  });
}

/** The law before and after a change that is only asked about; nothing is written. */
export interface LawPreview {
  readonly before: LawSnapshot;
  readonly after: LawSnapshot;
  readonly effect: string;
}

export async function previewEffect(
  db: Handle,
  actor: Actor,
  studyId: string,
  apply: (sheet: Sheet) => Sheet,
): Promise<LawPreview> {
  const study = (await readStudy(db, actor, studyId)) ?? notFound();
  const wanted = apply(study.sheet);
  const before = lawSnapshot(study.sheet, await analyseStudy(db, study.sheet));
  const after = lawSnapshot(wanted, await analyseStudy(db, wanted));
  return { before, after, effect: lawEffect(before, after) };
}

async function lawOf(db: Handle, actor: Actor, studyId: string) {
  const { sheet, revision } = (await readStudy(db, actor, studyId)) ?? notFound();
  return { sheet, revision, analysis: await analyseStudy(db, sheet) };
}

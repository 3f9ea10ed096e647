"use server";

import { notFound } from "next/navigation";
import { type ActionResult, done, refused } from "@/app/_server/action-result";
import { memberAction } from "@/app/_server/member-action";
import {
  type ChangedLaw,
  changeWithEffect,
  type LawPreview,
  previewEffect,
} from "@/app/_server/study-change";
import { workedOut } from "@/app/_worksheet/worked-out";
import { newIdentifier } from "@/db/identifier";
import { saveSetUp, withSetUp } from "@/db/study/save-set-up";
import { readStudy } from "@/db/study/study.queries";
import { readSetUpForm } from "../../_set-up/read-set-up-form";
import { setUpFormOf } from "../../_set-up/set-up-form";
import type { SetUpForm } from "../../_set-up/set-up-form.schema";
import { setUpInput } from "./schema";

const NOT_READ = "Nothing was kept: some boxes are not read yet.";

/** What the boxes as they stand would do to the law; nothing is written. */
export const previewSetUp = memberAction(
  setUpInput,
  "analyst",
  async ({ db, actor, input }): Promise<ActionResult<LawPreview>> => {
    const reading = readSetUpForm(input.form, newIdentifier);
    if (reading.status === "faults") return refused(NOT_READ, reading.faults);
    const { setUp } = reading;
    return done(await previewEffect(db, actor, input.studyId, (sheet) => workedOut(withSetUp(sheet, setUp))));
  },
);

export type KeptSetUp =
  | ({ readonly status: "kept" } & ChangedLaw)
  /** Somebody else changed the same boxes: `theirs` is how they stand now, at `revision`. */
  | { readonly status: "conflict"; readonly revision: number; readonly theirs: SetUpForm };

export const keepSetUp = memberAction(
  setUpInput,
  "analyst",
  async ({ db, actor, input }): Promise<ActionResult<KeptSetUp>> => {
    const reading = readSetUpForm(input.form, newIdentifier);
    if (reading.status === "faults") return refused(NOT_READ, reading.faults);
    let conflict = false;
    const outcome = await changeWithEffect(db, actor, input.studyId, async () => {
      const result = await saveSetUp(db, actor, input, reading.setUp, workedOut);
      conflict = result.status === "conflict";
      return result;
    });
    if (conflict) {
      const study = (await readStudy(db, actor, input.studyId)) ?? notFound();
      return done({ status: "conflict", revision: study.revision, theirs: setUpFormOf(study.sheet) });
    }
    return outcome.ok ? done({ status: "kept", ...outcome.value }) : outcome;
  },
);

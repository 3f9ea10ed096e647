"use server";

import { memberAction } from "@/app/_server/member-action";
import { changeWithEffect } from "@/app/_server/study-change";
import { workedOut } from "@/app/_worksheet/worked-out";
import { undoRevision } from "@/db/study/undo-revision";
import { undoInput } from "./schema";

/** Takes one revision back by a forward change; undoing that one is the redo. */
export const undoChange = memberAction(undoInput, "analyst", ({ db, actor, input }) =>
  changeWithEffect(db, actor, input.studyId, () => undoRevision(db, actor, input, workedOut)),
);

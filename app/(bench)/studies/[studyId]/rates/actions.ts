"use server";

import { memberAction } from "@/app/_server/member-action";
import { changeWithEffect } from "@/app/_server/study-change";
import { setRunWindow, setTimeZero } from "@/db/run/run.commands";
import { timeZeroSchema, windowSchema } from "./schema";

/** Sets one run's window by hand, or gives it back to the study's rule. Bounds alone come in; the server estimates. */
export const saveWindow = memberAction(windowSchema, "analyst", ({ db, actor, input }) =>
  changeWithEffect(db, actor, input.studyId, () =>
    setRunWindow(db, actor, { studyId: input.studyId, base: input.base }, input.runId, input.window),
  ),
);

/** Sets the time of mixing on one trace's clock; slopes are taken there. */
export const saveTimeZero = memberAction(timeZeroSchema, "analyst", ({ db, actor, input }) =>
  changeWithEffect(db, actor, input.studyId, () =>
    setTimeZero(
      db,
      actor,
      { studyId: input.studyId, base: input.base },
      [input.runId],
      input.timeZeroSeconds,
    ),
  ),
);

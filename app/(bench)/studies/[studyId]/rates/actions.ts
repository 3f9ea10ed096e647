"use server";

import { memberAction } from "@/app/_server/member-action";
import { changeWithEffect } from "@/app/_server/study-change";
import { setRunWindow, setTimeZero } from "@/db/run/run.commands";
import { setSpikes, setTraceMarks } from "@/db/run/trace-marks.commands";
import { spikesSchema, timeZeroSchema, traceMarksSchema, windowSchema } from "./schema";

/** Sets one run's window by hand, or gives it back to the study's rule. Bounds alone come in; the server estimates. */
export const saveWindow = memberAction(windowSchema, "analyst", ({ db, actor, input }) =>
  changeWithEffect(db, actor, input.studyId, () =>
    setRunWindow(db, actor, { studyId: input.studyId, base: input.base }, input.runId, input.window),
  ),
);

/** Sets dead time, the part that counts and the signal at the end; fields that are not sent stay. */
export const saveTraceMarks = memberAction(traceMarksSchema, "analyst", ({ db, actor, input }) => {
  const { studyId, base, runId, ...marks } = input;
  return changeWithEffect(db, actor, studyId, () =>
    setTraceMarks(db, actor, { studyId, base }, runId, marks),
  );
});

/** Marks readings as spikes: they are drawn, never fitted and never deleted. */
export const saveSpikes = memberAction(spikesSchema, "analyst", ({ db, actor, input }) =>
  changeWithEffect(db, actor, input.studyId, () =>
    setSpikes(db, actor, { studyId: input.studyId, base: input.base }, input.runId, input.places),
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

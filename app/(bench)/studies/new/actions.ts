"use server";

import { done, refused } from "@/app/_server/action-result";
import { memberAction } from "@/app/_server/member-action";
import { newIdentifier } from "@/db/identifier";
import { createStudy } from "@/db/study/create-study";
import { readSetUpForm } from "../_set-up/read-set-up-form";
import { setUpForm } from "../_set-up/set-up-form.schema";

/** A study from its set-up; runs come afterwards. */
export const makeStudy = memberAction(setUpForm, "analyst", async ({ db, actor, input }) => {
  const reading = readSetUpForm(input, newIdentifier);
  if (reading.status === "faults") {
    return refused("The study was not made: some boxes are not read yet.", reading.faults);
  }
  const result = await createStudy(db, actor, reading.setUp);
  if (result.status === "forbidden") {
    return refused("Only analysts and leads can make a study. Ask the lead of your group.");
  }
  if (result.status === "refused") return refused(result.message);
  return done({ studyId: result.studyId });
});

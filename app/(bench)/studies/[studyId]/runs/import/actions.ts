"use server";

import { notFound } from "next/navigation";
import { headingHash, layoutOf } from "@/app/_import/layout-memory";
import { readUpload } from "@/app/_import/read-upload";
import { readingInWords, tracedRuns } from "@/app/_import/traced-runs";
import { refused } from "@/app/_server/action-result";
import { memberAction } from "@/app/_server/member-action";
import { changeWithEffect } from "@/app/_server/study-change";
import { rememberLayout } from "@/db/import-layout/import-layout";
import { addTraces } from "@/db/run/add-traces";
import { readStudy } from "@/db/study/study.queries";
import { openUpload } from "@/db/upload/upload.queries";
import { storeTracesInput } from "./schema";

/** Reads the waiting file once more under the corrections and stores file, traces and runs in one transaction. */
export const storeTraces = memberAction(storeTracesInput, "analyst", async ({ db, actor, input }) => {
  const { studyId, uploadId, base, corrections, recipes } = input;
  const study = (await readStudy(db, actor, studyId)) ?? notFound();
  const upload = await openUpload(db, actor, { studyId, uploadId });
  if (upload === undefined || upload.state !== "waiting") {
    return refused(
      "The file is no longer here: it was dropped, or its runs are stored already. Choose it again.",
    );
  }
  const reading = await readUpload(upload, study.sheet, corrections);
  if (reading.status === "refused") return refused(reading.message);
  const obstacle = reading.issues.find((issue) => issue.severity === "blocks");
  if (obstacle !== undefined) return refused(`${obstacle.place}: ${obstacle.message} Nothing was stored.`);
  const result = await changeWithEffect(db, actor, studyId, () =>
    addTraces(
      db,
      actor,
      { studyId, base },
      { uploadId, reading: readingInWords(reading), runs: tracedRuns(reading, recipes, study.sheet) },
    ),
  );
  const hash = headingHash(reading);
  const layout = layoutOf(corrections);
  if (result.ok && hash !== null && layout !== null) {
    await rememberLayout(db, actor, { headingHash: hash, corrections: layout, fileName: upload.fileName });
  }
  return result;
});

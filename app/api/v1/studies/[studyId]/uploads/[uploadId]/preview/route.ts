import { type Corrections, corrections } from "@/app/_import/corrections";
import { headingHash, offeredLayout } from "@/app/_import/layout-memory";
import type { ImportPreview } from "@/app/_import/preview";
import { previewUpload } from "@/app/_import/read-upload";
import { storedFrom } from "@/app/_import/study-context";
import { notFoundProblem } from "@/app/_server/problem";
import { route } from "@/app/_server/route";
import type { Handle } from "@/db/database";
import { recallLayout } from "@/db/import-layout/import-layout";
import type { Actor } from "@/db/member/actor";
import { readStudy } from "@/db/study/study.queries";
import { openUpload } from "@/db/upload/upload.queries";

/** How the group read files of this heading before, where that says more than what was said of this one. */
async function rememberedFor(db: Handle, actor: Actor, reading: ImportPreview, said: Corrections) {
  const hash = reading.status === "read" ? headingHash(reading) : null;
  const layout = hash === null ? undefined : await recallLayout(db, actor, hash);
  const offered = layout === undefined ? null : offeredLayout(layout.corrections, said);
  return layout === undefined || offered === null
    ? null
    : { corrections: offered, fileName: layout.fileName, at: layout.at };
}

/** What would be stored from a waiting file, read anew under the corrections in the body. Changes nothing. */
export const POST = route(
  { schema: corrections, scope: "write", role: "analyst" },
  async ({ params, actor, input, db }) => {
    const studyId = params.studyId ?? "";
    const study = await readStudy(db, actor, studyId);
    const upload = await openUpload(db, actor, { studyId, uploadId: params.uploadId ?? "" });
    if (study === undefined || upload === undefined || upload.state !== "waiting") return notFoundProblem();
    const reading = await previewUpload(upload, study.sheet, input);
    return Response.json(
      {
        file: {
          uploadId: upload.uploadId,
          fileName: upload.fileName,
          size: upload.size,
          sha256: upload.sha256,
          storedAs: storedFrom(study.sheet, upload.sha256),
        },
        revision: study.revision,
        reading,
        remembered: await rememberedFor(db, actor, reading, input),
      },
      { headers: { "Cache-Control": "no-store" } },
    );
  },
);

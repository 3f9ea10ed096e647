import { corrections } from "@/app/_import/corrections";
import { previewUpload } from "@/app/_import/read-upload";
import { storedFrom } from "@/app/_import/study-context";
import { notFoundProblem } from "@/app/_server/problem";
import { route } from "@/app/_server/route";
import { readStudy } from "@/db/study/study.queries";
import { openUpload } from "@/db/upload/upload.queries";

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
      },
      { headers: { "Cache-Control": "no-store" } },
    );
  },
);

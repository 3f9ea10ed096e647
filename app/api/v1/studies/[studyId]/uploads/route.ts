import { storedFrom } from "@/app/_import/study-context";
import { notFoundProblem, problem } from "@/app/_server/problem";
import { roleRefusal } from "@/app/_server/role";
import { route } from "@/app/_server/route";
import { readStudy } from "@/db/study/study.queries";
import { type ReceiveResult, receiveUpload } from "@/db/upload/receive-upload";
import { arrivingBytes, BrokenUpload } from "./arriving-bytes";
import { uploadQuery } from "./schema";

const REFUSAL_STATUS: Record<Extract<ReceiveResult, { status: "refused" }>["code"], number> = {
  "too-large": 413,
  "group-full": 507,
  empty: 422,
  incomplete: 400,
};

/**
 * Takes a raw file as the body, byte for byte and never whole in memory, and keeps it waiting for its preview. The
 * answer names its id and SHA-256, and the runs that came from the same bytes before.
 */
export const POST = route(
  { schema: uploadQuery, from: "query", scope: "write", role: "analyst" },
  async ({ request, params, actor, input, db }) => {
    const studyId = params.studyId ?? "";
    const body = arrivingBytes(request);
    try {
      const received = await receiveUpload(
        db,
        actor,
        { studyId, fileName: input.fileName, declaredBytes: body.declaredBytes },
        body.chunks,
      );
      if (received.status === "not-found") return notFoundProblem();
      if (received.status === "forbidden") return problem(403, roleRefusal(actor.role, "analyst"));
      if (received.status === "refused") return problem(REFUSAL_STATUS[received.code], received.message);
      const study = await readStudy(db, actor, studyId);
      const { uploadId, sha256, size } = received;
      return Response.json(
        {
          uploadId,
          fileName: input.fileName,
          size,
          sha256,
          storedAs: study === undefined ? [] : storedFrom(study.sheet, sha256),
        },
        {
          status: 201,
          headers: {
            Location: `/api/v1/studies/${studyId}/uploads/${uploadId}`,
            "Cache-Control": "no-store",
          },
        },
      );
    } catch (error) {
      if (!(error instanceof BrokenUpload)) throw error;
      return problem(
        400,
        "The upload broke off before the file had arrived. Nothing was kept; send it again.",
      );
    } finally {
      await body.discardRest();
    }
  },
);

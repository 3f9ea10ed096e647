import { z } from "zod";
import { notFoundProblem } from "@/app/_server/problem";
import { route } from "@/app/_server/route";
import { readLatestRevision } from "@/db/revision/latest-revision";
import type { RevisionNotice } from "../revision-notice";

/**
 * The newest revision of a study, for open pages to notice what others change. The entity tag is the revision: an
 * asker who has it gets 304 and no body.
 */
export const GET = route({ schema: z.object({}), scope: null, role: "reader" }, async (call) => {
  const latest = await readLatestRevision(call.db, call.actor, call.params.studyId ?? "");
  if (latest === undefined) return notFoundProblem();
  const etag = `"${latest.revision}"`;
  const headers = { ETag: etag, "Cache-Control": "private, no-cache" };
  if (call.request.headers.get("if-none-match") === etag) return new Response(null, { status: 304, headers });
  return Response.json(latest satisfies RevisionNotice, { headers });
});

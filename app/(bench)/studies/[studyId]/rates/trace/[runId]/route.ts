import { z } from "zod";
import { notFoundProblem } from "@/app/_server/problem";
import { route } from "@/app/_server/route";
import { readStudy } from "@/db/study/study.queries";
import { readTrace } from "@/db/trace/read-trace";

/**
 * One run's trace for previews in the browser: all times in seconds, then all signals, as Float64 little-endian.
 * The bytes never change under one SHA-256, which is the entity tag.
 */
export const GET = route({ schema: z.object({}), scope: null, role: "reader" }, async (call) => {
  const study = await readStudy(call.db, call.actor, call.params.studyId ?? "");
  const sha256 = study?.sheet.runs.find((run) => run.id === call.params.runId)?.trace?.sha256;
  if (sha256 === undefined) return notFoundProblem();
  const headers = { ETag: `"${sha256}"`, "Cache-Control": "private, no-cache" };
  if (call.request.headers.get("if-none-match") === headers.ETag)
    return new Response(null, { status: 304, headers });
  const { timeSeconds, signal } = await readTrace(call.db, sha256);
  const body = new Float64Array(timeSeconds.length * 2);
  body.set(timeSeconds);
  body.set(signal, timeSeconds.length);
  return new Response(body.buffer, { headers: { ...headers, "Content-Type": "application/octet-stream" } });
});

import "server-only";
import type { z } from "zod";
import { problem } from "@/app/_server/problem";
import { route } from "@/app/_server/route";
import type { Computation } from "./registry";

/** The handler of one computation: signed in or with a token, stateless, nothing stored. */
export function computeRoute<Request extends z.ZodType, Answer extends z.ZodType>(
  entry: Computation<Request, Answer>,
) {
  return route({ schema: entry.request, scope: "read", role: "reader" }, async ({ input }) => {
    const computed = entry.compute(input);
    if (computed.ok) return Response.json(computed.answer, { headers: { "Cache-Control": "no-store" } });
    const first = computed.errors[0];
    const detail = first === undefined ? "The input could not be used." : `${first.path}: ${first.message}`;
    return problem(422, detail, { errors: computed.errors });
  });
}

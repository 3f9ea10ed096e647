import "server-only";
import type { z } from "zod";
import { problem } from "@/app/_server/problem";
import { route } from "@/app/_server/route";
import { LONGEST_COMPUTATION_MS } from "@/app/_workers/pool";
import type { Computed } from "./estimate.schema";
import type { Computation } from "./registry";

/** Members for whom the pool computes: one long call each, so that nobody fills the queue. */
const waiting = new Set<string>();

/**
 * The handler of one computation: signed in or with a token, stateless, nothing stored.
 *
 * @param inPool computes what is not quick on another thread; null where it did not end in time. Absent where all is.
 */
export function computeRoute<Request extends z.ZodType, Answer extends z.ZodType>(
  entry: Computation<Request, Answer>,
  inPool?: (request: z.output<Request>, milliseconds: number) => Promise<Computed<unknown> | null>,
) {
  return route({ schema: entry.request, scope: "read", role: "reader" }, async ({ input, actor }) =>
    inPool === undefined || entry.isQuick === undefined || entry.isQuick(input)
      ? answer(entry.compute(input))
      : longCall(actor.memberId, () => inPool(input, LONGEST_COMPUTATION_MS)),
  );
}

async function longCall(
  memberId: string,
  compute: () => Promise<Computed<unknown> | null>,
): Promise<Response> {
  if (waiting.has(memberId)) {
    return problem(429, "A long computation of yours is still running. Wait for its answer.", {
      headers: { "Retry-After": "5" },
    });
  }
  waiting.add(memberId);
  try {
    const computed = await compute();
    return computed === null
      ? problem(
          422,
          `The computation was stopped after ${LONGEST_COMPUTATION_MS / 1000} s. Send less in one call: fewer runs, blocks and shared errors, or fewer readings.`,
        )
      : answer(computed);
  } finally {
    waiting.delete(memberId);
  }
}

function answer(computed: Computed<unknown>): Response {
  if (computed.ok) return Response.json(computed.answer, { headers: { "Cache-Control": "no-store" } });
  const first = computed.errors[0];
  const detail = first === undefined ? "The input could not be used." : `${first.path}: ${first.message}`;
  return problem(422, detail, { errors: computed.errors });
}

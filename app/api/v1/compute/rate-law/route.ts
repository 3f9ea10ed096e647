import { runInPoolWithin } from "@/app/_workers/pool";
import { computeRoute } from "../compute-route";
import { rateLawComputation } from "../registry";
import { faultsOf, rateLawAnswer } from "./compute";

export const POST = computeRoute(rateLawComputation, async (request, milliseconds) => {
  const faults = faultsOf(request);
  if (faults.length > 0) return { ok: false, errors: faults };
  const run = await runInPoolWithin("fitLargeLaw", request, milliseconds);
  return run.status === "done" ? rateLawAnswer(run.value) : null;
});

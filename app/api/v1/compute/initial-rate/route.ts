import { runInPoolWithin } from "@/app/_workers/pool";
import { computeRoute } from "../compute-route";
import { initialRateComputation } from "../registry";
import { estimateOf, initialRateAnswer, initialRateFault } from "./compute";

export const POST = computeRoute(initialRateComputation, async (request, milliseconds) => {
  const fault = initialRateFault(request);
  if (fault !== null) return fault;
  const run = await runInPoolWithin("estimateLongTrace", estimateOf(request), milliseconds);
  return run.status === "done" ? initialRateAnswer(request, run.value) : null;
});

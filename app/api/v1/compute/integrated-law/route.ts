import { runInPoolWithin } from "@/app/_workers/pool";
import { computeRoute } from "../compute-route";
import { integratedLawComputation } from "../registry";
import { integratedLawAnswer, integratedLawInput } from "./compute";

export const POST = computeRoute(integratedLawComputation, async (request, milliseconds) => {
  const run = await runInPoolWithin("fitLongTrace", integratedLawInput(request), milliseconds);
  return run.status === "done" ? integratedLawAnswer(run.value) : null;
});

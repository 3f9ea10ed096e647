import { runInPoolWithin } from "@/app/_workers/pool";
import { computeRoute } from "../compute-route";
import { globalFitComputation } from "../registry";
import { globalFitAnswer, globalFitInput } from "./compute";

export const POST = computeRoute(globalFitComputation, async (request, milliseconds) => {
  const run = await runInPoolWithin("fitAllTraces", globalFitInput(request), milliseconds);
  return run.status === "done" ? globalFitAnswer(run.value) : null;
});

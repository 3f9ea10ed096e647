import { fitRateLaw, type RateLawInput, type RateLawResult } from "kinetics-core/rate-law";
import { LONGEST_COMPUTATION_MS, runInPoolWithin } from "@/app/_workers/pool";
import { isQuickFit } from "./quick-fit";

export type LawInTime = RateLawResult | { readonly status: "too-long"; readonly message: string };

/** The law, here or in the pool, both by the same function; what takes too long is stopped and says so. */
export async function fittedLaw(input: RateLawInput): Promise<LawInTime> {
  if (isQuickFit(input)) return fitRateLaw(input);
  const fitted = await runInPoolWithin("fitLargeLaw", input, LONGEST_COMPUTATION_MS);
  return fitted.status === "done"
    ? fitted.value
    : {
        status: "too-long",
        message: `The fit was stopped after ${LONGEST_COMPUTATION_MS / 1000} s: ${input.runs.length} runs in so many blocks take too long. Join blocks, or set runs aside.`,
      };
}

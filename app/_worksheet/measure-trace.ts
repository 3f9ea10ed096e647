import {
  estimateInitialRate,
  type InitialRate,
  type InitialRateOptions,
  type SlopeAtEnd,
  type StudyTrace,
  slopeAgainstWindowEnd,
  surveyTrace,
  type Trace,
  type TraceSurvey,
} from "kinetics-core/initial-rate";
import { runInPool } from "@/app/_workers/pool";

/**
 * The library's work on one trace, here or in the pool: a trace of a hundred thousand readings takes a second, which
 * no other page should wait for. Both ways run the same function.
 */

/** Up to this many readings the work is done before a thread would have its copy. */
const SHORT = 5000;

export type SweepOptions = NonNullable<Parameters<typeof slopeAgainstWindowEnd>[1]>;

export async function surveyed(trace: StudyTrace): Promise<TraceSurvey> {
  return isShort(trace.trace) ? surveyTrace(trace) : runInPool("surveyLongTrace", trace);
}

export async function estimated(trace: Trace, options: InitialRateOptions): Promise<InitialRate> {
  return isShort(trace)
    ? estimateInitialRate(trace, options)
    : runInPool("estimateLongTrace", { trace, options });
}

export async function swept(trace: Trace, options: SweepOptions): Promise<readonly SlopeAtEnd[]> {
  return isShort(trace)
    ? slopeAgainstWindowEnd(trace, options)
    : runInPool("sweepLongTrace", { trace, options });
}

function isShort({ time }: Trace): boolean {
  return time.length <= SHORT;
}

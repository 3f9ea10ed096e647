import type { TraceCounts } from "kinetics-core/initial-rate";
import type { SheetRun } from "@/db/sheet/sheet.schema";

/** A stored trace with what of it counts: part of the key of whatever is made of it. */
export interface CountedTrace {
  readonly sha256: string;
  readonly counts: TraceCounts;
}

/** What a run says of its trace; null without one. */
export function countedTrace(run: SheetRun): CountedTrace | null {
  return run.trace === null ? null : { sha256: run.trace.sha256, counts: traceCounts(run) };
}

export function traceCounts({ timeZeroSeconds, deadTimeSeconds, trim, spikes }: SheetRun): TraceCounts {
  return {
    timeZero: timeZeroSeconds,
    deadTime: deadTimeSeconds,
    trim: trim === null ? null : [trim.fromSeconds, trim.toSeconds],
    spikes,
  };
}

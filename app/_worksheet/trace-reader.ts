import { countedReadings, type Trace } from "kinetics-core/initial-rate";
import type { Kysely } from "kysely";
import type { Database } from "@/db/database";
import { readTrace } from "@/db/trace/read-trace";
import type { CountedTrace } from "./trace-counts";

/** The readings of a trace that are fitted, in seconds and signal. */
export type TraceReader = (wanted: CountedTrace) => Promise<Trace>;

/**
 * The one way from a stored trace to fitted readings on the server; the preview in the browser leaves out the same
 * readings by the same function. Reads each trace at most once while one analysis is made; whatever is cached never gets
 * here.
 */
export function traceReader(db: Kysely<Database>): TraceReader {
  const read = new Map<string, Promise<Trace>>();
  return async ({ sha256, counts }) => {
    let stored = read.get(sha256);
    if (stored === undefined) {
      stored = readTrace(db, sha256).then(({ timeSeconds, signal }) => ({ time: timeSeconds, signal }));
      read.set(sha256, stored);
    }
    return countedReadings(await stored, counts);
  };
}

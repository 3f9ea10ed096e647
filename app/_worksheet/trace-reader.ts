import type { Trace } from "kinetics-core/initial-rate";
import type { Kysely } from "kysely";
import type { Database } from "@/db/database";
import { readTrace } from "@/db/trace/read-trace";

/** A trace by its SHA-256, in seconds and signal. */
export type TraceReader = (sha256: string) => Promise<Trace>;

/** Reads each trace at most once while one analysis is made; whatever is cached never gets here. */
export function traceReader(db: Kysely<Database>): TraceReader {
  const read = new Map<string, Promise<Trace>>();
  return (sha256) => {
    const known = read.get(sha256);
    if (known !== undefined) return known;
    const trace = readTrace(db, sha256).then(({ timeSeconds, signal }) => ({ time: timeSeconds, signal }));
    read.set(sha256, trace);
    return trace;
  };
}

import type { Kysely } from "kysely";
import type { Database } from "@/db/database";
import type { Sheet } from "@/db/sheet/sheet.schema";
import { readTrace } from "@/db/trace/read-trace";
import { presentRuns } from "../present-runs";
import { commaSeparated } from "./runs-and-rates";

/** Some milliseconds of work, after which other requests have their turn: one trace may hold millions. */
const READINGS_AT_ONCE = 5000;

/**
 * All readings of a study in long layout, some thousands at a time, so that a study of millions of points is never held as one
 * text. Times in seconds on each trace's own clock, signals as they were imported.
 */
export async function* tracesTable(db: Kysely<Database>, sheet: Sheet): AsyncGenerator<string> {
  const quantity = sheet.signal?.kind === "calibrated" ? sheet.signal.quantity : "concentration / mol L^-1";
  yield commaSeparated([["run", "time / s", quantity]]);
  for (const run of presentRuns(sheet)) {
    if (run.trace === null) continue;
    const { timeSeconds: time, signal } = await readTrace(db, run.trace.sha256);
    for (let start = 0; start < time.length; start += READINGS_AT_ONCE) {
      const length = Math.min(READINGS_AT_ONCE, time.length - start);
      yield commaSeparated(
        Array.from({ length }, (_, index) => [
          run.label,
          time[start + index] ?? null,
          signal[start + index] ?? null,
        ]),
      );
    }
  }
}

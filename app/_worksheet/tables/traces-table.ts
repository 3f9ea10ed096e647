import type { Kysely } from "kysely";
import type { Database } from "@/db/database";
import type { Sheet } from "@/db/sheet/sheet.schema";
import { presentRuns } from "../present-runs";
import { traceReader } from "../trace-reader";
import { commaSeparated } from "./runs-and-rates";

/**
 * All readings of a study in long layout, a run at a time, so that a study of millions of points is never held as one
 * text. Times in seconds on each trace's own clock, signals as they were imported.
 */
export async function* tracesTable(db: Kysely<Database>, sheet: Sheet): AsyncGenerator<string> {
  const quantity = sheet.signal?.kind === "calibrated" ? sheet.signal.quantity : "concentration / mol L^-1";
  yield commaSeparated([["run", "time / s", quantity]]);
  for (const run of presentRuns(sheet)) {
    if (run.trace === null) continue;
    const { time, signal } = await traceReader(db)(run.trace.sha256);
    const rows = Array.from({ length: time.length }, (_, index) => [
      run.label,
      time[index] ?? null,
      signal[index] ?? null,
    ]);
    yield commaSeparated(rows);
  }
}

import type { InitialRateFound, SlopeAtEnd } from "kinetics-core/initial-rate";
import type { Kysely } from "kysely";
import type { Database } from "@/db/database";
import type { SheetRun } from "@/db/sheet/sheet.schema";
import { type SweepOptions, swept } from "./measure-trace";
import { keepStage, makeStage } from "./stage";
import { slopesAtEndSchema } from "./stored-results";
import { countedTrace } from "./trace-counts";
import { traceReader } from "./trace-reader";

const sweepStage = makeStage("sweep", slopesAtEndSchema);

/**
 * How a run's slope depends on where its window ends, by the estimator that is reported, in seconds and signal per
 * second. Empty for a fit of a whole trace, which has no window to move. Kept like the rates.
 */
export async function sweepWindowEnd(
  db: Kysely<Database>,
  run: SheetRun,
  estimate: InitialRateFound,
): Promise<readonly SlopeAtEnd[]> {
  const options = sweepOptions(run, estimate);
  const counted = countedTrace(run);
  if (counted === null || options === null) return [];
  const readTrace = traceReader(db);
  const [sweep] = await keepStage(
    db,
    sweepStage,
    [{ ...counted, options }],
    async ({ options: asked, ...wanted }) => swept(await readTrace(wanted), asked),
  );
  return sweep ?? [];
}

function sweepOptions(run: SheetRun, { estimator, degree, window }: InitialRateFound): SweepOptions | null {
  const common = { timeZero: run.timeZeroSeconds, from: window[0] };
  if (estimator === "straight") return { ...common, estimator };
  if (estimator !== "tangent" || (degree !== 2 && degree !== 3 && degree !== 4)) return null;
  return { ...common, estimator, degree };
}

import "server-only";
import { decimate } from "@/app/_figures/decimate";
import { RecentResults } from "@/app/_worksheet/recent-results";
import type { Handle } from "@/db/database";
import { readTraces } from "@/db/trace/read-trace";

/** A trace thinned for drawing: what a figure `DRAWN_COLUMNS` pixels wide can show. Seconds on the trace's own clock. */
export interface DrawnTrace {
  readonly timeSeconds: readonly number[];
  readonly signal: readonly number[];
}

const DRAWN_COLUMNS = 420;
/** Some 30 kB each: the traces of a few studies that are being looked at. */
const KEPT_TRACES = 2000;

const recent = new RecentResults<DrawnTrace>(KEPT_TRACES);

/**
 * The traces of a sheet by SHA-256, thinned once and kept in memory, since bytes of one hash never change. Pages
 * that are drawn again after each change read no trace a second time.
 */
export async function drawnTraces(
  db: Handle,
  hashes: Iterable<string>,
): Promise<ReadonlyMap<string, DrawnTrace>> {
  const wanted = [...new Set(hashes)];
  const unread: string[] = [];
  // All that are new are read in one go, when the first of them is asked for.
  let reading: ReturnType<typeof readTraces> | null = null;
  const found = wanted.map(async (sha256): Promise<[string, DrawnTrace]> => {
    const trace = await recent.get(sha256, async () => {
      unread.push(sha256);
      await Promise.resolve();
      reading ??= readTraces(db, unread);
      const stored = (await reading).get(sha256);
      if (stored === undefined) throw new Error(`The bytes of trace ${sha256} are missing.`);
      const thin = decimate([...stored.timeSeconds], [...stored.signal], DRAWN_COLUMNS);
      return { timeSeconds: thin.x, signal: thin.y };
    });
    return [sha256, trace];
  });
  return new Map(await Promise.all(found));
}

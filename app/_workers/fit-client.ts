import { type Remote, transfer, wrap } from "comlink";
import type {
  InitialRate,
  InitialRateOptions,
  ProposedSpikes,
  TraceCounts,
} from "kinetics-core/initial-rate";
import type { FitWorker } from "./fit.worker";

/** One trace in a worker of its own: asked for estimates, closed when its page goes. */
export interface OpenTrace {
  estimate(counts: TraceCounts, options: InitialRateOptions): Promise<InitialRate | null>;
  lookForSpikes(counts: TraceCounts): Promise<ProposedSpikes | null>;
  close(): void;
}

/** Takes over both arrays: they are moved to the worker, not copied. */
export async function openTrace(time: Float64Array, signal: Float64Array): Promise<OpenTrace> {
  const worker = new Worker(new URL("./fit.worker.ts", import.meta.url), { type: "module" });
  const remote: Remote<FitWorker> = wrap<FitWorker>(worker);
  await remote.open(transfer(time, [time.buffer]), transfer(signal, [signal.buffer]));
  return {
    estimate: (counts, options) => remote.estimate(counts, options),
    lookForSpikes: (counts) => remote.lookForSpikes(counts),
    close: () => worker.terminate(),
  };
}

import { type Remote, transfer, wrap } from "comlink";
import type { InitialRate, InitialRateOptions } from "kinetics-core/initial-rate";
import type { FitWorker } from "./fit.worker";

/** One trace in a worker of its own: asked for estimates, closed when its page goes. */
export interface OpenTrace {
  estimate(options: InitialRateOptions): Promise<InitialRate | null>;
  close(): void;
}

/** Takes over both arrays: they are moved to the worker, not copied. */
export async function openTrace(time: Float64Array, signal: Float64Array): Promise<OpenTrace> {
  const worker = new Worker(new URL("./fit.worker.ts", import.meta.url), { type: "module" });
  const remote: Remote<FitWorker> = wrap<FitWorker>(worker);
  await remote.open(transfer(time, [time.buffer]), transfer(signal, [signal.buffer]));
  return {
    estimate: (options) => remote.estimate(options),
    close: () => worker.terminate(),
  };
}

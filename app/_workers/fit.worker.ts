import { expose } from "comlink";
import {
  estimateInitialRate,
  type InitialRate,
  type InitialRateOptions,
  type Trace,
} from "kinetics-core/initial-rate";

/**
 * Estimates in the browser, off the thread that draws, with the function that makes the record on the server.
 * It holds one trace at a time, so that a step of a handle sends its bounds alone.
 */
export class FitWorker {
  #trace: Trace | null = null;

  /** `time` in seconds, strictly increasing; `signal` as stored, same length. */
  open(time: Float64Array, signal: Float64Array): void {
    this.#trace = { time, signal };
  }

  /** Null before a trace is open. */
  estimate(options: InitialRateOptions): InitialRate | null {
    return this.#trace === null ? null : estimateInitialRate(this.#trace, options);
  }
}

expose(new FitWorker());

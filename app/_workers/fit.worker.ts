import { expose } from "comlink";
import {
  countedReadings,
  estimateInitialRate,
  type InitialRate,
  type InitialRateOptions,
  type ProposedSpikes,
  proposeSpikes,
  type Trace,
  type TraceCounts,
} from "kinetics-core/initial-rate";

/**
 * Estimates in the browser, off the thread that draws, with the functions that make the record on the server.
 * It holds one trace at a time, so that a step of a handle sends its bounds alone.
 */
export class FitWorker {
  #trace: Trace | null = null;

  /** `time` in seconds, strictly increasing; `signal` as stored, same length. */
  open(time: Float64Array, signal: Float64Array): void {
    this.#trace = { time, signal };
  }

  /** Null before a trace is open. */
  estimate(counts: TraceCounts, options: InitialRateOptions): InitialRate | null {
    return this.#trace === null ? null : estimateInitialRate(countedReadings(this.#trace, counts), options);
  }

  /** Null before a trace is open. */
  lookForSpikes(counts: TraceCounts): ProposedSpikes | null {
    return this.#trace === null ? null : proposeSpikes(this.#trace, counts);
  }
}

expose(new FitWorker());

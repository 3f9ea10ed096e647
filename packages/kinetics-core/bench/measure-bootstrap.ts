import { fitGlobal } from "kinetics-core/global-fit";
import { bootstrapRuns } from "kinetics-core/inference";
import type { BenchmarkStudy } from "./benchmark-study";
import { fitOrThrow, inputOf } from "./our-fit";
import { medianOf, timeOf } from "./stopwatch";

export interface Bootstrap {
  readonly refits: number;
  readonly failed: number;
  readonly seconds: number;
  /** Time of the refits over that of as many single fits: median over the parts. */
  readonly ratio: number;
  /** Refits done when a wish to stop, uttered after ten of them, was granted. */
  readonly stoppedAfter: number;
}

const REFITS = 1000;
/** Parts, each beside as many single fits, so that a busy moment strikes both. */
const PARTS = 20;
const SEED = 7;
const STOP_AFTER = 10;
const PROGRESS = 200;

export function measureBootstrap(study: BenchmarkStudy, progress: (message: string) => void): Bootstrap {
  const input = inputOf(study);
  const request = { runs: input.runs.length, seed: SEED, refit: refitOf(input) };
  const size = REFITS / PARTS;
  const parts = Array.from({ length: PARTS }, (_, part) => {
    const single = timeOf(() => {
      for (let i = 0; i < size; i++) fitOrThrow(input);
    });
    let failed = 0;
    const time = timeOf(() => {
      const result = bootstrapRuns({
        ...request,
        first: part * size,
        last: (part + 1) * size,
        onProgress: (done, of) => {
          const all = part * size + done;
          if (done === of && all % PROGRESS === 0) progress(`bootstrap, ${all} of ${REFITS}`);
        },
      });
      if (result.status !== "complete") throw new Error(`The bootstrap ended as ${result.status}`);
      failed = result.replicates.filter((one) => one === null).length;
    });
    return { time, failed, ratio: time / single };
  });
  return {
    refits: REFITS,
    failed: parts.reduce((sum, { failed }) => sum + failed, 0),
    seconds: parts.reduce((sum, { time }) => sum + time, 0) / 1000,
    ratio: medianOf(parts.map(({ ratio }) => ratio)),
    stoppedAfter: stoppedAfter(request),
  };
}

type Refit = (indices: Int32Array) => readonly number[] | null;

function refitOf(input: ReturnType<typeof inputOf>): Refit {
  return (indices) => {
    const runs = Array.from(indices).flatMap((run, draw) => {
      const drawn = input.runs[run];
      return drawn === undefined ? [] : [{ ...drawn, label: `draw ${draw + 1}` }];
    });
    const fit = fitGlobal({ ...input, runs });
    if (fit.status !== "fitted") return null;
    return [fit.logRateConstant, fit.orders.A, fit.orders.B].map((one) => one?.estimate ?? Number.NaN);
  };
}

function stoppedAfter(request: { runs: number; seed: number; refit: Refit }): number {
  let done = 0;
  const result = bootstrapRuns({
    ...request,
    first: 0,
    last: REFITS,
    onProgress: (count) => {
      done = count;
    },
    shouldStop: () => done >= STOP_AFTER,
  });
  if (result.status !== "stopped") throw new Error(`The bootstrap did not stop when asked: ${result.status}`);
  return result.next;
}

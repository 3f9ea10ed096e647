import { bootstrapGlobalFit, type GlobalFitInput } from "kinetics-core/global-fit";
import { median } from "kinetics-core/summation";
import type { BenchmarkStudy } from "./benchmark-study";
import { fitOrThrow, inputOf } from "./our-fit";
import { timeOf } from "./stopwatch";

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
/** Parts, each beside as many single fits, so that a busy moment strikes both; each part fits the whole study once. */
const PARTS = 10;
const SEED = 7;
const STOP_AFTER = 10;
const PROGRESS = 200;

export function measureBootstrap(study: BenchmarkStudy, progress: (message: string) => void): Bootstrap {
  const input = inputOf(study);
  const size = REFITS / PARTS;
  const parts = Array.from({ length: PARTS }, (_, part) => {
    const single = timeOf(() => {
      for (let i = 0; i < size; i++) fitOrThrow(input);
    });
    let failed = 0;
    const time = timeOf(() => {
      const result = bootstrapGlobalFit(input, {
        seed: SEED,
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
    failed: parts.reduce((sum, part) => sum + part.failed, 0),
    seconds: parts.reduce((sum, { time }) => sum + time, 0) / 1000,
    ratio: median(parts.map(({ ratio }) => ratio)),
    stoppedAfter: stoppedAfter(input),
  };
}

function stoppedAfter(input: GlobalFitInput): number {
  let done = 0;
  const result = bootstrapGlobalFit(input, {
    seed: SEED,
    last: REFITS,
    onProgress: (count) => {
      done = count;
    },
    shouldStop: () => done >= STOP_AFTER,
  });
  if (result.status !== "stopped" || !("next" in result))
    throw new Error(`The bootstrap did not stop when asked: ${result.status}`);
  return result.next;
}

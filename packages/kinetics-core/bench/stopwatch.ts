import { performance } from "node:perf_hooks";

/** Milliseconds that `work` takes. */
export function timeOf(work: () => void): number {
  const start = performance.now();
  work();
  return performance.now() - start;
}

/** Least of `times` repeats: what the work costs when nothing else interrupts it. Rounds are then compared by medians. */
export function leastTimeOf(times: number, work: () => void): number {
  return Math.min(...Array.from({ length: times }, () => timeOf(work)));
}

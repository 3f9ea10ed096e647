import { setFlagsFromString } from "node:v8";
import { runInNewContext } from "node:vm";
import { benchmarkStudy } from "./benchmark-study";
import { fitOrThrow, inputOf } from "./our-fit";

/** Growth over what stood before, in MiB. */
export interface Memory {
  readonly runs: number;
  readonly readings: number;
  /** What the readings themselves take. */
  readonly data: number;
  /** Largest growth of heap and of memory outside it, seen after one of many fits without a collection in between. */
  readonly peakHeap: number;
  readonly peakExternal: number;
  /** Growth of the resident set, pages that the collector keeps included. */
  readonly residentSet: number;
  /** Still held after the fits and a collection: what would grow for ever. */
  readonly retained: number;
}

const FITS = 20;
const MIB = 2 ** 20;

export function measureMemory(runs: number, readings: number): Memory {
  setFlagsFromString("--expose-gc");
  const collect: () => void = runInNewContext("gc");
  const input = inputOf(benchmarkStudy(runs, readings, 5));
  fitOrThrow(input);
  collect();
  const before = process.memoryUsage();
  let heap = 0;
  let external = 0;
  let resident = 0;
  for (let i = 0; i < FITS; i++) {
    fitOrThrow(input);
    const now = process.memoryUsage();
    heap = Math.max(heap, now.heapUsed - before.heapUsed);
    external = Math.max(external, now.external - before.external);
    resident = Math.max(resident, now.rss - before.rss);
  }
  collect();
  const after = process.memoryUsage();
  return {
    runs,
    readings,
    data: (2 * 8 * runs * readings) / MIB,
    peakHeap: heap / MIB,
    peakExternal: external / MIB,
    residentSet: resident / MIB,
    retained: Math.max(0, after.heapUsed + after.external - before.heapUsed - before.external) / MIB,
  };
}

import type { Trace } from "kinetics-core/initial-rate";
import type { Flag } from "kinetics-core/quantities";
import type { BurstOptions } from "./burst";
import { fitBurst } from "./fit-burst";

/** Enough to see a phase that is worth naming; more readings are averaged in blocks, so that a long trace costs no more. */
const MOST_READINGS = 240;

/** The finding that a trace begins with a burst or a lag, so that its initial rate is not its slope at mixing; or null. */
export function phaseFlag(trace: Trace, options: BurstOptions = {}): Flag | null {
  const burst = fitBurst({ ...blockMeans(trace), ...options });
  return burst.status === "found" ? (burst.flags[0] ?? null) : null;
}

function blockMeans({ time, signal }: Trace): Trace {
  const size = Math.ceil(time.length / MOST_READINGS);
  if (size <= 1 || signal.length !== time.length) return { time, signal };
  const blocks = Math.floor(time.length / size);
  const meansOf = (column: ArrayLike<number>) =>
    Float64Array.from({ length: blocks }, (_, block) => {
      let sum = 0;
      for (let i = 0; i < size; i++) sum += column[block * size + i] ?? Number.NaN;
      return sum / size;
    });
  return { time: meansOf(time), signal: meansOf(signal) };
}

import type { Trace } from "./initial-rate";

/** Which readings of a trace are fitted. All times on the trace's own clock, in its unit. */
export interface TraceCounts {
  /** Time of mixing. */
  readonly timeZero: number;
  /** From mixing to the first reading that counts, ≥ 0. Readings before mixing are the estimate's to leave out and count. */
  readonly deadTime: number;
  /** Part of the trace that counts, both ends included; null: all of it. */
  readonly trim: readonly [number, number] | null;
  /** Readings that do not count, by their place in the trace from 0, in any order. */
  readonly spikes: readonly number[];
}

/** Why a reading does not count. */
export type NotCounted = "dead-time" | "trimmed" | "spike";

/** Null for a reading that counts; of several reasons the one that a person marked by hand is named. */
export function whyNotCounted(
  { timeZero, deadTime, trim }: TraceCounts,
  spikes: ReadonlySet<number>,
  place: number,
  time: number,
): NotCounted | null {
  if (spikes.has(place)) return "spike";
  if (trim !== null && (time < trim[0] || time > trim[1])) return "trimmed";
  return time >= timeZero && time < timeZero + deadTime ? "dead-time" : null;
}

/** Places of the readings that count, rising. */
export function countedPlaces(trace: Pick<Trace, "time">, counts: TraceCounts): Int32Array {
  const spikes = new Set(counts.spikes);
  const places = new Int32Array(trace.time.length);
  let count = 0;
  for (let i = 0; i < trace.time.length; i++) {
    if (whyNotCounted(counts, spikes, i, trace.time[i] ?? Number.NaN) === null) places[count++] = i;
  }
  return places.subarray(0, count);
}

/**
 * The readings of a trace that are fitted: what lies in the dead time, outside the trimmed part or is marked as a spike
 * is left out. The trace itself comes back where everything counts. Lengths that differ are left for the estimate to
 * refuse, which names them.
 */
export function countedReadings(trace: Trace, counts: TraceCounts): Trace {
  if (trace.time.length !== trace.signal.length) return trace;
  const places = countedPlaces(trace, counts);
  if (places.length === trace.time.length) return trace;
  const time = new Float64Array(places.length);
  const signal = new Float64Array(places.length);
  for (let i = 0; i < places.length; i++) {
    const place = places[i] ?? 0;
    time[i] = trace.time[place] ?? Number.NaN;
    signal[i] = trace.signal[place] ?? Number.NaN;
  }
  return { time, signal };
}

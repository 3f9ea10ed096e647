import type { Corrections } from "./corrections";

/**
 * A trace's times must rise strictly. Where they repeat or fall back, the places are named; what a person chose to do
 * about it (keep the first of equal times, take their mean, sort) is done here and nowhere else.
 */

export interface TimeFault {
  readonly kind: "repeats" | "falls";
  /** Line of the offending reading and of the one before it. */
  readonly line: number;
  readonly earlierLine: number;
  readonly time: number;
  readonly earlierTime: number;
}

export interface TimeFaults {
  readonly repeats: readonly TimeFault[];
  readonly falls: readonly TimeFault[];
  readonly repeatCount: number;
  readonly fallCount: number;
}

const KEPT = 20;

export interface TimedReadings {
  readonly time: Float64Array;
  readonly signal: Float64Array;
  readonly line: Float64Array;
}

/** Puts the readings in order as far as was chosen, and names what remains. Input arrays are left as they are. */
export function orderTimes(
  readings: TimedReadings,
  chosen: Pick<Corrections, "repeatedTimes" | "timeOrder">,
): { readonly readings: TimedReadings; readonly faults: TimeFaults } {
  let current = readings;
  if (chosen.timeOrder === "sorted") current = sorted(current);
  if (chosen.repeatedTimes) current = merged(current, chosen.repeatedTimes);
  return { readings: current, faults: faultsOf(current) };
}

function faultsOf({ time, line }: TimedReadings): TimeFaults {
  const repeats: TimeFault[] = [];
  const falls: TimeFault[] = [];
  let repeatCount = 0;
  let fallCount = 0;
  for (let i = 1; i < time.length; i++) {
    const earlierTime = time[i - 1] ?? 0;
    const now = time[i] ?? 0;
    if (now > earlierTime) continue;
    const fault = { line: line[i] ?? 0, earlierLine: line[i - 1] ?? 0, time: now, earlierTime };
    if (now === earlierTime) {
      repeatCount += 1;
      if (repeats.length < KEPT) repeats.push({ kind: "repeats", ...fault });
    } else {
      fallCount += 1;
      if (falls.length < KEPT) falls.push({ kind: "falls", ...fault });
    }
  }
  return { repeats, falls, repeatCount, fallCount };
}

/** Stable: equal times keep the order of the file. */
function sorted({ time, signal, line }: TimedReadings): TimedReadings {
  const order = Uint32Array.from(time.keys()).sort((a, b) => (time[a] ?? 0) - (time[b] ?? 0) || a - b);
  const pick = (values: Float64Array) => Float64Array.from(order, (i) => values[i] ?? 0);
  return { time: pick(time), signal: pick(signal), line: pick(line) };
}

/** Joins readings of equal time that stand next to each other. */
function merged({ time, signal, line }: TimedReadings, how: "first" | "mean"): TimedReadings {
  const times: number[] = [];
  const signals: number[] = [];
  const lines: number[] = [];
  for (let i = 0; i < time.length; ) {
    let end = i + 1;
    let sum = signal[i] ?? 0;
    while (end < time.length && time[end] === time[i]) {
      sum += signal[end] ?? 0;
      end += 1;
    }
    times.push(time[i] ?? 0);
    signals.push(how === "mean" ? sum / (end - i) : (signal[i] ?? 0));
    lines.push(line[i] ?? 0);
    i = end;
  }
  return {
    time: Float64Array.from(times),
    signal: Float64Array.from(signals),
    line: Float64Array.from(lines),
  };
}

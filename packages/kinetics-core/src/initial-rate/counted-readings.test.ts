import { describe, expect, it } from "vitest";
import { countedReadings, type TraceCounts, whyNotCounted } from "./counted-readings";
import { estimateInitialRate } from "./estimate-initial-rate";

const time = Array.from({ length: 30 }, (_, i) => i - 2);
const signal = time.map((t) => 0.1 + 0.02 * t);
const everything: TraceCounts = { timeZero: 0, deadTime: 0, trim: null, spikes: [] };

describe("the readings of a trace that are fitted", () => {
  it("are the trace itself where everything counts", () => {
    const trace = { time, signal };
    expect(countedReadings(trace, everything)).toBe(trace);
  });

  it("leave out the dead time, what is trimmed and spikes, and nothing else", () => {
    const counted = countedReadings(
      { time, signal },
      { timeZero: 1, deadTime: 3, trim: [-1, 20], spikes: [25, 12] },
    );
    // Before mixing: −1 and 0. Dead time: 1, 2, 3. Spike: place 12, time 10; place 25 is trimmed anyway.
    expect(Array.from(counted.time)).toEqual(
      time.filter((t) => t >= -1 && t <= 20 && !(t >= 1 && t < 4) && t !== 10),
    );
    expect(Array.from(counted.signal)).toEqual(Array.from(counted.time, (t) => 0.1 + 0.02 * t));
  });

  it("take the first reading after the dead time and both ends of the trimmed part", () => {
    const why = (t: number) =>
      whyNotCounted({ timeZero: 1, deadTime: 3, trim: [2, 20], spikes: [7] }, new Set([7]), t + 2, t);
    expect([1, 2, 3, 4, 5, 20, 21].map(why)).toEqual([
      "trimmed",
      "dead-time",
      "dead-time",
      null,
      "spike",
      null,
      "trimmed",
    ]);
  });

  it("give the same slope as a trace that never held the others", () => {
    const spoiled = signal.map((value, i) => (i === 9 ? value + 0.5 : i < 5 && i > 1 ? value - 0.3 : value));
    const counted = countedReadings(
      { time, signal: spoiled },
      { timeZero: 0, deadTime: 3, trim: null, spikes: [9] },
    );
    const clean = { time: Array.from(counted.time), signal: Array.from(counted.time, (t) => 0.1 + 0.02 * t) };
    const rate = estimateInitialRate(counted, { signalSpan: 2 });
    expect(rate).toEqual(estimateInitialRate(clean, { signalSpan: 2 }));
    if (rate.status !== "found") throw new Error(rate.message);
    expect(rate.slope).toBeCloseTo(0.02, 10);
  });

  it("leave lengths that differ to the estimate, which names them", () => {
    const broken = { time, signal: signal.slice(1) };
    expect(countedReadings(broken, { ...everything, deadTime: 5 })).toBe(broken);
  });
});

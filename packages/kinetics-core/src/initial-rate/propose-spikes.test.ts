import { randomDraws } from "kinetics-core/random";
import { describe, expect, it } from "vitest";
import type { TraceCounts } from "./counted-readings";
import { proposeSpikes } from "./propose-spikes";

const everything: TraceCounts = { timeZero: 0, deadTime: 0, trim: null, spikes: [] };

/** First-order growth over four half-lives with independent noise of 1 % of its height. */
function trace(readings: number, seed: number, noise = 0.01) {
  const draws = randomDraws(seed);
  const time = Array.from({ length: readings }, (_, i) => (4 * Math.LN2 * i) / readings);
  return { time, signal: time.map((t) => 1 - Math.exp(-t) + noise * draws.normal()) };
}

describe("a proposal of spikes", () => {
  it("finds single readings and twins that stand off, and leaves their neighbours alone", () => {
    const { time, signal } = trace(200, 1);
    const spoiled = signal.map(
      (value, i) => value + ([40, 120, 121].includes(i) ? 0.15 : i === 160 ? -0.12 : 0),
    );
    const proposed = proposeSpikes({ time, signal: spoiled }, everything);
    expect(proposed.places).toEqual([40, 120, 121, 160]);
    expect(proposed.standOff).toBeGreaterThan(0.03);
    expect(proposed.standOff).toBeLessThan(0.1);
  });

  it("proposes something of a clean trace in one of twenty at most", () => {
    const falsely = Array.from({ length: 200 }, (_, seed) =>
      proposeSpikes(trace(150, 1000 + seed), everything).places.length > 0 ? 1 : 0,
    ).reduce<number>((sum, one) => sum + one, 0);
    // 99.9 % quantile of a binomial with 5 % of 200.
    expect(falsely).toBeLessThanOrEqual(21);
  });

  it("takes no curvature for a spike, however little noise there is", () => {
    for (const readings of [25, 60, 400])
      expect(proposeSpikes(trace(readings, 3, 0), everything).places).toEqual([]);
    const burst = Array.from({ length: 100 }, (_, i) => i);
    const signal = burst.map((t) => 1 - 0.6 * Math.exp(-t / 4) - 0.4 * Math.exp(-t / 80));
    expect(proposeSpikes({ time: burst, signal }, everything).places).toEqual([]);
  });

  it("takes no steps of the detector for spikes", () => {
    const { time, signal } = trace(300, 4, 0.0004);
    const rounded = signal.map((value) => Math.round(value * 500) / 500);
    expect(proposeSpikes({ time, signal: rounded }, everything).places).toEqual([]);
  });

  it("takes no jump of the whole trace for spikes", () => {
    const { time, signal } = trace(300, 8);
    const jumped = signal.map((value, i) => (i < 150 ? value : value + 0.5));
    expect(proposeSpikes({ time, signal: jumped }, everything).places).toEqual([]);
  });

  it("names places in the stored trace and looks at readings that count only", () => {
    const { time, signal } = trace(200, 5);
    const spoiled = signal.map((value, i) => value + (i === 8 || i === 50 || i === 90 ? 0.3 : 0));
    const counts = { ...everything, deadTime: time[20] ?? 0, spikes: [50] };
    expect(proposeSpikes({ time, signal: spoiled }, counts).places).toEqual([90]);
  });

  it("proposes nothing of few readings and of times that do not increase", () => {
    const short = trace(24, 6);
    expect(proposeSpikes(short, everything).places).toEqual([]);
    const { time, signal } = trace(60, 7);
    const spoiled = signal.map((value, i) => (i === 30 ? 9 : value));
    expect(
      proposeSpikes({ time: time.map((t, i) => (i === 40 ? 0 : t)), signal: spoiled }, everything).places,
    ).toEqual([]);
  });
});

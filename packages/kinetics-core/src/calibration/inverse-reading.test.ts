import { randomDraws } from "kinetics-core/random";
import { describe, expect, it } from "vitest";
import { confidenceBand, predictionBand } from "./bands";
import { calibrated, codes, line, scattered, x } from "./example-line";
import type { RatioSet } from "./fieller";
import { readConcentration, readingOf, standardAdditions } from "./inverse-reading";

describe("readings", () => {
  const fitted = line({ concentrations: x, signals: scattered });

  it("ends of the interval are where the prediction band passes through the signal", () => {
    const { interval } = readConcentration(fitted, { signal: 7.3, replicates: 3 });
    const [low, high] = interval ?? [0, 0];
    expect(predictionBand(fitted, low, 3).interval?.[1]).toBeCloseTo(7.3, 9);
    expect(predictionBand(fitted, high, 3).interval?.[0]).toBeCloseTo(7.3, 9);
  });

  it("standard additions are the mirrored reading of an exact zero", () => {
    const added = standardAdditions(fitted);
    const { intercept, slope } = fitted;
    expect(added.estimate).toBeCloseTo((intercept.estimate ?? 0) / (slope.estimate ?? 1), 12);
    const [low, high] = added.interval ?? [0, 0];
    expect(confidenceBand(fitted, -low).interval?.[0]).toBeCloseTo(0, 9);
    expect(confidenceBand(fitted, -high).interval?.[1]).toBeCloseTo(0, 9);
  });

  it("have no interval, and say why, where the slope may be zero", () => {
    const flat = calibrated({
      concentrations: x,
      signals: [1, 1.4, 0.8, 1.5, 0.9, 1.3],
      readings: [[1.1]],
    });
    expect(flat.readings[0]?.interval).toBeNull();
    expect(flat.readings[0]?.g).toBeGreaterThan(1);
    expect(flat.readings[0]?.set?.kind).not.toBe("bounded");
    expect(codes(flat)).toEqual(expect.arrayContaining(["slope-not-shown", "reading-unbounded"]));
    const level = calibrated({ concentrations: [0, 1, 2], signals: [1, 2, 1], readings: [[1]] });
    expect(level.readings[0]).toMatchObject({ estimate: null, interval: null });
  });

  it("outside the standards, below the limits, or with restless replicates are named", () => {
    const result = calibrated({
      concentrations: x,
      signals: scattered,
      readings: [[13], [1.06], [1.3], [5, 6], [5]],
    });
    const message = (code: string) => result.flags.find((flag) => flag.code === code)?.message ?? "";
    expect(message("reading-outside-standards")).toMatch(/^Reading 1 lies outside the standards, 0 to 5,/);
    expect(message("reading-below-detection")).toMatch(/^Reading 2 is below/);
    expect(message("reading-below-quantitation")).toMatch(/^Reading 3 is between/);
    expect(message("reading-scatter")).toMatch(/^Reading 4 has/);
    expect(codes(result)).not.toContain("reading-unbounded");
  });

  it.each([
    ["well known", 0.05, 3301],
    ["known to a third", 0.7, 3302],
  ])("hold the true concentration in 95 % of the cases where the slope is %s", (_, deviation, seed) => {
    const draws = randomDraws(seed);
    const replicates = 1000;
    let covered = 0;
    for (let replicate = 0; replicate < replicates; replicate++) {
      const noisy = line({
        concentrations: x,
        signals: x.map((c) => 1 + 0.5 * c + deviation * draws.normal()),
      });
      const signals = [3, 3].map((signal) => signal + deviation * draws.normal());
      const { set } = readConcentration(noisy, readingOf(signals));
      // The signal of 3 stands for a concentration of 4; an unbounded set may hold it too.
      if (set === null) throw new Error("no set");
      if (contains(set, 4)) covered += 1;
    }
    // Central 99.8 % of a binomial of 1,000 with 95 %: 927 to 970 (SciPy 1.17).
    expect(covered).toBeGreaterThanOrEqual(927);
    expect(covered).toBeLessThanOrEqual(970);
  });
});

function contains(set: RatioSet, value: number): boolean {
  switch (set.kind) {
    case "bounded":
      return set.low <= value && value <= set.high;
    case "complement":
      return (set.upTo !== null && value <= set.upTo) || (set.from !== null && value >= set.from);
    case "whole-line":
      return true;
  }
}

import { randomDraws } from "kinetics-core/random";
import { describe, expect, it } from "vitest";
import { bootstrapIntervals, bootstrapRuns } from "./index";

const draws = randomDraws(2);
const values = Array.from({ length: 12 }, () => draws.normal());
const meanOf = (indices: Int32Array) => [
  indices.reduce((sum, index) => sum + (values[index] ?? 0), 0) / indices.length,
];
const request = {
  runs: 12,
  seed: 9,
  first: 0,
  last: 2000,
  refit: meanOf as (indices: Int32Array) => number[] | null,
};

function replicatesOf(given: Partial<typeof request>): readonly (Float64Array | null)[] {
  const result = bootstrapRuns({ ...request, ...given });
  if (result.status !== "complete") throw new Error(result.status);
  return result.replicates;
}

describe("bootstrap over runs", () => {
  it("has the variance of the mean that theory gives, Σ(x − x̄)²/n²", () => {
    const mean = values.reduce((sum, value) => sum + value, 0) / 12;
    const theory = Math.sqrt(values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / 144);
    const result = bootstrapIntervals([mean], replicatesOf({}));
    if (result.status !== "intervals") throw new Error(result.message);
    const [parameter] = result.parameters;
    expect((parameter?.standardError ?? 0) / theory).toBeGreaterThan(0.95);
    expect((parameter?.standardError ?? 0) / theory).toBeLessThan(1.05);
    const [low, high] = parameter?.percentile ?? [0, 0];
    expect(low).toBeLessThan(mean - 1.6 * theory);
    expect(high).toBeGreaterThan(mean + 1.6 * theory);
    expect(parameter?.basic).toEqual([2 * mean - high, 2 * mean - low]);
  });

  it("is the same in chunks as in one piece, and differs with the seed", () => {
    const whole = replicatesOf({ last: 50 });
    expect([...replicatesOf({ last: 20 }), ...replicatesOf({ first: 20, last: 50 })]).toEqual(whole);
    expect(replicatesOf({ seed: 10, last: 50 })).not.toEqual(whole);
  });

  it("has replicates that do not follow each other: lag-one correlation within chance", () => {
    const means = replicatesOf({}).map((one) => one?.[0] ?? 0);
    const centre = means.reduce((sum, value) => sum + value, 0) / means.length;
    const centred = means.map((value) => value - centre);
    const product = (lag: number) =>
      centred.slice(lag).reduce((sum, value, i) => sum + value * (centred[i] ?? 0), 0);
    expect(Math.abs(product(1) / product(0))).toBeLessThan(4 / Math.sqrt(means.length));
  });

  it("tells how far it is, stops when asked and goes on where it stopped", () => {
    const seen: number[] = [];
    const stopped = bootstrapRuns({
      ...request,
      last: 30,
      onProgress: (done) => seen.push(done),
      shouldStop: () => seen.length === 7,
    });
    if (stopped.status !== "stopped") throw new Error(stopped.status);
    expect(seen).toEqual([1, 2, 3, 4, 5, 6, 7]);
    expect([...stopped.replicates, ...replicatesOf({ first: stopped.next, last: 30 })]).toEqual(
      replicatesOf({ last: 30 }),
    );
  });

  it("refuses fewer than ten runs and numbers that are not whole", () => {
    const few = bootstrapRuns({ ...request, runs: 9 });
    expect(few.status === "too-few-runs" ? few.message : "").toContain("10 runs, and there are 9");
    expect(bootstrapRuns({ ...request, first: 0.5 }).status).toBe("bad-request");
  });

  it("counts refits that fail, lets no NaN through, and flags many of them", () => {
    const refit = (indices: Int32Array) =>
      indices[0] === 0 ? null : indices[0] === 1 ? [Number.NaN] : meanOf(indices);
    const result = bootstrapIntervals([0], replicatesOf({ refit }));
    if (result.status !== "intervals") throw new Error(result.message);
    expect(result.failed / 2000).toBeCloseTo(2 / 12, 1);
    expect(result.parameters.flatMap((one) => one.percentile).every(Number.isFinite)).toBe(true);
    expect(result.flags.map((flag) => flag.code)).toEqual(["bootstrap-refits-failed"]);
    expect(bootstrapIntervals([0], replicatesOf({ last: 100 })).status).toBe("too-few-replicates");
  });
});

import { randomDraws } from "kinetics-core/random";
import { fitRateLaw } from "kinetics-core/rate-law";
import { nineRuns, simulateRuns } from "kinetics-core/simulation";
import { describe, expect, it } from "vitest";
import { expectedWidths, type WidthRequest } from "./expected-widths";

const design = simulateRuns({ ...nineRuns, rateErrors: [], pipetting: 0 }, randomDraws(1).normal);
const request = (changes: Partial<WidthRequest> = {}): WidthRequest => ({
  design,
  logRateConstant: Math.log(11.8),
  orders: { A: 1, B: 2 },
  scatter: 0.03,
  draws: randomDraws(5),
  replicates: 150,
  ...changes,
});

function simulated(changes: Partial<WidthRequest> = {}) {
  const result = expectedWidths(request(changes));
  if (result.status !== "simulated") throw new Error(result.status);
  return result;
}

describe("expected widths", () => {
  it("have the middle that theory gives: t s_ln √C_ii times the median of √(χ²/ν), ν = 6", () => {
    const fit = fitRateLaw(design);
    if (fit.status !== "fitted") throw new Error(fit.message);
    const [, row] = fit.covariance ?? [];
    const scatterOfFit = Number(fit.betweenRunStandardDeviation);
    const factor = Math.sqrt(row?.[1] ?? 0) / scatterOfFit;
    // t(0.975; 6) = 2.446912; median of χ² with 6 degrees of freedom 5.348121.
    const expected = 2.446912 * 0.03 * factor * Math.sqrt(5.348121 / 6);
    const { orders } = simulated({ replicates: 250 });
    // Standard error of a median of √(χ²/6) from 250: about 2.3 %.
    expect(Math.abs(Number(orders.A?.median) / expected - 1)).toBeLessThan(0.08);
    expect(Number(orders.A?.fourOfFive)).toBeGreaterThan(Number(orders.A?.median));
  });

  it("grow with the scatter and repeat for one seed", () => {
    const one = simulated({ replicates: 40 });
    expect(simulated({ replicates: 40 })).toEqual(one);
    const wider = simulated({ replicates: 40, scatter: 0.06 });
    expect(Number(wider.logRateConstant.median) / one.logRateConstant.median).toBeCloseTo(2, 6);
  });

  it("carry stated shared errors, which more scatter-free runs would not lower", () => {
    const shared = [{ species: ["A"], relative: 0.05 }];
    const result = simulated({ design: { ...design, shared }, scatter: 0.003, replicates: 40 });
    expect(result.logRateConstant.median).toBeGreaterThan(1.9 * 0.05);
    expect(Number(result.orders.A?.median)).toBeLessThan(0.01);
  });

  it("report progress, and stop when asked with what was reached", () => {
    const parts: number[] = [];
    const result = expectedWidths(
      request({ progress: (part) => parts.push(part), shouldStop: () => parts.length === 12 }),
    );
    expect(result).toMatchObject({ status: "stopped", replicates: 12 });
    expect(parts.at(-1)).toBeCloseTo(12 / 150, 12);
  });

  it("say that a design gives no interval", () => {
    const small = { ...design, runs: design.runs.slice(0, 3) };
    expect(expectedWidths(request({ design: small, replicates: 5 }))).toMatchObject({
      status: "no-interval",
      message: expect.stringContaining("None of 5"),
    });
  });

  it.each([
    [{ scatter: -1 }, "scatter"],
    [{ orders: { A: 1 } }, "orders.B"],
    [{ replicates: 0 }, "replicates"],
    [{ logRateConstant: Number.NaN }, "logRateConstant"],
  ])("refuse %j and name the place", (changes, place) => {
    expect(expectedWidths(request(changes))).toMatchObject({ status: "bad-input", place });
  });
});

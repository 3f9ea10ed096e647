import { spawnSync } from "node:child_process";
import path from "node:path";
import { describe, expect, it } from "vitest";
import { openApiDocument } from "../openapi.json/document";
import { initialRateResponse } from "./initial-rate/schema";
import { rateLawResponse } from "./rate-law/schema";
import { COMPUTATION_NAMES, initialRateComputation, rateLawComputation, runComputation } from "./registry";

const repository = path.resolve(import.meta.dirname, "../../../..");

/** NO + O3, OpenStax Chemistry 2e, example 12.4: orders 1 and 1, k = 2.20 × 10⁷ L mol⁻¹ s⁻¹. */
const NITRIC_OXIDE_AND_OZONE = {
  species: ["NO", "O3"],
  runs: [
    { label: "1", concentrations: { NO: 1e-6, O3: 3e-6 }, rate: 6.6e-5 },
    { label: "2", concentrations: { NO: 1e-6, O3: 6e-6 }, rate: 1.32e-4 },
    { label: "3", concentrations: { NO: 1e-6, O3: 9e-6 }, rate: 1.98e-4 },
    { label: "4", concentrations: { NO: 2e-6, O3: 9e-6 }, rate: 3.96e-4 },
    { label: "5", concentrations: { NO: 3e-6, O3: 9e-6 }, rate: 5.94e-4 },
  ],
};

/** A straight fall of 2 a second from 100, so that every estimator must find a slope of −2. */
const TIME = Array.from({ length: 40 }, (_, index) => index * 0.5);
const FALLING = TIME.map((time) => 100 - 2 * time);

describe("initial-rate", () => {
  const compute = (body: unknown) => runComputation(initialRateComputation, body);

  it("answers in its own described shape", () => {
    const computed = compute({ time: TIME, signal: FALLING, initialConcentration: 100 });
    if (!computed.ok) throw new Error(JSON.stringify(computed.errors));
    expect(initialRateResponse.parse(computed.answer)).toEqual(computed.answer);
  });

  it("gives the signed slope without a stoichiometric number and the rate of reaction with one", () => {
    const slope = compute({ time: TIME, signal: FALLING, initialConcentration: 100 });
    const rate = compute({
      time: TIME,
      signal: FALLING,
      initialConcentration: 100,
      stoichiometricNumber: -2,
    });
    expect(slope.ok && slope.answer.rate.estimate).toBeCloseTo(-2, 10);
    expect(rate.ok && rate.answer.rate.estimate).toBeCloseTo(1, 10);
  });

  it("says where a burst makes the slope at mixing no initial rate", () => {
    // S = 0.05 t + 0.2(1 − e^(−t)), with a tremor that no smooth course has.
    const signal = TIME.map((time, i) => 0.05 * time - 0.2 * Math.expm1(-time) + 0.002 * Math.sin(7 * i * i));
    const burst = compute({ time: TIME, signal, initialConcentration: 10 });
    const codes = burst.ok ? burst.answer.flags.map((flag) => flag.code) : [];
    expect(codes).toContain("burst");
    const plain = compute({ time: TIME, signal: FALLING, initialConcentration: 100 });
    expect(plain.ok && plain.answer.flags.map((flag) => flag.code)).not.toContain("burst");
  });

  it("divides by the calibration factor and carries its uncertainty: u(v)/v = u(εl)/εl on an exact line", () => {
    const computed = compute({
      time: TIME,
      signal: FALLING,
      initialConcentration: 0.1,
      signalPerConcentration: { value: 1000, standardUncertainty: 20 },
      stoichiometricNumber: -1,
    });
    if (!computed.ok) throw new Error(JSON.stringify(computed.errors));
    const { estimate, standardError } = computed.answer.rate;
    expect(estimate).toBeCloseTo(0.002, 12);
    expect((standardError ?? 0) / (estimate ?? 1)).toBeCloseTo(0.02, 6);
  });

  it("counts conversion in the limiting reactant: two products for one reactant double the span", () => {
    const rising = TIME.map((time) => 2 * time);
    const computed = compute({
      time: TIME,
      signal: rising,
      initialConcentration: 50,
      stoichiometricNumber: 2,
      window: [0, 10],
      estimator: "straight",
    });
    expect(computed.ok && computed.answer.conversion).toBeCloseTo(20 / 100, 10);
  });

  it.each([
    ["a missing signal", { time: TIME }, "signal"],
    ["a word among the times", { time: [0, "one"], signal: [1, 2] }, "time.1"],
    [
      "times that stand still",
      { time: [0, 1, 1, 2, 3, 4, 5, 6, 7, 8], signal: FALLING.slice(0, 10) },
      "time",
    ],
    ["fewer signals than times", { time: TIME, signal: FALLING.slice(1) }, "signal"],
    ["a window without points", { time: TIME, signal: FALLING, window: [50, 60] }, "window"],
    [
      "a factor of zero",
      { time: TIME, signal: FALLING, signalPerConcentration: { value: 0, standardUncertainty: 0 } },
      "signalPerConcentration.value",
    ],
    [
      "a degree for a straight line",
      { time: TIME, signal: FALLING, estimator: "straight", degree: 2 },
      "degree",
    ],
  ])("refuses %s and names the place", (_, body, place) => {
    const computed = compute(body);
    expect(computed.ok).toBe(false);
    expect(computed.ok || computed.errors[0]?.path).toBe(place);
    expect(computed.ok || computed.errors[0]?.message).toMatch(/\w/);
  });
});

describe("rate-law", () => {
  const compute = (body: unknown) => runComputation(rateLawComputation, body);

  it("answers in its own described shape", () => {
    const computed = compute(NITRIC_OXIDE_AND_OZONE);
    if (!computed.ok) throw new Error(JSON.stringify(computed.errors));
    expect(rateLawResponse.parse(computed.answer)).toEqual(computed.answer);
  });

  it("finds the published law of a printed table", () => {
    const computed = compute(NITRIC_OXIDE_AND_OZONE);
    if (!computed.ok) throw new Error(JSON.stringify(computed.errors));
    const { simpleOrders } = computed.answer;
    expect(simpleOrders.orders).toEqual({ NO: 1, O3: 1 });
    expect(simpleOrders.rateConstant.estimate).toBeCloseTo(2.2e7, -2);
    expect(simpleOrders.rateConstant.unit).toBe("L mol^-1 s^-1");
  });

  it("gives k in the units of the request", () => {
    const computed = compute({ ...NITRIC_OXIDE_AND_OZONE, concentrationUnit: "mmol/L", timeUnit: "min" });
    expect(computed.ok && computed.answer.rateConstant.unit).toBe("L mmol^-1 min^-1");
  });

  it("says null, not zero, where one run too few leaves no uncertainty", () => {
    const computed = compute({
      species: ["A"],
      runs: [
        { label: "1", concentrations: { A: 0.1 }, rate: 1e-3 },
        { label: "2", concentrations: { A: 0.2 }, rate: 2e-3 },
      ],
    });
    if (!computed.ok) throw new Error(JSON.stringify(computed.errors));
    expect(computed.answer.orders.A).toMatchObject({ standardError: null, interval: null });
    expect(computed.answer.orders.A?.estimate).toBeCloseTo(1, 12);
    expect(computed.answer.degreesOfFreedom).toBe(0);
  });

  it.each([
    ["no species", { ...NITRIC_OXIDE_AND_OZONE, species: [] }, "species"],
    ["a species twice", { ...NITRIC_OXIDE_AND_OZONE, species: ["NO", "NO"] }, "species"],
    [
      "a run without one concentration",
      { ...NITRIC_OXIDE_AND_OZONE, species: ["NO", "O3", "X"] },
      "runs.0.concentrations.X",
    ],
    [
      "a rate in words",
      { species: ["A"], runs: [{ label: "1", concentrations: { A: 1 }, rate: "fast" }] },
      "runs.0.rate",
    ],
    [
      "two runs of one label",
      {
        ...NITRIC_OXIDE_AND_OZONE,
        runs: [...NITRIC_OXIDE_AND_OZONE.runs, ...NITRIC_OXIDE_AND_OZONE.runs.slice(2, 3)],
      },
      "runs.5.label",
    ],
    [
      "a shared error of an unknown run",
      { ...NITRIC_OXIDE_AND_OZONE, shared: [{ species: ["NO"], relative: 0.01, runs: ["9"] }] },
      "shared.0.runs.0",
    ],
    ["an order of an unknown species", { ...NITRIC_OXIDE_AND_OZONE, orders: { X: 1 } }, "orders.X"],
  ])("refuses %s and names the place", (_, body, place) => {
    const computed = compute(body);
    expect(computed.ok).toBe(false);
    expect(computed.ok || computed.errors[0]?.path).toBe(place);
  });
});

describe("the description", () => {
  it("covers every computation with the schemas that check its requests", () => {
    const { paths, components } = openApiDocument();
    expect(Object.keys(paths ?? {})).toEqual(COMPUTATION_NAMES.map((name) => `/api/v1/compute/${name}`));
    expect(Object.keys(components?.schemas ?? {})).toEqual(
      expect.arrayContaining([
        "InitialRateRequest",
        "RateLawRequest",
        "RateLawResponse",
        "Estimate",
        "Problem",
      ]),
    );
  });
});

describe("the command line", () => {
  const run = (name: string, input: string) =>
    spawnSync(process.execPath, ["--import", "tsx", "app/api/v1/compute/command-line.ts", name], {
      cwd: repository,
      input,
      encoding: "utf8",
    });

  it("prints exactly what the API answers", () => {
    const { status, stdout } = run("rate-law", JSON.stringify(NITRIC_OXIDE_AND_OZONE));
    const computed = runComputation(rateLawComputation, NITRIC_OXIDE_AND_OZONE);
    expect(status).toBe(0);
    expect(JSON.parse(stdout)).toEqual(computed.ok && computed.answer);
  });

  it("sends bad input to standard error with exit status 2", () => {
    const wrong = run("rate-law", JSON.stringify({ species: ["A"], runs: [] }));
    expect(wrong).toMatchObject({ status: 2, stdout: "" });
    expect(wrong.stderr).toMatch(/^runs: /);
    expect(run("rate-law", "{").stderr).toMatch(/not JSON/);
    expect(run("no-such", "{}")).toMatchObject({ status: 2, stdout: "" });
  });
});

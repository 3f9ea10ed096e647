import { randomDraws } from "kinetics-core/random";
import { describe, expect, it } from "vitest";
import type { EndSignal } from "./end-signal";
import { fitSignalCourse, type SignalCourseFit, type SignalCourseInput } from "./fit-signal-course";

function fitted(input: SignalCourseInput): SignalCourseFit {
  const result = fitSignalCourse(input);
  if (result.status !== "fitted") throw new Error(`expected a fit, got ${result.status}: ${result.message}`);
  return result;
}

const time = Float64Array.from({ length: 60 }, (_, i) => 2 + 3 * i);
const blank: EndSignal = { kind: "known", value: 0.05, standardUncertainty: 0 };
const signalOf = (part: (t: number) => number, error: () => number = () => 0) =>
  time.map((t) => 0.05 + 0.8 * part(t) + error());

/** Closed forms in their textbook quotients, independent of those under test. */
const unequal = (rate: number, excess: number) => (t: number) =>
  excess === 0 ? 1 / (1 + rate * t) : excess / ((1 + excess) * Math.exp(excess * rate * t) - 1);
const reversible = (forward: number, back: number) => (t: number) =>
  (back + forward * Math.exp(-(forward + back) * t)) / (forward + back);
const autocatalytic = (rate: number, seed: number) => (t: number) =>
  (1 + seed) / (1 + seed * Math.exp((1 + seed) * rate * t));

function expectParameters(
  fit: SignalCourseFit,
  expected: Readonly<Record<string, number>>,
  digits = 6,
): void {
  for (const [name, value] of Object.entries(expected))
    expect(fit.parameters[name]?.estimate, name).toBeCloseTo(value, digits);
}

describe("a noiseless course gives its truth back", () => {
  it.each([-0.5, -0.01, 0, 1e-7, 0.01, 1, 6])("A + B with an excess of %s, free and held", (excess) => {
    const signal = signalOf(unequal(0.04, excess));
    const free = fitted({ time, signal, law: { name: "unequal-second-order" }, endSignal: blank });
    expectParameters(free, { rate: 0.04, excess });
    const held = fitted({ time, signal, law: { name: "unequal-second-order", excess } });
    expectParameters(held, { rate: 0.04 });
    expect(held.endSignal.estimate).toBeCloseTo(0.05, 7);
    expect(held.scales[0]?.estimate).toBeCloseTo(0.8, 7);
  });

  it("A ⇌ P with the signal without A known", () => {
    const signal = signalOf(reversible(0.02, 0.007));
    expectParameters(fitted({ time, signal, law: { name: "reversible" }, endSignal: blank }), {
      forward: 0.02,
      back: 0.007,
    });
  });

  it.each([
    [0.05, 0.011],
    [0.03, 0.0300001],
  ])("A → I → P of rates %s and %s", (first, second) => {
    const intermediate = (t: number) =>
      (first * (Math.exp(-first * t) - Math.exp(-second * t))) / (second - first);
    const signal = time.map((t) => 0.05 + 0.2 * Math.exp(-first * t) + 0.9 * intermediate(t));
    const fit = fitted({ time, signal, law: { name: "consecutive" }, endSignal: blank });
    const rates = [fit.parameters.first?.estimate ?? 0, fit.parameters.second?.estimate ?? 0].toSorted(
      (a, b) => b - a,
    );
    expect(rates[0]).toBeCloseTo(first, 4);
    expect(rates[1]).toBeCloseTo(Math.min(first, second), 4);
  });

  it("A → I → P of equal rates: the course is followed, though two unknown amounts leave the rates apart all but free", () => {
    const signal = time.map((t) => 0.05 + (0.2 + 0.9 * 0.03 * t) * Math.exp(-0.03 * t));
    const fit = fitted({ time, signal, law: { name: "consecutive" }, endSignal: blank });
    expect(fit.residualStandardDeviation).toBeLessThan(1e-9);
    for (const rate of [fit.parameters.first, fit.parameters.second])
      if (rate?.estimate !== null) expect(rate?.estimate).toBeCloseTo(0.03, 3);
  });

  it.each([0.001, 0.1, 2])("A + P → 2 P with a seed of %s", (seed) => {
    const signal = signalOf(autocatalytic(0.06, seed));
    expectParameters(fitted({ time, signal, law: { name: "autocatalytic" }, endSignal: blank }), {
      rate: 0.06,
      seed,
    });
  });
});

describe("with noise", () => {
  it("intervals cover, at equal amounts too", () => {
    const draws = randomDraws(77);
    let [covered, counted] = [0, 0];
    for (const excess of [0, 0.3, 2]) {
      for (let replicate = 0; replicate < 10; replicate++) {
        const signal = signalOf(unequal(0.04, excess), () => 0.002 * draws.normal());
        const { parameters } = fitted({
          time,
          signal,
          law: { name: "unequal-second-order" },
          endSignal: blank,
        });
        for (const [name, truth] of [
          ["rate", 0.04],
          ["excess", excess],
        ] as const) {
          const interval = parameters[name]?.interval;
          counted++;
          if (interval && interval[0] <= truth && truth <= interval[1]) covered++;
        }
      }
    }
    expect(covered / counted).toBeGreaterThan(0.85);
  });

  it("a reversible course with a free end says that its rates are not determined", () => {
    const draws = randomDraws(7);
    const signal = signalOf(reversible(0.02, 0.007), () => 0.002 * draws.normal());
    const fit = fitted({ time, signal, law: { name: "reversible" } });
    expect(fit.flags).toContainEqual(expect.objectContaining({ code: "undetermined", severity: "blocks" }));
    expect(fit.parameters.forward?.interval).toBeNull();
  });

  it("a law that does not fit shows it", () => {
    const draws = randomDraws(8);
    const signal = signalOf(autocatalytic(0.06, 0.01), () => 0.002 * draws.normal());
    const fit = fitted({ time, signal, law: { name: "unequal-second-order" }, endSignal: blank });
    const codes = fit.flags.map(({ code }) => code);
    expect(codes).toEqual(expect.arrayContaining(["undetermined", "autocorrelated"]));
  });
});

describe("refusals", () => {
  it("are named", () => {
    const law = { name: "consecutive" } as const;
    expect(fitSignalCourse({ time: [0, 1], signal: [1, 0.5], law })).toMatchObject({
      status: "too-few-points",
      needed: 5,
    });
    expect(fitSignalCourse({ time: [0, 1, 2, 3, 4, 5], signal: [1, 1, 1, 1, 1, 1], law })).toMatchObject({
      status: "unusable",
      code: "constant-signal",
    });
    const excess = { name: "unequal-second-order", excess: -2 } as const;
    expect(() => fitSignalCourse({ time, signal: time, law: excess })).toThrow(RangeError);
  });
});

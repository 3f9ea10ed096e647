import { studentTFactor } from "kinetics-core/distributions";
import { randomDraws } from "kinetics-core/random";
import { progressTo, type SimulatedCourse, simulateTrace, trueSlope } from "kinetics-core/simulation";
import { describe, expect, it } from "vitest";
import { estimateInitialRate } from "./estimate-initial-rate";

/**
 * How often the 95 % interval of a single trace covers the true slope, over orders, conversions, lengths and
 * noise. A small cut of a larger study in which this rule covered 96 % and a line to 10 % conversion 21 %.
 */

const REPLICATES = 30;
const courses: SimulatedCourse[] = [0, 0.5, 1, 2].flatMap((order) =>
  [0.1, 0.4, 0.8].flatMap((conversion) =>
    [40, 160].flatMap((readings) =>
      [
        { noise: 0.002, autocorrelation: 0 },
        { noise: 0.01, autocorrelation: 0.6 },
      ].map((noise) => ({
        order,
        progress: progressTo(conversion, order),
        readings,
        duration: 100,
        start: 0.1,
        span: 1,
        ...noise,
      })),
    ),
  ),
);

interface Outcome {
  readonly order: number;
  readonly covered: boolean;
  readonly lineCovered: boolean;
}

function simulate(): Outcome[] {
  const deviate = randomDraws(2026).normal;
  return courses.flatMap((course) =>
    Array.from({ length: REPLICATES }, () => {
      const trace = simulateTrace(course, deviate);
      const truth = trueSlope(course);
      const result = estimateInitialRate(trace, { signalSpan: course.span });
      if (result.status !== "found") throw new Error(result.message);
      const [low, high] = result.interval;
      return {
        order: course.order,
        covered: low <= truth && truth <= high,
        lineCovered: coveredByLine(trace.time, trace.signal, course, truth),
      };
    }),
  );
}

/** The usual line to 10 % conversion with the usual error of independent residuals. */
function coveredByLine(
  time: ArrayLike<number>,
  signal: ArrayLike<number>,
  { start, span }: SimulatedCourse,
  truth: number,
): boolean {
  const beyond = Array.from(signal).findIndex((s) => s > start + 0.1 * span);
  const points = Math.max(beyond < 0 ? signal.length : beyond, 4);
  const x = Array.from(time).slice(0, points);
  const y = Array.from(signal).slice(0, points);
  const meanX = x.reduce((a, b) => a + b, 0) / points;
  const meanY = y.reduce((a, b) => a + b, 0) / points;
  const squares = x.reduce((sum, t) => sum + (t - meanX) ** 2, 0);
  const slope = x.reduce((sum, t, i) => sum + (t - meanX) * (Number(y[i]) - meanY), 0) / squares;
  const rest = x.reduce((sum, t, i) => sum + (Number(y[i]) - meanY - slope * (t - meanX)) ** 2, 0);
  const error = Math.sqrt(rest / (points - 2) / squares);
  return Math.abs(slope - truth) <= error * studentTFactor(0.95, points - 2);
}

function share(outcomes: Outcome[], key: "covered" | "lineCovered"): number {
  return outcomes.filter((outcome) => outcome[key]).length / outcomes.length;
}

describe("coverage of the true slope by the 95 % interval", () => {
  const outcomes = simulate();

  it("is at least 93 % overall", () => {
    expect(share(outcomes, "covered")).toBeGreaterThan(0.93);
  });

  it.each([0, 0.5, 1, 2])("is at least 87 % for order %s", (order) => {
    expect(
      share(
        outcomes.filter((outcome) => outcome.order === order),
        "covered",
      ),
    ).toBeGreaterThan(0.87);
  });

  it("is lost by the usual line to 10 % conversion", () => {
    expect(share(outcomes, "lineCovered")).toBeLessThan(0.6);
    expect(
      share(
        outcomes.filter(({ order }) => order === 2),
        "lineCovered",
      ),
    ).toBeLessThan(0.4);
  });
});

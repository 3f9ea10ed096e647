import { type Flag, inARow, printNumber, verb } from "kinetics-core/quantities";
import {
  COLD_BELOW_K,
  CURVATURE_SHOWN_BELOW,
  FEWEST_FOR_INTERVAL,
  POORLY_KNOWN_ABOVE,
  SAME_ORDER_WITHIN,
  USUAL_FEWEST,
  USUAL_RANGE_K,
} from "./constants";
import { statesUncertainty } from "./point-variances";
import type { CurvatureTest, TemperatureInput, TemperaturePoint } from "./temperature";

export interface TemperatureFindings {
  readonly temperatures: number;
  readonly range: readonly [number, number];
  readonly curvature: CurvatureTest | null;
  readonly degreesOfFreedom: number;
}

/** What a reader of activation parameters should know, each with its way out. */
export function temperatureFlags(input: TemperatureInput, findings: TemperatureFindings): readonly Flag[] {
  return [
    ...lawFlags(input.points),
    ...numberFlags(findings),
    ...rangeFlags(findings),
    ...curvatureFlags(findings),
    ...uncertaintyFlags(input),
    ...standardStateFlags(input),
  ];
}

/** k of another set of orders is another quantity: no line leads from one to the other. */
function lawFlags(points: readonly TemperaturePoint[]): readonly Flag[] {
  const first = points[0]?.orders;
  const differs = points.findIndex((point) => !sameOrders(first, point.orders));
  if (differs < 0) return [];
  return [
    {
      code: "different-laws",
      severity: "blocks",
      message: `Point ${differs + 1} has other orders than point 1 (${inWords(points[differs]?.orders)} against ${inWords(first)}), so their rate constants are different quantities. Hold the same orders in every study, then compare.`,
    },
  ];
}

type Orders = Readonly<Record<string, number>> | undefined;

function sameOrders(first: Orders, second: Orders): boolean {
  const one = new Map(Object.entries(first ?? {}));
  const other = new Map(Object.entries(second ?? {}));
  const names = new Set([...one.keys(), ...other.keys()]);
  return [...names].every(
    (name) => Math.abs((one.get(name) ?? 0) - (other.get(name) ?? 0)) <= SAME_ORDER_WITHIN,
  );
}

function inWords(orders: Orders): string {
  const entries = Object.entries(orders ?? {});
  return entries.length === 0 ? "none stated" : entries.map(([name, n]) => `${name} ${n}`).join(", ");
}

function numberFlags({ temperatures, degreesOfFreedom }: TemperatureFindings): readonly Flag[] {
  if (temperatures < FEWEST_FOR_INTERVAL)
    return [
      {
        code: "too-few-temperatures",
        severity: "blocks",
        message: `Two temperatures determine the line exactly and nothing checks it, so no interval can be given. One more temperature gives a first interval, two or three more a usable one.`,
      },
    ];
  if (temperatures < USUAL_FEWEST)
    return [
      {
        code: "few-temperatures",
        severity: "weakens",
        message: `Three temperatures leave ${degreesOfFreedom === 1 ? "one degree" : `${degreesOfFreedom} degrees`} of freedom; four or five are common practice, and a fifth would show a curvature.`,
      },
    ];
  return [];
}

function rangeFlags({ range }: TemperatureFindings): readonly Flag[] {
  const width = range[1] - range[0];
  const flags: Flag[] = [];
  if (range[1] < COLD_BELOW_K)
    flags.push({
      code: "very-cold",
      severity: "weakens",
      message: `All temperatures lie below ${COLD_BELOW_K} K. If they are degrees Celsius, state that unit: every figure here depends on it.`,
    });
  if (width < USUAL_RANGE_K)
    flags.push({
      code: "narrow-temperature-range",
      severity: "weakens",
      message: `The temperatures span ${printNumber(width, 3)} K; common practice is 20 to 40 K, since the error of the activation energy grows as the span of 1/T shrinks. A temperature further out would narrow the interval most.`,
    });
  return flags;
}

function curvatureFlags({ curvature, temperatures }: TemperatureFindings): readonly Flag[] {
  if (curvature === null) {
    if (temperatures < FEWEST_FOR_INTERVAL) return [];
    return [
      {
        code: "curvature-not-tested",
        severity: "note",
        message: `With ${temperatures} temperatures a change of the activation energy with temperature cannot be told from scatter; the test needs five.`,
      },
    ];
  }
  if (curvature.pValue >= CURVATURE_SHOWN_BELOW) return [];
  const slope = curvature.activationEnergySlope.estimate ?? 0;
  return [
    {
      code: "curvature-shown",
      severity: "weakens",
      message: `The Arrhenius plot is curved (p = ${printNumber(curvature.pValue, 2)}): the activation energy ${slope > 0 ? "rises" : "falls"} with temperature, so one value does not describe the range and extrapolation is not safe. Look for a change of mechanism, of the rate-determining step, or a temperature that was not reached; or restrict the range.`,
    },
  ];
}

function uncertaintyFlags({ points }: TemperatureInput): readonly Flag[] {
  const flags: Flag[] = [];
  const stated = points.filter(statesUncertainty).length;
  if (stated > 0 && stated < points.length)
    flags.push({
      code: "uncertainty-missing",
      severity: "note",
      message: `${stated} of ${points.length} points ${verb(stated, "states", "state")} an uncertainty of k; since the others state none, all count alike. State it for every point to weight them.`,
    });
  const poor = points.flatMap((point, index) =>
    (point.rateConstantUncertainty ?? 0) > POORLY_KNOWN_ABOVE * point.rateConstant ? [`${index + 1}`] : [],
  );
  if (poor.length > 0)
    flags.push({
      code: "rate-constant-poorly-known",
      severity: "weakens",
      message:
        poor.length === 1
          ? `The rate constant of point ${inARow(poor)} is known to worse than 20 %, where its logarithm is off on average and no longer symmetric. Repeat that temperature.`
          : `The rate constants of points ${inARow(poor)} are known to worse than 20 %, where their logarithms are off on average and no longer symmetric. Repeat those temperatures.`,
    });
  return flags;
}

function standardStateFlags({ unit }: TemperatureInput): readonly Flag[] {
  if (unit?.concentrationUnit !== "mmHg" || unit.overallOrder === 1) return [];
  return [
    {
      code: "entropy-standard-state",
      severity: "note",
      message:
        "Rate constants in mmHg have no fixed size in mol/L, so the entropy of activation refers to 1 mmHg and not to 1 mol/L. Convert the pressures to concentrations to compare it with others.",
    },
  ];
}

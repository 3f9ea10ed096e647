import { ONE_TEMPERATURE_WITHIN_K } from "./constants";
import type { TemperatureInput, TemperaturePoint, TemperatureResult } from "./temperature";

type Fault = Exclude<TemperatureResult, { readonly status: "fitted" }>;

/** The first value that cannot be used, or too few temperatures; null where a line can be fitted. */
export function faultOf({ points, shared = [], level = 0.95 }: TemperatureInput): Fault | null {
  if (!(level > 0 && level < 1))
    return bad("level", `A confidence level lies between 0 and 1, for example 0.95; this one is ${level}.`);
  for (const [index, point] of points.entries()) {
    const fault = pointFault(point, `points.${index}`, index + 1);
    if (fault !== null) return fault;
  }
  for (const [index, { relative = 0, temperatureKelvin = 0, source }] of shared.entries()) {
    for (const [name, value] of Object.entries({ relative, temperatureKelvin })) {
      if (!(value >= 0) || !Number.isFinite(value))
        return bad(
          `shared.${index}.${name}`,
          `The standard uncertainty of “${source}” is ${value}; it must be 0 or above.`,
        );
    }
  }
  const temperatures = distinctTemperatures(points);
  if (temperatures >= 2) return null;
  return {
    status: "too-few-temperatures",
    place: "points",
    message: `${points.length === 0 ? "There is no point" : "All points lie at one temperature"}; an activation energy needs two temperatures, an interval three, and four or five over 20 to 40 K are common practice.`,
  };
}

function pointFault(point: TemperaturePoint, place: string, number: number): Fault | null {
  const { temperatureKelvin, rateConstant, rateConstantUncertainty = 0 } = point;
  const { temperatureUncertaintyKelvin = 0 } = point;
  if (!isPositive(temperatureKelvin))
    return bad(
      `${place}.temperatureKelvin`,
      `The temperature of point ${number} is ${temperatureKelvin} K; it must be above 0 K. Check whether it was meant in °C.`,
    );
  if (!isPositive(rateConstant))
    return bad(
      `${place}.rateConstant`,
      `The rate constant of point ${number} is ${rateConstant}; its logarithm needs a value above 0.`,
    );
  if (!isSize(rateConstantUncertainty))
    return bad(
      `${place}.rateConstantUncertainty`,
      `The standard uncertainty of k at point ${number} is ${rateConstantUncertainty}; it must be 0 or above, or be left out.`,
    );
  if (!isSize(temperatureUncertaintyKelvin))
    return bad(
      `${place}.temperatureUncertaintyKelvin`,
      `The standard uncertainty of the temperature at point ${number} is ${temperatureUncertaintyKelvin} K; it must be 0 or above, or be left out.`,
    );
  return null;
}

/** Number of temperatures that a thermostat can tell apart. */
export function distinctTemperatures(points: readonly TemperaturePoint[]): number {
  const sorted = points.map((point) => point.temperatureKelvin).sort((a, b) => a - b);
  let last = Number.NEGATIVE_INFINITY;
  let count = 0;
  for (const temperature of sorted) {
    if (temperature - last <= ONE_TEMPERATURE_WITHIN_K) continue;
    last = temperature;
    count++;
  }
  return count;
}

function isPositive(value: number): boolean {
  return value > 0 && Number.isFinite(value);
}

function isSize(value: number): boolean {
  return value >= 0 && Number.isFinite(value);
}

function bad(place: string, message: string): Fault {
  return { status: "bad-input", place, message };
}

import { type ConcentrationUnit, rateConstantUnit, type TimeUnit } from "kinetics-core/quantities";

/**
 * Unit of k in −dy/dt = k·yⁿ, y the distance of the signal from its end, as plain text. Without a concentration unit
 * the signal is its own: "signal^-1 time^-1"; without a time unit time stands for whatever the times are in.
 */
export function signalRateConstantUnit(
  order: number,
  signalUnit: ConcentrationUnit | null,
  timeUnit: TimeUnit | null,
): string {
  if (signalUnit !== null) {
    const text = rateConstantUnit(order, signalUnit, timeUnit ?? "s");
    return timeUnit === null ? text.replace(/ ?s\^-1$/, (match) => match.replace("s", "time")) : text;
  }
  const time = `${timeUnit ?? "time"}^-1`;
  const exponent = Number((1 - order).toFixed(3));
  if (exponent === 0) return time;
  return exponent === 1 ? `signal ${time}` : `signal^${exponent} ${time}`;
}

import type { Trace } from "./initial-rate";

/** Slope of the readings before mixing, which should stand still. */
export interface Drift {
  /** Signal per time, signed. */
  readonly slope: number;
  readonly standardError: number;
}

/** Fewer readings before mixing show no drift that noise could not make. */
const LEAST_READINGS = 6;

/** A straight line through the first `before` readings by least squares; null where they are too few. */
export function driftBefore({ time, signal }: Trace, before: number): Drift | null {
  if (before < LEAST_READINGS) return null;
  let meanTime = 0;
  let meanSignal = 0;
  for (let i = 0; i < before; i++) {
    meanTime += (time[i] ?? Number.NaN) / before;
    meanSignal += (signal[i] ?? Number.NaN) / before;
  }
  let spread = 0;
  let product = 0;
  for (let i = 0; i < before; i++) {
    const at = (time[i] ?? Number.NaN) - meanTime;
    spread += at * at;
    product += at * ((signal[i] ?? Number.NaN) - meanSignal);
  }
  const slope = product / spread;
  let residuals = 0;
  for (let i = 0; i < before; i++) {
    const fitted = meanSignal + slope * ((time[i] ?? Number.NaN) - meanTime);
    residuals += ((signal[i] ?? Number.NaN) - fitted) ** 2;
  }
  return { slope, standardError: Math.sqrt(residuals / (before - 2) / spread) };
}

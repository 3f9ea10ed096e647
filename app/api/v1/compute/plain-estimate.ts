import type { Estimate } from "kinetics-core/quantities";

/** An estimate of the library in the shape of the API, and nothing else that it may carry. */
export function plainEstimate({ estimate, standardError, interval, level }: Estimate) {
  const ends: [number, number] | null = interval === null ? null : [...interval];
  return { estimate, standardError, interval: ends, level };
}

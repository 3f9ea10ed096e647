import type { InitialRateFound } from "kinetics-core/initial-rate";

/** A spread takes two values at least. */
const FEWEST_INDEPENDENT = 2;

/**
 * Whether a trace holds enough independent readings to say anything of its noise. A short trace without noise has
 * residuals that are all curve: they correlate up to the limit, and n(1−ρ)/(1+ρ) falls below one.
 */
export function judgesNoise({ effectivePoints }: Pick<InitialRateFound, "effectivePoints">): boolean {
  return effectivePoints >= FEWEST_INDEPENDENT;
}

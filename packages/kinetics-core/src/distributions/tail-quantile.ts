import type { Tails } from "./incomplete-gamma";

/**
 * Point x > 0 at which a positive distribution has the given tails. Newton's method on the logarithm of the
 * smaller tail in ln x (nearly straight far out in both tails), kept inside a bracket by bisection.
 * `density` is that of the distribution whose tails are `tails`.
 */
export function tailQuantile(
  wanted: Tails,
  tails: (x: number) => Tails,
  density: (x: number) => number,
  start: number,
): number {
  const byUpper = wanted.upper <= wanted.lower;
  const target = Math.log(byUpper ? wanted.upper : wanted.lower);
  // Increasing in u = ln x on either side: (ln lower − target) or (target − ln upper).
  const excess = (u: number): { value: number; slope: number } => {
    const x = Math.exp(u);
    const both = tails(x);
    const tail = byUpper ? both.upper : both.lower;
    const value = byUpper ? target - Math.log(tail) : Math.log(tail) - target;
    return { value, slope: (density(x) * x) / tail };
  };
  let u = Math.log(start);
  let low = u;
  let high = u;
  let width = 0.5;
  while (excess(low).value > 0 && low > -700) {
    high = low;
    low -= width;
    width *= 2;
  }
  width = 0.5;
  while (excess(high).value < 0 && high < 700) {
    low = high;
    high += width;
    width *= 2;
  }
  u = 0.5 * (low + high);
  for (let iteration = 0; iteration < 200; iteration++) {
    const { value, slope } = excess(u);
    if (value === 0) break;
    if (value > 0) high = u;
    else low = u;
    const newton = u - value / slope;
    const next = newton > low && newton < high ? newton : 0.5 * (low + high);
    if (Math.abs(next - u) < 4e-16 * Math.max(1, Math.abs(u))) {
      u = next;
      break;
    }
    u = next;
  }
  return Math.exp(u);
}

/** Refuses what is no probability: a programmer's error, never the data's. */
export function assertProbability(p: number, name: string): void {
  if (!(p >= 0 && p <= 1)) throw new RangeError(`${name} needs a probability between 0 and 1, got ${p}`);
}

/** Refuses degrees of freedom that are not above 0. */
export function assertDegreesOfFreedom(degreesOfFreedom: number, name: string): void {
  if (!(degreesOfFreedom > 0))
    throw new RangeError(`${name} needs degrees of freedom above 0, got ${degreesOfFreedom}`);
}

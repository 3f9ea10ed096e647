/** Exponentials a point that a fit cannot do without: about one a pass. */
const EXPONENTIALS = 6;

/**
 * The floor: a bare loop that evaluates six exponentials a point and does nothing else. Returns their sum, so that
 * nothing is left out.
 */
export function floorLoop(times: readonly Float64Array[], rateConstant: number): number {
  let sum = 0;
  for (const time of times) {
    const scale = rateConstant / (time[time.length - 1] ?? 1);
    for (let i = 0; i < time.length; i++) {
      const x = scale * (time[i] ?? 0);
      for (let j = 1; j <= EXPONENTIALS; j++) sum += Math.exp(-j * x);
    }
  }
  return sum;
}

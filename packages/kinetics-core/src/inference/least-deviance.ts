/** Deviance at a variance and its derivative by that variance. */
export interface DevianceAt {
  readonly deviance: number;
  readonly slope: number;
}

/**
 * Least of a deviance in one variance: located on a grid over ten decades about `scale`, 0 included where the variance
 * may vanish, so that a second minimum is not missed, then refined on the root of the slope.
 */
export function leastDeviance(
  at: (variance: number) => DevianceAt,
  scale: number,
  mayVanish: boolean,
): number {
  const grid = Array.from({ length: 11 }, (_, i) => scale * 10 ** (i - 8));
  const points = (mayVanish ? [0, ...grid] : grid).map((variance) => ({ variance, ...at(variance) }));
  let best = 0;
  points.forEach((point, i) => {
    if (point.deviance < (points[best]?.deviance ?? Number.POSITIVE_INFINITY)) best = i;
  });
  const here = points[best];
  if (here === undefined || here.slope === 0) return here?.variance ?? 0;
  const neighbour = points[here.slope > 0 ? best - 1 : best + 1];
  // At an end of the grid with the slope pointing outwards the end is the answer.
  if (neighbour === undefined) return here.variance;
  return here.slope < 0 === neighbour.slope < 0 ? here.variance : slopeRoot(at, here, neighbour);
}

interface SlopeAt {
  readonly variance: number;
  readonly slope: number;
}

/**
 * Variance between two of opposite slope at which the slope vanishes, by Chandrupatla's method (Advances in
 * Engineering Software 28, 145, 1997): inverse quadratic interpolation where it is safe, bisection elsewhere.
 */
function slopeRoot(at: (variance: number) => DevianceAt, from: SlopeAt, to: SlopeAt): number {
  let a = to;
  let b = from;
  let c = from;
  let part = 0.5;
  for (let i = 0; i < 100; i++) {
    const variance = a.variance + part * (b.variance - a.variance);
    const tried = { variance, slope: at(variance).slope };
    if (tried.slope < 0 === a.slope < 0) c = a;
    else {
      c = b;
      b = a;
    }
    a = tried;
    const best = Math.abs(a.slope) < Math.abs(b.slope) ? a : b;
    const limit = (1e-11 * best.variance) / Math.abs(b.variance - c.variance);
    if (limit > 0.5 || best.slope === 0) return best.variance;
    const xi = (a.variance - b.variance) / (c.variance - b.variance);
    const phi = (a.slope - b.slope) / (c.slope - b.slope);
    const safe = phi ** 2 < xi && (1 - phi) ** 2 < 1 - xi;
    const interpolated = safe
      ? ((a.slope / (b.slope - a.slope)) * c.slope) / (b.slope - c.slope) +
        ((((c.variance - a.variance) / (b.variance - a.variance)) * a.slope) / (c.slope - a.slope)) *
          (b.slope / (c.slope - b.slope))
      : 0.5;
    part = Math.min(1 - limit, Math.max(limit, interpolated));
  }
  return a.variance;
}

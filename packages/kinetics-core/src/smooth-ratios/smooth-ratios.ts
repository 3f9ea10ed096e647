/**
 * Two ratios that closed forms of kinetics are made of, with their derivatives, smooth through 0 where the quotient
 * itself is 0/0: not a second formula there, but the power series of the same function.
 *
 *   decayRatio(y) = (1 − e^(−y))/y = 1 − y/2 + y²/6 − …
 *   logRatio(z)   = ln(1 + z)/z    = 1 − z/2 + z²/3 − …,   z > −1
 */

/** Where the closed forms of the derivatives lose digits to cancellation, their series has them all. */
const SERIES_BELOW = 0.05;
const SERIES_TERMS = 12;

export function decayRatio(y: number): number {
  return y === 0 ? 1 : -Math.expm1(-y) / y;
}

/** d decayRatio/dy = ((1 + y)e^(−y) − 1)/y² = −1/2 + y/3 − y²/8 + … = Σ (−1)^j j y^(j−1)/(j + 1)! */
export function decayRatioSlope(y: number): number {
  if (Math.abs(y) >= SERIES_BELOW) return (Math.exp(-y) - decayRatio(y)) / y;
  let sum = 0;
  let factor = -0.5;
  for (let j = 1; j <= SERIES_TERMS; j++) {
    sum += factor;
    factor *= (-y * (j + 1)) / (j * (j + 2));
  }
  return sum;
}

export function logRatio(z: number): number {
  return z === 0 ? 1 : Math.log1p(z) / z;
}

/** d logRatio/dz = (z/(1 + z) − ln(1 + z))/z² = −1/2 + 2z/3 − 3z²/4 + … `logarithm`: ln(1 + z), where it is at hand. */
export function logRatioSlope(z: number, logarithm = Math.log1p(z)): number {
  if (Math.abs(z) >= SERIES_BELOW) return (z / (1 + z) - logarithm) / z / z;
  let sum = 0;
  for (let j = SERIES_TERMS; j >= 1; j--) sum = -j / (j + 1) - z * sum;
  return sum;
}

/**
 * Integrals of several functions at once over one stretch, by the pair of Gauss (7 points) and Kronrod (15 points):
 * their difference tells the error, and a stretch that misses the tolerance is halved (Piessens, de Doncker-Kapenga,
 * Überhuber and Kahaner, QUADPACK (1983)). Nodes never touch the ends, where an integrand may have no value.
 */

/** Writes the integrands at `u` into `into`; false where one has no finite value. */
export type Integrands = (u: number, into: Float64Array) => boolean;

/** Kronrod nodes on [0, 1) of the symmetric interval, outermost first; every second is a Gauss node. */
const NODES = [
  0.9914553711208126, 0.9491079123427585, 0.8648644233597691, 0.7415311855993945, 0.5860872354676911,
  0.4058451513773972, 0.20778495500789848, 0,
] as const;
const KRONROD = [
  0.022935322010529224, 0.06309209262997856, 0.10479001032225019, 0.14065325971552592, 0.1690047266392679,
  0.19035057806478542, 0.20443294007529889, 0.20948214108472782,
] as const;
const GAUSS = [
  0, 0.1294849661688697, 0, 0.27970539148927664, 0, 0.3818300505051189, 0, 0.4179591836734694,
] as const;

/** Of the integral of the first function, or of a function's own where that is greater. */
const TOLERANCE = 1e-11;
/** Smooth integrands need some ten stretches; one that is only rounding would be halved for ever. */
const MOST_STRETCHES = 1000;

/**
 * Adds ∫ from `from` to `to` of each function to `sums`. The first sets the scale: an error of another function below
 * 1e-11 of the first's integral is none. Returns false where a function has no finite value.
 */
export function integrate(integrands: Integrands, from: number, to: number, sums: Float64Array): boolean {
  const count = sums.length;
  const value = new Float64Array(count);
  const kronrod = new Float64Array(count);
  const gauss = new Float64Array(count);
  const size = new Float64Array(count);
  const waiting: [number, number][] = [[from, to]];
  for (let stretch = 1; ; stretch++) {
    const [low, high] = waiting.pop() ?? [to, to];
    if (low === high) return true;
    const half = (high - low) / 2;
    if (!applyRule(integrands, (low + high) / 2, half, { value, kronrod, gauss, size })) return false;
    if (stretch + waiting.length < MOST_STRETCHES && !isSettled(half, { kronrod, gauss, size }, sums)) {
      waiting.push([(low + high) / 2, high], [low, (low + high) / 2]);
      continue;
    }
    for (let j = 0; j < count; j++) sums[j] = (sums[j] ?? 0) + half * (kronrod[j] ?? 0);
  }
}

interface Sums {
  readonly kronrod: Float64Array;
  readonly gauss: Float64Array;
  /** Kronrod sum of absolute values. */
  readonly size: Float64Array;
}

function applyRule(
  integrands: Integrands,
  centre: number,
  half: number,
  { value, kronrod, gauss, size }: Sums & { readonly value: Float64Array },
): boolean {
  kronrod.fill(0);
  gauss.fill(0);
  size.fill(0);
  for (let node = 0; node < NODES.length; node++) {
    const shift = half * (NODES[node] ?? 0);
    for (let side = shift === 0 ? 1 : -1; side <= 1; side += 2) {
      if (!integrands(centre + side * shift, value)) return false;
      for (let j = 0; j < value.length; j++) {
        const y = value[j] ?? Number.NaN;
        kronrod[j] = (kronrod[j] ?? 0) + (KRONROD[node] ?? 0) * y;
        gauss[j] = (gauss[j] ?? 0) + (GAUSS[node] ?? 0) * y;
        size[j] = (size[j] ?? 0) + (KRONROD[node] ?? 0) * Math.abs(y);
      }
    }
  }
  return true;
}

function isSettled(half: number, { kronrod, gauss, size }: Sums, sums: Float64Array): boolean {
  const width = Math.abs(half);
  const first = Math.max(Math.abs(sums[0] ?? 0), width * (size[0] ?? 0));
  for (let j = 0; j < sums.length; j++) {
    const scale = Math.max(first, Math.abs(sums[j] ?? 0), width * (size[j] ?? 0));
    if (width * Math.abs((kronrod[j] ?? 0) - (gauss[j] ?? 0)) > TOLERANCE * scale) return false;
  }
  return true;
}

/**
 * The models of the certified nonlinear sets with their derivatives: `f` at abscissa x (a second one in `z`), and
 * ∂f/∂b_j written into `by`. Each derivative is checked against differences beside the sets.
 */
export type StrdModel = (
  b: Iterable<number> & ArrayLike<number>,
  x: number,
  z: number,
  by: Float64Array,
) => number;

/** Numerator of degree `above`, denominator 1 + … of degree `below`, coefficients in that order. */
function rational(above: number, below: number): StrdModel {
  return (b, x, _z, by) => {
    let numerator = 0;
    for (let k = above; k >= 0; k--) numerator = numerator * x + (b[k] ?? 0);
    let denominator = 0;
    for (let k = below; k >= 1; k--) denominator = (denominator + (b[above + k] ?? 0)) * x;
    denominator += 1;
    const value = numerator / denominator;
    let power = 1 / denominator;
    for (let k = 0; k <= above; k++, power *= x) by[k] = power;
    power = (-value * x) / denominator;
    for (let k = 1; k <= below; k++, power *= x) by[above + k] = power;
    return value;
  };
}

/** b₁(1 − e^(−b₂x)). */
const approach: StrdModel = ([b1 = 0, b2 = 0], x, _z, by) => {
  const rest = Math.exp(-b2 * x);
  by[0] = -Math.expm1(-b2 * x);
  by[1] = b1 * x * rest;
  return b1 * by[0];
};

/** e^(−b₁x)/(b₂ + b₃x). */
const chwirut: StrdModel = ([b1 = 0, b2 = 0, b3 = 0], x, _z, by) => {
  const line = b2 + b3 * x;
  const value = Math.exp(-b1 * x) / line;
  by[0] = -x * value;
  by[1] = -value / line;
  by[2] = (-x * value) / line;
  return value;
};

/** Bell of height h, centre c and width w: h·e^(−(x − c)²/w²), derivatives written from `at` on. */
function bell(h: number, c: number, w: number, x: number, by: Float64Array, at: number): number {
  const u = (x - c) / w;
  const shape = Math.exp(-u * u);
  by[at] = shape;
  by[at + 1] = (2 * h * shape * u) / w;
  by[at + 2] = (2 * h * shape * u * u) / w;
  return h * shape;
}

/** h·e^(−kx), derivatives by h and k. */
function decay(h: number, k: number, x: number, by: Float64Array, atHeight: number, atRate: number): number {
  const shape = Math.exp(-k * x);
  by[atHeight] = shape;
  by[atRate] = -x * h * shape;
  return h * shape;
}

/** c·cos(2πx/period) + s·sin(2πx/period), derivatives by period, c and s from `at` on. */
function wave(period: number, c: number, s: number, x: number, by: Float64Array, at: number): number {
  const angle = (2 * Math.PI * x) / period;
  const [cosine, sine] = [Math.cos(angle), Math.sin(angle)];
  by[at] = ((c * sine - s * cosine) * angle) / period;
  by[at + 1] = cosine;
  by[at + 2] = sine;
  return c * cosine + s * sine;
}

export const STRD_MODELS: Readonly<Record<string, StrdModel>> = {
  Misra1a: approach,
  BoxBOD: approach,
  Misra1b: ([b1 = 0, b2 = 0], x, _z, by) => {
    const base = 1 + (b2 * x) / 2;
    by[0] = 1 - 1 / (base * base);
    by[1] = (b1 * x) / (base * base * base);
    return b1 * by[0];
  },
  Misra1c: ([b1 = 0, b2 = 0], x, _z, by) => {
    const base = 1 + 2 * b2 * x;
    by[0] = 1 - 1 / Math.sqrt(base);
    by[1] = (b1 * x) / (base * Math.sqrt(base));
    return b1 * by[0];
  },
  Misra1d: ([b1 = 0, b2 = 0], x, _z, by) => {
    const base = 1 + b2 * x;
    by[0] = (b2 * x) / base;
    by[1] = (b1 * x) / (base * base);
    return b1 * by[0];
  },
  Chwirut1: chwirut,
  Chwirut2: chwirut,
  DanWood: ([b1 = 0, b2 = 0], x, _z, by) => {
    by[0] = x ** b2;
    by[1] = b1 * by[0] * Math.log(x);
    return b1 * by[0];
  },
  Lanczos3: ([b1 = 0, b2 = 0, b3 = 0, b4 = 0, b5 = 0, b6 = 0], x, _z, by) =>
    decay(b1, b2, x, by, 0, 1) + decay(b3, b4, x, by, 2, 3) + decay(b5, b6, x, by, 4, 5),
  Kirby2: rational(2, 2),
  Hahn1: rational(3, 3),
  Thurber: rational(3, 3),
  Nelson: ([b1 = 0, b2 = 0, b3 = 0], x, z, by) => {
    const term = x * Math.exp(-b3 * z);
    by[0] = 1;
    by[1] = -term;
    by[2] = b2 * z * term;
    return b1 - b2 * term;
  },
  MGH09: ([b1 = 0, b2 = 0, b3 = 0, b4 = 0], x, _z, by) => {
    const below = x * x + x * b3 + b4;
    by[0] = (x * x + x * b2) / below;
    by[1] = (b1 * x) / below;
    const value = b1 * by[0];
    by[2] = (-value * x) / below;
    by[3] = -value / below;
    return value;
  },
  MGH10: ([b1 = 0, b2 = 0, b3 = 0], x, _z, by) => {
    const shift = x + b3;
    by[0] = Math.exp(b2 / shift);
    const value = b1 * by[0];
    by[1] = value / shift;
    by[2] = (-value * b2) / (shift * shift);
    return value;
  },
  MGH17: ([b1 = 0, b2 = 0, b3 = 0, b4 = 0, b5 = 0], x, _z, by) => {
    by[0] = 1;
    return b1 + decay(b2, b4, x, by, 1, 3) + decay(b3, b5, x, by, 2, 4);
  },
  Roszman1: ([b1 = 0, b2 = 0, b3 = 0, b4 = 0], x, _z, by) => {
    const shift = x - b4;
    const size = Math.PI * (shift * shift + b3 * b3);
    by[0] = 1;
    by[1] = -x;
    by[2] = -shift / size;
    by[3] = -b3 / size;
    return b1 - b2 * x - Math.atan(b3 / shift) / Math.PI;
  },
  ENSO: ([b1 = 0, b2 = 0, b3 = 0, b4 = 0, b5 = 0, b6 = 0, b7 = 0, b8 = 0, b9 = 0], x, _z, by) => {
    const year = (2 * Math.PI * x) / 12;
    by[0] = 1;
    by[1] = Math.cos(year);
    by[2] = Math.sin(year);
    return b1 + b2 * by[1] + b3 * by[2] + wave(b4, b5, b6, x, by, 3) + wave(b7, b8, b9, x, by, 6);
  },
  Eckerle4: ([b1 = 0, b2 = 0, b3 = 0], x, _z, by) => {
    const u = (x - b3) / b2;
    by[0] = Math.exp(-0.5 * u * u) / b2;
    const value = b1 * by[0];
    by[1] = (value * (u * u - 1)) / b2;
    by[2] = (value * u) / b2;
    return value;
  },
  Rat42: ([b1 = 0, b2 = 0, b3 = 0], x, _z, by) => {
    const growth = Math.exp(b2 - b3 * x);
    by[0] = 1 / (1 + growth);
    by[1] = -b1 * by[0] * by[0] * growth;
    by[2] = -x * by[1];
    return b1 * by[0];
  },
  Rat43: ([b1 = 0, b2 = 0, b3 = 0, b4 = 0], x, _z, by) => {
    const growth = Math.exp(b2 - b3 * x);
    by[0] = (1 + growth) ** (-1 / b4);
    const value = b1 * by[0];
    by[1] = (-value / b4) * (growth / (1 + growth));
    by[2] = -x * by[1];
    by[3] = (value * Math.log1p(growth)) / (b4 * b4);
    return value;
  },
  Bennett5: ([b1 = 0, b2 = 0, b3 = 0], x, _z, by) => {
    const shift = b2 + x;
    by[0] = shift ** (-1 / b3);
    const value = b1 * by[0];
    by[1] = -value / (b3 * shift);
    by[2] = (value * Math.log(shift)) / (b3 * b3);
    return value;
  },
  Gauss1: ([b1 = 0, b2 = 0, b3 = 0, b4 = 0, b5 = 0, b6 = 0, b7 = 0, b8 = 0], x, _z, by) =>
    decay(b1, b2, x, by, 0, 1) + bell(b3, b4, b5, x, by, 2) + bell(b6, b7, b8, x, by, 5),
};

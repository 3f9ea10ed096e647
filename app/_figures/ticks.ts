/** Places of major and minor gridlines on an axis, ascending, all inside the domain; `text` prints the majors. */
export interface AxisTicks {
  readonly major: readonly { readonly at: number; readonly text: string }[];
  readonly minor: readonly number[];
}

/** Steps of 1, 2 or 5 times a power of ten, about `count` majors, five minors (four under steps of 2) between them. */
export function linearTicks(low: number, high: number, count = 7): AxisTicks {
  if (!(high > low)) return { major: [], minor: [] };
  const step = niceStep((high - low) / count);
  const minorStep = leadingDigit(step) === 2 ? step / 4 : step / 5;
  const decimals = Math.max(0, -Math.floor(Math.log10(step) + 1e-9));
  const major = multiples(step, low, high).map((at) => ({ at, text: printTick(at, decimals) }));
  const isMajor = new Set(multiples(step, low, high).map((at) => Math.round(at / minorStep)));
  const minor = multiples(minorStep, low, high).filter((at) => !isMajor.has(Math.round(at / minorStep)));
  return { major, minor };
}

/**
 * Majors at 1, 2 and 5 times powers of ten under two decades, at powers of ten above; minors at the other whole
 * multiples. A range that holds fewer than two such places takes linear steps. `low` > 0.
 */
export function logTicks(low: number, high: number, count = 7): AxisTicks {
  if (!(high > low) || !(low > 0)) return { major: [], minor: [] };
  const decades = Math.log10(high / low);
  const leads = decades > 2.2 ? [1] : [1, 2, 5];
  const every: number[] = [];
  const major: { at: number; text: string }[] = [];
  for (let power = Math.floor(Math.log10(low)); power <= Math.ceil(Math.log10(high)); power += 1) {
    for (let lead = 1; lead <= 9; lead += 1) {
      const at = Number(`${lead}e${power}`);
      if (at < low * (1 - 1e-9) || at > high * (1 + 1e-9)) continue;
      if (leads.includes(lead)) major.push({ at, text: printTick(at, Math.max(0, -power)) });
      else every.push(at);
    }
  }
  if (major.length < 2) return linearTicks(low, high, Math.min(count, 5));
  return { major, minor: every };
}

/** Widens data to an axis: from zero where the data come near it, with some air at the other end. */
export function linearDomain(values: readonly number[], air = 0.06): readonly [number, number] {
  const [least, most] = extent(values);
  if (least === most)
    return least === 0 ? [-1, 1] : [least - Math.abs(least) * 0.1, most + Math.abs(most) * 0.1];
  const span = most - least;
  // Noise about zero lets the axis reach to the outermost reading and no further.
  const low = least < 0.35 * most && least > -0.05 * most ? Math.min(0, least) : least - span * air;
  const high = most > 0.35 * least && most < -0.05 * least ? Math.max(0, most) : most + span * air;
  return [low, high];
}

/** The same on a logarithmic axis; every value > 0. */
export function logDomain(values: readonly number[], air = 0.1): readonly [number, number] {
  const [least, most] = extent(values);
  const span = Math.max(Math.log(most / least), 0.4);
  const middle = Math.log(most * least) / 2;
  return [Math.exp(middle - span * (0.5 + air)), Math.exp(middle + span * (0.5 + air))];
}

export function extent(values: readonly number[]): readonly [number, number] {
  let least = Number.POSITIVE_INFINITY;
  let most = Number.NEGATIVE_INFINITY;
  for (const value of values) {
    if (value < least) least = value;
    if (value > most) most = value;
  }
  return least > most ? [0, 1] : [least, most];
}

/**
 * The power of ten that an axis' title should carry so that its ticks stay short: 0 unless the largest value is
 * below 0.01 or from 10⁵ on; multiples of three.
 */
export function axisPower(low: number, high: number): number {
  const largest = Math.max(Math.abs(low), Math.abs(high));
  if (largest === 0 || (largest >= 0.01 && largest < 1e5)) return 0;
  return 3 * Math.floor(Math.log10(largest) / 3);
}

function niceStep(rough: number): number {
  const power = Math.floor(Math.log10(rough));
  const lead = rough / 10 ** power;
  const nice = lead < 1.5 ? 1 : lead < 3.5 ? 2 : lead < 7.5 ? 5 : 10;
  return Number(`${nice}e${power}`);
}

function leadingDigit(step: number): number {
  return Math.round(step / 10 ** Math.floor(Math.log10(step) + 1e-9));
}

function multiples(step: number, low: number, high: number): number[] {
  const slack = step * 1e-6;
  const first = Math.ceil((low - slack) / step);
  const last = Math.floor((high + slack) / step);
  return Array.from({ length: Math.max(0, last - first + 1) }, (_, i) => cleanZero((first + i) * step));
}

const cleanZero = (value: number) => (value === 0 ? 0 : value);

function printTick(value: number, decimals: number): string {
  return value.toFixed(decimals).replace("-", "−");
}

import type { Trace } from "kinetics-core/initial-rate";
import { leastSquares, matrixFromColumns } from "kinetics-core/linear-algebra";
import { squaresAboutMean } from "kinetics-core/summation";

/** One of the textbook's straight lines: the distance from the end, its logarithm or its reciprocal against time. */
export interface AxisLine {
  readonly order: 0 | 1 | 2;
  readonly intercept: number;
  readonly slope: number;
  readonly slopeStandardError: number | null;
  readonly rSquared: number;
  /** Readings beyond the end have no logarithm; they are left out. */
  readonly points: number;
}

/**
 * The order whose axis is straightest by R². **This rule is not used**: it is here to be compared with. It trusts the
 * end signal as if it were exact and weighs readings near the end by their reciprocals, so that it is wrong in a third
 * of the traces once an unnoticed end signal reaches a sixth to a third of the span. `orderOfTrace` is the rule.
 */
export function straightestAxisOrder(
  { time, signal }: Trace,
  endSignal = 0,
): { readonly order: 0 | 1 | 2; readonly lines: readonly AxisLine[] } {
  const first = (signal[0] ?? 0) - endSignal;
  const sign = first < 0 ? -1 : 1;
  const distance = Float64Array.from(
    { length: time.length },
    (_, i) => sign * ((signal[i] ?? 0) - endSignal),
  );
  const lines = AXES.flatMap(({ order, axis }) => {
    const line = lineOf(order, time, distance, axis);
    return line === null ? [] : [line];
  });
  const order = lines.reduce<AxisLine | null>(
    (best, line) => (best === null || line.rSquared > best.rSquared ? line : best),
    null,
  )?.order;
  return { order: order ?? 0, lines };
}

const AXES = [
  { order: 0, axis: (y: number) => y },
  { order: 1, axis: Math.log },
  { order: 2, axis: (y: number) => 1 / y },
] as const;

function lineOf(
  order: 0 | 1 | 2,
  time: ArrayLike<number>,
  distance: Float64Array,
  axis: (y: number) => number,
): AxisLine | null {
  const used = [...distance.keys()].filter((i) => order === 0 || (distance[i] ?? 0) > 0);
  if (used.length < 2) return null;
  const values = used.map((i) => axis(distance[i] ?? Number.NaN));
  const times = used.map((i) => time[i] ?? Number.NaN);
  const { coefficients, residualSumOfSquares, inverseGram } = leastSquares(
    matrixFromColumns([times.map(() => 1), times]),
    values,
  );
  const freedom = used.length - 2;
  return {
    order,
    intercept: coefficients[0] ?? Number.NaN,
    slope: coefficients[1] ?? Number.NaN,
    slopeStandardError:
      freedom > 0
        ? Math.sqrt((residualSumOfSquares / freedom) * (inverseGram.values[3] ?? Number.NaN))
        : null,
    rSquared: 1 - residualSumOfSquares / squaresAboutMean(values),
    points: used.length,
  };
}

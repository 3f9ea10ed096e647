import { LEAST_WINDOW_POINTS } from "./constants";
import type { InitialRateOptions, Trace } from "./initial-rate";
import { prepareTrace } from "./prepared-trace";
import { selectWhole } from "./select-slope";
import { geometricWindows } from "./windows";

/** The slope at mixing when the window ends at `end` (the caller's clock). */
export interface SlopeAtEnd {
  readonly end: number;
  readonly slope: number;
  readonly standardError: number;
}

/** Windows of the figure, in geometric progression of their length. */
const FIGURE_WINDOWS = 40;

/**
 * How the slope at mixing depends on where the window ends, for a figure: where the curve leaves its own error
 * band, the estimator no longer follows the trace. Windows start with the first reading at or after mixing (or
 * after `from`), hold 8 readings or more and grow to the whole trace. Estimators as in `estimateInitialRate`, by
 * default a straight line. Empty where the trace cannot be used or is shorter than that.
 */
export function slopeAgainstWindowEnd(
  trace: Trace,
  {
    timeZero = 0,
    estimator = "straight",
    degree = 2,
    from = timeZero,
  }: Pick<InitialRateOptions, "timeZero" | "degree"> & {
    readonly estimator?: Exclude<InitialRateOptions["estimator"], "auto">;
    readonly from?: number;
  } = {},
): SlopeAtEnd[] {
  const prepared = prepareTrace(trace, { timeZero });
  if (prepared.status !== "prepared") return [];
  const { time } = prepared.readings;
  const first = time.findIndex((t) => t >= from - timeZero);
  if (first < 0 || time.length - first < LEAST_WINDOW_POINTS) return [];
  const named = { estimator, degree: estimator === "tangent" ? degree : null };
  return geometricWindows(time, time.length - first, LEAST_WINDOW_POINTS, FIGURE_WINDOWS, first).flatMap(
    (count) => {
      const to = first + count;
      const selected = selectWhole(prepared, { from: first, to }, named);
      if (selected.status !== "selected") return [];
      const end = (time[to - 1] ?? Number.NaN) + timeZero;
      return [{ end, slope: selected.slope, standardError: selected.standardError }];
    },
  );
}

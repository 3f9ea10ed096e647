import { LEAST_WINDOW_POINTS, WINDOWS } from "./constants";

/**
 * Ends of windows that start with the first reading, as counts of readings: lengths of time in geometric
 * progression from the first `least` readings to the first `most`, equal ones dropped. `least` ≤ `most`.
 */
export function geometricWindows(
  time: Float64Array,
  most: number,
  least = LEAST_WINDOW_POINTS,
  windows = WINDOWS,
  from = 0,
): number[] {
  const origin = time[from] ?? Number.NaN;
  const shortest = (time[from + least - 1] ?? Number.NaN) - origin;
  const longest = (time[from + most - 1] ?? Number.NaN) - origin;
  const ratio = longest / shortest;
  const counts: number[] = [];
  let count = least;
  for (let w = 0; w < windows - 1; w++) {
    const length = shortest * ratio ** (w / (windows - 1));
    // The product above may round to just below a reading's own time.
    while (count < most && (time[from + count] ?? Number.NaN) - origin <= length * (1 + 1e-12)) count++;
    if (counts.at(-1) !== count) counts.push(count);
  }
  if (counts.at(-1) !== most) counts.push(most);
  return counts;
}

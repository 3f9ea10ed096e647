import type { WindowChoice } from "./figure-view";

export type Grip = "from" | "to";

/** The reading nearest to a time; `time` strictly increasing, not empty. */
export function nearestReading(time: readonly number[], wanted: number): number {
  let low = 0;
  let high = time.length - 1;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if ((time[middle] ?? 0) < wanted) low = middle;
    else high = middle;
  }
  return wanted - (time[low] ?? 0) <= (time[high] ?? 0) - wanted ? low : high;
}

/** A window between two readings, both included. */
export function choiceBetween(time: readonly number[], fromIndex: number, toIndex: number): WindowChoice {
  return {
    fromIndex,
    toIndex,
    from: time[fromIndex] ?? 0,
    to: time[toIndex] ?? 0,
    points: toIndex - fromIndex + 1,
  };
}

/** Lowest and highest reading a grip may stand on, so that at least `leastPoints` stay between the two. */
export function gripLimits(
  grip: Grip,
  choice: WindowChoice,
  readings: number,
  leastPoints: number,
): readonly [number, number] {
  return grip === "from"
    ? [0, Math.max(0, choice.toIndex - leastPoints + 1)]
    : [Math.min(readings - 1, choice.fromIndex + leastPoints - 1), readings - 1];
}

/** Moves one grip to a reading, held within its limits. */
export function moveGrip(
  time: readonly number[],
  choice: WindowChoice,
  grip: Grip,
  index: number,
  leastPoints: number,
): WindowChoice {
  const [low, high] = gripLimits(grip, choice, time.length, leastPoints);
  const held = Math.min(high, Math.max(low, index));
  return grip === "from"
    ? choiceBetween(time, held, choice.toIndex)
    : choiceBetween(time, choice.fromIndex, held);
}

/** Where a key leads: arrows one reading, with Shift ten, Home and End to the limits; null for other keys. */
export function readingAfterKey(
  key: string,
  shift: boolean,
  index: number,
  limits: readonly [number, number],
): number | null {
  const step = shift ? 10 : 1;
  switch (key) {
    case "ArrowLeft":
    case "ArrowDown":
      return index - step;
    case "ArrowRight":
    case "ArrowUp":
      return index + step;
    case "PageDown":
      return index - 10;
    case "PageUp":
      return index + 10;
    case "Home":
      return limits[0];
    case "End":
      return limits[1];
    default:
      return null;
  }
}

/** Decimals that tell neighbouring readings apart, at most four. */
export function timeDecimals(time: readonly number[]): number {
  const span = (time.at(-1) ?? 0) - (time[0] ?? 0);
  const step = span / Math.max(1, time.length - 1);
  return step > 0 ? Math.min(4, Math.max(0, Math.ceil(-Math.log10(step) - 1e-9))) : 1;
}

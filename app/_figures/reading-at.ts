import type { ChartArea } from "./chart";
import type { WindowChoice, WindowFigureView } from "./figure-view";

/** A click this near to a reading, in pixels, is one on it. */
const CLICK_REACH = 14;

/** Where a pointer is, in the drawing's own pixels. */
export function placeOf(
  { clientX, clientY }: { readonly clientX: number; readonly clientY: number },
  drawing: { getBoundingClientRect(): Pick<DOMRect, "left" | "top" | "width"> } | null,
  width: number,
): readonly [number, number] | null {
  const box = drawing?.getBoundingClientRect();
  if (box === undefined || box.width === 0) return null;
  const scale = width / box.width;
  return [(clientX - box.left) * scale, (clientY - box.top) * scale];
}

/** The reading under a pointer; null where none is near. */
export function readingAt(
  { time, signal }: Pick<WindowFigureView, "time" | "signal">,
  area: ChartArea,
  place: readonly [number, number] | null,
): number | null {
  if (place === null) return null;
  let nearest: number | null = null;
  let least = CLICK_REACH;
  for (const [index, at] of time.entries()) {
    const distance = Math.hypot(area.x(at) - place[0], area.y(signal[index] ?? 0) - place[1]);
    if (distance >= least) continue;
    least = distance;
    nearest = index;
  }
  return nearest;
}

/** Readings of a window that are fitted. */
export function fittedBetween(
  { outside, spikes }: Pick<WindowFigureView, "outside" | "spikes">,
  { fromIndex, toIndex, points }: WindowChoice,
): number {
  const inside = (index: number) => index >= fromIndex && index <= toIndex;
  return points - outside.filter(inside).length - spikes.filter(inside).length;
}

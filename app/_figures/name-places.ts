import type { ChartArea } from "./chart";

export interface Spot {
  readonly x: number;
  readonly y: number;
}

export interface NamePlace extends Spot {
  readonly anchor: "start" | "middle" | "end";
}

export interface Box {
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
}

/**
 * A place for the name of every mark: right of it, else around it, wherever it covers fewest other names and marks
 * and stays inside the plot. Greedy in the order given, so the same data always read the same.
 */
export function placeNames(
  marks: readonly Spot[],
  names: readonly string[],
  /** What else a name should not cover: other marks' middles, and boxes of text or line. */
  others: { readonly spots: readonly Spot[]; readonly boxes?: readonly Box[] },
  area: Pick<ChartArea, "left" | "right" | "top" | "bottom">,
): readonly NamePlace[] {
  const taken: Box[] = [...marks, ...others.spots].map(({ x, y }) => box(x - 6, y - 6, 12, 12));
  taken.push(...(others.boxes ?? []));
  return marks.map((mark, index) => {
    const width = (names[index]?.length ?? 0) * 7.2;
    let best: { place: NamePlace; frame: Box; cost: number } | undefined;
    for (const [rank, place] of around(mark).entries()) {
      const left =
        place.anchor === "start" ? place.x : place.anchor === "end" ? place.x - width : place.x - width / 2;
      const frame = box(left, place.y - 10, width, 12);
      const outside =
        Math.max(0, area.left - frame.left) +
        Math.max(0, frame.right - area.right) +
        Math.max(0, area.top - frame.top) +
        Math.max(0, frame.bottom - area.bottom);
      const covered = taken.reduce((sum, other) => sum + overlap(frame, other), 0);
      const cost = covered + outside * 12 + rank;
      if (best === undefined || cost < best.cost) best = { place, frame, cost };
    }
    if (best === undefined) return { ...mark, anchor: "start" };
    taken.push(best.frame);
    return best.place;
  });
}

function around({ x, y }: Spot): NamePlace[] {
  const at = (dx: number, dy: number, anchor: NamePlace["anchor"]): NamePlace => ({
    x: Math.round((x + dx) * 10) / 10,
    y: Math.round((y + dy) * 10) / 10,
    anchor,
  });
  return [
    at(10, 4, "start"),
    at(8, -7, "start"),
    at(8, 15, "start"),
    at(-10, 4, "end"),
    at(-8, -7, "end"),
    at(-8, 15, "end"),
    at(0, -10, "middle"),
    at(0, 19, "middle"),
    at(0, -24, "middle"),
    at(0, 33, "middle"),
  ];
}

export function box(left: number, top: number, width: number, height: number): Box {
  return { left, right: left + width, top, bottom: top + height };
}

function overlap(a: Box, b: Box): number {
  const across = Math.min(a.right, b.right) - Math.max(a.left, b.left);
  const down = Math.min(a.bottom, b.bottom) - Math.max(a.top, b.top);
  return across > 0 && down > 0 ? across * down : 0;
}

/** Which of the frames covers least of what is there, the first of equals, and how much that is in square pixels. */
export function leastCovering(
  frames: readonly Box[],
  taken: readonly Box[],
): { readonly index: number; readonly covered: number } {
  const costs = frames.map((frame) => taken.reduce((sum, other) => sum + overlap(frame, other), 0));
  const covered = Math.min(...costs);
  return { index: costs.indexOf(covered), covered };
}

/** A straight line as a row of small boxes, so that names keep off it. */
export function boxesAlong(from: Spot, to: Spot): Box[] {
  const steps = Math.max(1, Math.round(Math.hypot(to.x - from.x, to.y - from.y) / 6));
  return Array.from({ length: steps + 1 }, (_, i) =>
    box(from.x + ((to.x - from.x) * i) / steps - 2, from.y + ((to.y - from.y) * i) / steps - 2, 4, 4),
  );
}

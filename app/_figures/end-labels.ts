import { spreadApart } from "./spread";

/** Where a trace ends and how wide its name is, in pixels. */
export interface TraceEnd {
  readonly x: number;
  readonly y: number;
  readonly width: number;
}

export interface EndLabel {
  readonly x: number;
  readonly y: number;
  /** A line from the trace's end to the label, where they are apart. */
  readonly leader: boolean;
}

export const LABEL_HEIGHT = 14;
const GAP = 9;
/** Up to this many traces names stand at the ends; more go into a column with leader lines. */
export const NAMED_AT_ENDS = 12;

/**
 * Places the names of traces so that none covers another. Few traces: each right of its own end, moved up or down
 * within the group whose names would overlap sideways. Many: one column at `columnX`, each with a leader line.
 */
export function placeEndLabels(
  ends: readonly TraceEnd[],
  frame: { readonly top: number; readonly bottom: number; readonly columnX: number },
): readonly EndLabel[] {
  if (ends.length > NAMED_AT_ENDS) {
    const height = Math.min(LABEL_HEIGHT, (frame.bottom - frame.top) / (ends.length - 1));
    const places = spreadApart(
      ends.map((end) => end.y),
      height,
      frame.top,
      frame.bottom,
    );
    return ends.map((end, i) => ({ x: frame.columnX, y: places[i] ?? end.y, leader: true }));
  }
  const labels: EndLabel[] = ends.map((end) => ({ x: end.x + GAP, y: end.y, leader: false }));
  for (const group of groupsSideBySide(ends)) {
    const places = spreadApart(
      group.map((index) => ends[index]?.y ?? 0),
      LABEL_HEIGHT,
      frame.top,
      frame.bottom,
    );
    group.forEach((index, i) => {
      const label = labels[index];
      const y = places[i];
      if (label && y !== undefined)
        labels[index] = { ...label, y, leader: Math.abs(y - (ends[index]?.y ?? y)) > 18 };
    });
  }
  return labels;
}

/** Traces whose names share some horizontal stretch, directly or through others. */
function groupsSideBySide(ends: readonly TraceEnd[]): number[][] {
  const order = ends.map((end, index) => ({ end, index })).sort((a, b) => a.end.x - b.end.x);
  const groups: number[][] = [];
  let reach = Number.NEGATIVE_INFINITY;
  for (const { end, index } of order) {
    if (end.x > reach) groups.push([]);
    groups.at(-1)?.push(index);
    reach = Math.max(reach, end.x + GAP + end.width);
  }
  return groups;
}

/** Rough width of a run's name beside its mark, in the figure's 12.5 px semibold. */
export function nameWidth(label: string): number {
  return 18 + label.length * 7.2;
}

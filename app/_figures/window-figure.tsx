"use client";

import type { ReactNode } from "react";
import { Chart, type ChartSize, layOut, pointsOf } from "./chart";
import type { WindowChoice, WindowFigureView } from "./figure-view";
import { linearDomain } from "./ticks";

/**
 * A trace with its window. Two grips move over readings: drag, or arrows one reading, Shift ten, Home and End to the
 * limits. `onPreview` follows every step, `onCommit` comes once on release. Without `onCommit` it is a drawing.
 */
export function WindowFigure({
  view,
  label,
  number,
  caption,
  height = 380,
}: {
  view: WindowFigureView;
  label: string;
  number?: number;
  caption?: ReactNode;
  height?: number;
  onPreview?: (choice: WindowChoice) => void;
  onCommit?: (choice: WindowChoice) => void;
}) {
  const size: ChartSize = { width: 840, height };
  const area = layOut(
    size,
    { kind: "linear", domain: [0, view.time.at(-1) ?? 1] },
    { kind: "linear", domain: linearDomain(view.signal) },
  );
  return (
    <figure className="figure">
      <Chart size={size} area={area} xAxis={view.x} yAxis={view.y} label={label}>
        <polyline points={pointsOf(area, view.time, view.signal)} fill="none" stroke="var(--ink-3)" />
      </Chart>
      <figcaption>
        {number !== undefined && <b>Figure {number}. </b>}
        {caption}
      </figcaption>
    </figure>
  );
}

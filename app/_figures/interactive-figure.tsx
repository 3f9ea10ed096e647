"use client";

import dynamic from "next/dynamic";
import { type ReactNode, useState } from "react";
import type { PlotView } from "./plot-view";

const Plot = dynamic(() => import("./plot-inner").then((module) => module.PlotInner), {
  ssr: false,
  loading: () => <p className="text-caption text-ink-2">Loading the plot.</p>,
});

/**
 * The drawing first, the plot on request: reading values, zooming and panning need a large library, which is fetched
 * once and only after "Explore figure".
 */
export function InteractiveFigure({
  plot,
  name,
  height = 420,
  children,
}: {
  plot: PlotView;
  /** Names the figure to a screen reader. */
  name: string;
  /** Of the plot, in pixels. */
  height?: number;
  /** The drawing. */
  children: ReactNode;
}) {
  const [exploring, setExploring] = useState(false);
  return (
    <div>
      {exploring ? <Plot view={plot} name={name} height={height} /> : children}
      <div className="figure-tools mt-1">
        <button
          type="button"
          className="text-button text-caption"
          aria-pressed={exploring}
          onClick={() => setExploring(!exploring)}
        >
          {exploring ? "Back to the drawing" : "Explore figure"}
        </button>
      </div>
    </div>
  );
}

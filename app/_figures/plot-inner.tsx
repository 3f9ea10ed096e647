"use client";

import Plotly from "plotly.js-dist-min";
import createPlot from "react-plotly.js/factory";
import type { PlotView } from "./plot-view";

const Plot = createPlot(Plotly);

/** The interactive plot; loaded lazily, so nothing but InteractiveFigure may import it. */
export function PlotInner({ view, name }: { view: PlotView; name: string }) {
  return (
    <Plot
      data={view.series.map((series) => ({
        type: "scatter",
        name: series.name,
        x: [...series.x],
        y: [...series.y],
        mode: series.drawing === "marks" ? "markers" : "lines",
      }))}
      layout={{
        xaxis: { type: view.x.kind, title: { text: view.x.title } },
        yaxis: { type: view.y.kind, title: { text: view.y.title } },
        showlegend: false,
        meta: name,
      }}
      useResizeHandler
      style={{ width: "100%", height: 360 }}
    />
  );
}

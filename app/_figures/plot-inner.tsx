"use client";

import Plotly from "plotly.js-dist-min";
import createPlot from "react-plotly.js/factory";
import { resolveColour, usePlotTemplate } from "./plot-theme";
import type { PlotSeries, PlotView } from "./plot-view";

const Plot = createPlot(Plotly);

/** Fewer tools than the library offers: zoom, pan, back to all, and the picture as SVG. */
const CONFIG = {
  displaylogo: false,
  responsive: true,
  modeBarButtonsToRemove: ["select2d", "lasso2d", "autoScale2d"],
  toImageButtonOptions: { format: "svg", filename: "figure" },
};

/** The interactive plot; loaded lazily, so nothing but InteractiveFigure may import it. */
export function PlotInner({ view, name, height }: { view: PlotView; name: string; height: number }) {
  const template = usePlotTemplate();
  const font = { family: getComputedStyle(document.body).fontFamily };
  return (
    // biome-ignore lint/a11y/useSemanticElements: the plot is a group of controls, not a fieldset
    <div role="group" aria-label={name}>
      <Plot
        data={view.series.map(traceOf)}
        layout={{
          template,
          font,
          hoverlabel: { font },
          autosize: true,
          height,
          margin: { l: 56, r: 30, t: 34, b: 48 },
          xaxis: { type: view.x.kind, title: { text: markedUp(view.x.title) } },
          yaxis: { type: view.y.kind },
          annotations: [
            {
              text: markedUp(view.y.title),
              xref: "paper",
              yref: "paper",
              x: 0,
              y: 1,
              xanchor: "left",
              yshift: 20,
              showarrow: false,
            },
            ...view.series.flatMap(nameAtEnd),
          ],
        }}
        config={CONFIG}
        useResizeHandler
        style={{ width: "100%", height }}
      />
    </div>
  );
}

function traceOf(series: PlotSeries) {
  const colour = resolveColour(series.colour);
  const marks = series.drawing === "marks";
  return {
    // The library's other scatter compiles shaders from strings, which the content security policy refuses.
    type: "scatter",
    mode: marks ? "markers" : "lines",
    name: series.name,
    x: series.x,
    y: series.y,
    line: { color: colour, dash: series.dash, width: series.drawing === "guide" ? 1 : 1.9 },
    marker: { color: colour, symbol: series.symbol },
    hovertemplate: `<b>${series.name}</b> %{x:.4~g}, %{y:.4~g}<extra></extra>`,
    ...(series.drawing === "guide" ? { hoverinfo: "skip", hovertemplate: undefined } : {}),
  };
}

/** The name at a line's last point, as in the drawing; the library has no legend here. */
function nameAtEnd(series: PlotSeries) {
  const x = series.x.at(-1);
  const y = series.y.at(-1);
  if (series.drawing === "fit" || x === undefined || y === undefined) return [];
  return [{ text: series.name, x, y, xanchor: "left", xshift: 6, showarrow: false, font: { size: 11.5 } }];
}

/** Prose as the library's own little HTML. */
function markedUp(prose: string): string {
  return prose
    .replaceAll(/\*([^*\s][^*]*)\*/g, "<i>$1</i>")
    .replaceAll(/(?<=[>\])])_\{?([A-Za-z0-9]+)\}?/g, "<sub>$1</sub>")
    .replaceAll(/\^\{?([-−]?[\w.]+)\}?/g, (_, power: string) => `<sup>${power.replace("-", "−")}</sup>`);
}

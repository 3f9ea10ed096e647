"use client";

import Plotly from "plotly.js-dist-min";
import createPlot from "react-plotly.js/factory";
import { literal, markedUp } from "./plot-text";
import { resolveColour, usePlotTemplate } from "./plot-theme";
import type { PlotSeries, PlotView } from "./plot-view";
import { spreadApart } from "./spread";
import { extent } from "./ticks";

const Plot = createPlot(Plotly);

/** Named one by one, since the library's own set grows: nothing here leaves the page. */
const CONFIG = {
  displaylogo: false,
  responsive: true,
  modeBarButtons: [["zoom2d", "pan2d", "zoomIn2d", "zoomOut2d", "resetScale2d"], ["toImage"]],
  toImageButtonOptions: { format: "svg", filename: "figure" },
};

/** The interactive plot; loaded lazily, so nothing but InteractiveFigure may import it. */
export function PlotInner({ view, name, height }: { view: PlotView; name: string; height: number }) {
  const template = usePlotTemplate();
  const font = { family: getComputedStyle(document.body).fontFamily };
  return (
    <section aria-label={name}>
      <Plot
        data={view.series.flatMap(tracesOf)}
        layout={{
          template,
          font,
          hoverlabel: { font },
          autosize: true,
          height,
          margin: MARGIN,
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
            ...namesAtEnds(view, height - MARGIN.t - MARGIN.b),
          ],
        }}
        config={CONFIG}
        useResizeHandler
        style={{ width: "100%", height }}
      />
    </section>
  );
}

const MARGIN = { l: 56, r: 48, t: 34, b: 48 };
const NAME_HEIGHT = 14;

/** A line with its run's mark on the last point, or marks alone. */
function tracesOf(series: PlotSeries): object[] {
  const colour = resolveColour(series.colour);
  const common = {
    // The library's other scatter compiles shaders from strings, which the content security policy refuses.
    type: "scatter",
    name: series.name,
    marker: { color: colour, symbol: series.symbol },
  };
  const silent = series.drawing === "guide";
  const drawn = {
    ...common,
    mode: series.drawing === "marks" ? "markers" : "lines",
    x: series.x,
    y: series.y,
    line: { color: colour, dash: series.dash, width: silent ? 1 : 1.9 },
    ...(silent
      ? { hoverinfo: "skip" }
      : { hovertemplate: `<b>${literal(series.name)}</b> %{x:.4~g}, %{y:.4~g}<extra></extra>` }),
  };
  if (series.drawing !== "line") return [drawn];
  return [
    drawn,
    { ...common, mode: "markers", x: series.x.slice(-1), y: series.y.slice(-1), hoverinfo: "skip" },
  ];
}

/** Names at the last points, as in the drawing; the library has no legend here and does not part labels. */
function namesAtEnds(view: PlotView, plotHeight: number): object[] {
  const place = view.y.kind === "log" ? Math.log10 : (value: number) => value;
  const named = view.series.filter((series) => series.drawing !== "fit" && series.y.length > 0);
  const ends = named.map((series) => place(series.y.at(-1) ?? 0));
  const [low, high] = extent(view.series.flatMap((series) => extent(series.y)).map(place));
  const pixels = (value: number) => ((value - low) / (high - low || 1)) * plotHeight;
  const wishes = ends.map(pixels);
  const parted = spreadApart(wishes, NAME_HEIGHT, -NAME_HEIGHT, plotHeight + NAME_HEIGHT);
  return named.map((series, index) => ({
    text: literal(series.name),
    // Annotations on a logarithmic axis are placed by the logarithm.
    x: view.x.kind === "log" ? Math.log10(series.x.at(-1) ?? 1) : series.x.at(-1),
    y: ends[index],
    xanchor: "left",
    xshift: 8,
    yshift: (parted[index] ?? 0) - (wishes[index] ?? 0),
    showarrow: false,
    font: { size: 11.5 },
  }));
}

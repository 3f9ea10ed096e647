import { axisTitle } from "./chart";
import type { AddedVariableView, AxisView, MarkedRun, TraceFigureView } from "./figure-view";
import { lookOfMark } from "./mark-look";
import { makeScale } from "./scale";
import { extent } from "./ticks";

/** What the interactive plot is made from; plain, so that it crosses to the browser with the page. */
export interface PlotView {
  readonly x: PlotAxis;
  readonly y: PlotAxis;
  readonly series: readonly PlotSeries[];
}

export interface PlotAxis {
  /** Prose. */
  readonly title: string;
  readonly kind: "linear" | "log";
}

export interface PlotSeries {
  readonly name: string;
  readonly x: readonly number[];
  readonly y: readonly number[];
  readonly drawing: "line" | "marks" | "fit" | "guide";
  /** Plotly's name of the mark, with its fill: "diamond-open". */
  readonly symbol: string;
  /** A CSS colour over the tokens, resolved in the browser. */
  readonly colour: string;
  readonly dash: "solid" | "dash" | "dot";
}

export function plotOfTraces(view: TraceFigureView): PlotView {
  const values = view.traces.flatMap((trace) => extent(trace.y));
  const times = view.traces.flatMap((trace) => extent(trace.x));
  return {
    x: plotAxis(view.x, "linear", times),
    y: plotAxis(view.y, "linear", values),
    series: view.traces.map((trace) => ({
      ...identity(trace),
      x: trace.x.map(forReading),
      y: trace.y.map(forReading),
      drawing: "line",
      dash: trace.setAside ? "dot" : trace.mark.repeat ? "dash" : "solid",
    })),
  };
}

export function plotOfAddedVariable(view: AddedVariableView): PlotView {
  const x = view.points.map((point) => point.x);
  const y = view.points.map((point) => point.y);
  const [low, high] = extent(x);
  const power = (slope: number, at: number) =>
    view.line === null ? 0 : view.line.through.y * (at / view.line.through.x) ** slope;
  const line = (name: string, slope: number, drawing: "fit" | "guide"): PlotSeries => ({
    name,
    x: [low, high],
    y: [power(slope, low), power(slope, high)],
    drawing,
    symbol: "circle",
    colour: drawing === "fit" ? "var(--ink)" : "var(--ink-3)",
    dash: drawing === "fit" ? "solid" : "dot",
  });
  return {
    x: plotAxis(view.x, "log", x),
    y: plotAxis(view.y, "log", y),
    series: [
      ...(view.line === null ? [] : view.guides.map((guide) => line(guide.label, guide.slope, "guide"))),
      ...(view.line === null ? [] : [line("fitted", view.line.slope, "fit")]),
      ...view.points.map(
        (point): PlotSeries => ({
          ...identity(point),
          x: [point.x],
          y: [point.y],
          drawing: "marks",
          dash: "solid",
        }),
      ),
    ],
  };
}

/** Six digits are more than a cursor can read, and a third of what a page would otherwise carry. */
function forReading(value: number): number {
  return Number(value.toPrecision(6));
}

function plotAxis(axis: AxisView, kind: "linear" | "log", values: readonly number[]): PlotAxis {
  // Plotly prints its own powers of ten, so the title keeps the bare unit.
  const domain: readonly [number, number] = values.length === 0 ? [0, 1] : [0.1, 1];
  return { title: axisTitle(axis, makeScale("linear", domain, 0, 1)), kind };
}

function identity(run: MarkedRun): Pick<PlotSeries, "name" | "symbol" | "colour"> {
  const look = lookOfMark(run.mark, run.setAside);
  const symbol = look.form === "ring" ? "circle" : look.form;
  return {
    name: run.label,
    symbol: look.fill === "solid" ? symbol : `${symbol}-${look.fill}`,
    colour: look.colour,
  };
}

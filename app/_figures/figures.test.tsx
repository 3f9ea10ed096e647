import { renderToStaticMarkup } from "react-dom/server";
import { describe, expect, it } from "vitest";
import { AddedVariableFigure } from "./added-variable-figure";
import { CalibrationFigure } from "./calibration-figure";
import { DependenceFigure } from "./dependence-figure";
import type {
  AddedVariableView,
  CalibrationFigureView,
  TraceFigureView,
  WindowFigureView,
} from "./figure-view";
import { PlacedResidualsFigure } from "./placed-residuals-figure";
import { ResidualFigure } from "./residual-figure";
import { RunMapFigure } from "./run-map-figure";
import { SparkLine } from "./spark-line";
import { TraceFigure } from "./trace-figure";
import { WindowFigure } from "./window-figure";

const mark = { series: "first", level: 1, levels: 4, repeat: false } as const;
const axis = { quantity: "time", unit: "s" };
const signal = { quantity: "[P]", unit: "µmol L^-1" };

function traces(count: number): TraceFigureView {
  return {
    x: axis,
    y: signal,
    traces: Array.from({ length: count }, (_, i) => ({
      label: `R${String(i + 1).padStart(2, "0")}`,
      mark: { ...mark, level: i % 4, repeat: i === 1 },
      setAside: i === 2,
      x: Array.from({ length: 50 }, (_, t) => t),
      y: Array.from({ length: 50 }, (_, t) => (1 - Math.exp(-0.03 * t)) * (10 + i)),
    })),
  };
}

const added: AddedVariableView = {
  x: { quantity: "[B]", unit: "mmol L^-1" },
  y: { quantity: "rate at [A] = 50", unit: "µmol L^-1 s^-1" },
  points: [
    { label: "R01", mark, setAside: false, x: 0.5, y: 0.3, held: false },
    { label: "R02", mark, setAside: false, x: 4, y: 2.4, held: false },
    { label: "R06", mark, setAside: false, x: 2, y: 1.2, held: true },
  ],
  line: { slope: 1, through: { x: 2, y: 1.2 } },
  band: [
    { x: 0.1, low: 0.05, high: 0.07 },
    { x: 20, low: 10, high: 14 },
  ],
  guides: [
    { label: "order ½", slope: 0.5 },
    { label: "order 2", slope: 2 },
  ],
  note: "order in B: 1.00 ± 0.03",
};

const windowView: WindowFigureView = {
  run: { label: "R03", mark, setAside: false },
  x: axis,
  y: signal,
  time: Array.from({ length: 100 }, (_, i) => i * 0.5),
  signal: Array.from({ length: 100 }, (_, i) => i * 0.4),
  window: [1, 8.5],
  curve: { x: [1, 8.5], y: [0.8, 6.8] },
  slope: { x: 0, y: 0, slope: 0.8 },
  residuals: { x: [1, 8.5], y: [0.01, -0.02] },
  note: "*r*_0 = 0.8",
  noteDetail: "slope at *t* = 0",
  timeZero: 0,
  outside: [],
  spikes: [],
  counts: [0, 10],
  leastPoints: 5,
};

const calibration: CalibrationFigureView = {
  x: signal,
  y: { quantity: "absorbance", unit: "" },
  points: [
    { x: 5, y: 0.1, standard: "S1", isUsed: true },
    { x: 10, y: 0.19, standard: "S2", isUsed: false },
  ],
  line: { x: [0, 10], y: [0.01, 0.19], low: [0, 0.18], high: [0.02, 0.2] },
  range: { from: 5, to: 5, words: "in use, 5 to 5" },
  note: "*S* = 0.01 + 0.018 *c*",
};

const drawings = {
  "traces, few": () => <TraceFigure view={traces(5)} label="Traces" />,
  "traces, many": () => <TraceFigure view={traces(30)} label="Traces" />,
  "traces, one": () => <TraceFigure view={traces(1)} label="Traces" />,
  "traces, none": () => <TraceFigure view={traces(0)} label="Traces" />,
  "added variable": () => <AddedVariableFigure view={added} label="Order in B" />,
  "added variable without a line": () => (
    <AddedVariableFigure view={{ ...added, line: null, band: [] }} label="Order in B" />
  ),
  "run map": () => (
    <RunMapFigure
      view={{ x: axis, y: signal, points: added.points, next: { label: "next run", x: 4, y: 4 } }}
      label="Map"
    />
  ),
  "run map with a zero": () => (
    <RunMapFigure
      view={{ x: axis, y: signal, points: [{ label: "R01", mark, setAside: true, x: 0, y: 0 }], next: null }}
      label="Map"
    />
  ),
  residuals: () => (
    <ResidualFigure
      view={{
        y: { quantity: "residual", unit: "%" },
        points: [{ label: "R01", mark, setAside: false, residual: -2 }],
      }}
      label="Residuals"
    />
  ),
  dependence: () => (
    <DependenceFigure
      view={{ x: axis, y: signal, points: [{ x: 1, y: 2, low: 1, high: 3 }], chosen: { x: 1, y: 2 } }}
      label="Dependence"
    />
  ),
  window: () => <WindowFigure view={windowView} label="Window" onCommit={() => {}} />,
  calibration: () => <CalibrationFigure view={calibration} label="Calibration line" />,
  "calibration of one standard without a line": () => (
    <CalibrationFigure
      view={{ ...calibration, points: calibration.points.slice(0, 1), line: null, range: null, note: "" }}
      label="Readings"
    />
  ),
  "placed residuals": () => (
    <PlacedResidualsFigure
      view={{ x: axis, y: signal, points: [{ x: 2, residual: -0.1, name: "S1" }], xReach: 10 }}
      label="Residuals"
    />
  ),
  "placed residuals, none": () => (
    <PlacedResidualsFigure view={{ x: axis, y: signal, points: [], xReach: 0 }} label="Residuals" />
  ),
  spark: () => (
    <SparkLine
      x={[0, 1]}
      y={[0, 1]}
      domain={{ x: [0, 1], y: [0, 1] }}
      window={[0, 0.5]}
      mark={mark}
      setAside={false}
      label="Trace of R01"
    />
  ),
};

describe.each(Object.entries(drawings))("the drawing of %s", (_, draw) => {
  const markup = renderToStaticMarkup(draw());

  it("comes back the same, so that the browser takes over what the server drew", () => {
    expect(renderToStaticMarkup(draw())).toBe(markup);
  });

  it("holds finite places only", () => {
    expect(markup).not.toMatch(/NaN|Infinity/);
  });

  it("is an image with a name, coloured by the theme's variables alone", () => {
    expect(markup).toMatch(/role="img" aria-label="[^"]+"/);
    expect(markup).not.toMatch(/(?:fill|stroke|color)(?:=|:)"?\s*#/);
  });
});

describe("a figure of a steep dependence", () => {
  const placed = (markup: string, text: string) => {
    const at = new RegExp(`<text[^>]*?x="([-\\d.]+)" y="([-\\d.]+)"[^>]*>(?:<tspan>)?${text}`).exec(markup);
    return { x: Number(at?.[1]), y: Number(at?.[2]) };
  };

  it("keeps the note on the fit off the name of a guide that leaves by the top", () => {
    const points = [0.5, 1, 2, 5].map((x, i) => ({
      label: `R${i}`,
      mark,
      setAside: false,
      x,
      y: 0.02 * x ** 3,
      held: false,
    }));
    const markup = renderToStaticMarkup(
      <AddedVariableFigure
        view={{
          ...added,
          points,
          line: { slope: 3, through: { x: 0.5, y: 0.8 } },
          guides: [{ label: "order 4", slope: 4 }],
          band: [],
        }}
        label="Order in B"
      />,
    );
    const guide = placed(markup, "order 4");
    const note = placed(markup, "order in B");
    expect([guide.x, guide.y, note.x, note.y].every(Number.isFinite)).toBe(true);
    // 15 px of note, 11 px of guide name: apart by a line they share nothing.
    expect(Math.abs(guide.y - note.y)).toBeGreaterThan(18);
  });
});

describe("a trace figure", () => {
  it("names every run at its trace and strikes the one set aside", () => {
    const markup = renderToStaticMarkup(<TraceFigure view={traces(5)} label="Traces" />);
    for (const label of ["R01", "R02", "R03", "R04", "R05"]) expect(markup).toContain(`>${label}</text>`);
    expect(markup).toContain('stroke-dasharray="1 3"');
    expect(markup).toContain('stroke-dasharray="5 3"');
  });
});

describe("a window figure", () => {
  it("says the rate where the readings leave room, beside the window or in a corner", () => {
    const time = windowView.time;
    const beside = renderToStaticMarkup(<WindowFigure view={windowView} label="Window" />);
    expect(beside).toContain("slope at");
    // Readings all along the top leave the lower right corner alone.
    const high = time.map((_, i) => (i < 3 ? 10 * i : 30));
    const below = renderToStaticMarkup(
      <WindowFigure view={{ ...windowView, signal: high, curve: null, slope: null }} label="Window" />,
    );
    const y = Number(/class="in-law" x="[\d.]+" y="([\d.]+)"/.exec(below)?.[1]);
    expect(y).toBeGreaterThan(200);
  });

  it("has two sliders that speak time and points, and none where nothing may be changed", () => {
    const markup = renderToStaticMarkup(
      <WindowFigure view={windowView} label="Window" onCommit={() => {}} />,
    );
    expect(markup.match(/role="slider"/g)).toHaveLength(2);
    expect(markup).toContain('aria-valuetext="1.0\u00a0s, 16 points in the window"');
    expect(markup).toContain('aria-valuetext="8.5\u00a0s, 16 points in the window"');
    expect(renderToStaticMarkup(<WindowFigure view={windowView} label="Window" />)).not.toContain("slider");
  });
});

"use client";

import { type ReactNode, useRef } from "react";
import { Axes, type ChartArea, layOut, Paper, pointsOf } from "./chart";
import { decimate } from "./decimate";
import type { WindowChoice, WindowFigureView } from "./figure-view";
import { box, leastCovering } from "./name-places";
import { fittedBetween, placeOf, readingAt } from "./reading-at";
import { SvgProse } from "./svg-prose";
import { extent, linearDomain } from "./ticks";
import { timeStep } from "./time-step";
import { TimeZeroGrip, TrimGrips } from "./trace-grips";
import { useTimeZero } from "./use-time-zero";
import { useWidth } from "./use-width";
import { useWindowChoice } from "./use-window-choice";
import { WindowGrips } from "./window-grips";

const PLOT_TOP = 46;
/** Right of the plot, so that the last reading's time has a place beside its grip. */
const GRIP_ROOM = 52;
const RESIDUAL_HEIGHT = 116;

/** What is moved on the drawing: the window, the clock with the part that counts, or marks of readings. */
export type HandsOn = "window" | "clock" | "spikes";

/**
 * A trace with its window. Two grips move over readings: drag, or arrows one reading, Shift ten, Home and End to the
 * limits. `onPreview` follows every step (answer with a new curve, slope and residuals; leave `view.window` as
 * saved), `onCommit` comes once on release. Without `onCommit` it is a drawing. `handsOn` chooses what is moved: time
 * zero and the part that counts have handles of their own, and of spikes a click on a reading tells its index.
 */
export function WindowFigure({
  view,
  label,
  number,
  caption,
  height = 370,
  handsOn = "window",
  onPreview,
  onCommit,
  onTimeZero,
  onTrim,
  onReading,
}: {
  view: WindowFigureView;
  label: string;
  number?: number;
  caption?: ReactNode;
  /** Of the trace's plot, without the residuals. */
  height?: number;
  handsOn?: HandsOn;
  onPreview?: (choice: WindowChoice) => void;
  onCommit?: (choice: WindowChoice) => void;
  onTimeZero?: (time: number) => void;
  onTrim?: (choice: WindowChoice) => void;
  onReading?: (index: number) => void;
}) {
  const { ref, width } = useWidth<HTMLDivElement>(820);
  const drawing = useRef<SVGSVGElement>(null);
  const { area, residualArea } = areasOf(view, width, height);
  const timeAt = (clientX: number) => {
    const box = drawing.current?.getBoundingClientRect();
    if (box === undefined || box.width === 0) return view.window[0];
    return area.x.invert(((clientX - box.left) / box.width) * width);
  };
  const { choice, handlers } = useWindowChoice(view, timeAt, onPreview, onCommit);
  const trimmed = useWindowChoice({ ...view, window: view.counts }, timeAt, undefined, onTrim);
  const limits = [area.x.domain[0], area.x.domain[1]] as const;
  const mixed = useTimeZero(view.time, view.timeZero, limits, timeAt, onTimeZero);
  const total = view.residuals === null ? height : height + RESIDUAL_HEIGHT;
  return (
    <figure className="figure">
      <div ref={ref} className="relative">
        <svg viewBox={`0 0 ${width} ${total}`} className="chart" role="img" aria-label={label}>
          <Paper area={area} />
          <WindowShade area={area} choice={choice} />
          <Axes area={area} xAxis={view.x} yAxis={view.y} />
          <Readings view={view} area={area} choice={choice} />
          <Fit view={view} area={area} choice={choice} />
          <Note view={view} area={area} choice={choice} />
          {view.residuals !== null && (
            <g transform={`translate(0 ${height})`}>
              <Residuals residuals={view.residuals} unit={view.y.unit} area={residualArea} choice={choice} />
            </g>
          )}
        </svg>
        {/* The grips lie over the drawing in one of their own: what is inside an image is hidden from readers. */}
        <svg
          ref={drawing}
          viewBox={`0 0 ${width} ${total}`}
          className="chart absolute inset-0"
          role="graphics-object"
          aria-label={`Window of ${view.run.label}`}
        >
          {handsOn === "clock" ? (
            <>
              <TimeZeroGrip
                area={area}
                unit={view.x.unit}
                at={mixed.at}
                limits={limits}
                step={timeStep(view.time)}
                handlers={mixed.handlers}
              />
              <TrimGrips
                area={area}
                time={view.time}
                unit={view.x.unit}
                choice={trimmed.choice}
                leastPoints={view.leastPoints}
                handlers={trimmed.handlers}
              />
            </>
          ) : (
            <WindowGrips
              area={area}
              time={view.time}
              unit={view.x.unit}
              choice={{ ...choice, points: fittedBetween(view, choice) }}
              leastPoints={view.leastPoints}
              handlers={onCommit === undefined || handsOn === "spikes" ? null : handlers}
            />
          )}
          {handsOn === "spikes" && (
            <rect
              className="readings-to-mark"
              x={area.left}
              y={area.top}
              width={area.right - area.left}
              height={area.bottom - area.top}
              fill="transparent"
              onPointerUp={(event) => {
                const index = readingAt(view, area, placeOf(event, drawing.current, width));
                if (index !== null) onReading?.(index);
              }}
            />
          )}
        </svg>
      </div>
      {(caption !== undefined || number !== undefined) && (
        <figcaption>
          {number !== undefined && <b>Figure {number}. </b>}
          {caption}
        </figcaption>
      )}
    </figure>
  );
}

/** Both plots share one time axis and, so that they line up, one left edge. */
function areasOf(view: WindowFigureView, width: number, height: number) {
  const [first, last] = extent(view.time);
  const time = {
    kind: "linear",
    domain: [Math.min(first, view.timeZero, 0), last === first ? first + 1 : last],
  } as const;
  const signal = {
    kind: "linear",
    domain: linearDomain([...extent(view.signal), view.slope?.y ?? view.signal[0] ?? 0]),
  } as const;
  const [low, high] = extent(view.residuals?.y ?? [-1, 1]);
  const reach = Math.max(Math.abs(low), Math.abs(high)) * 1.15 || 1;
  const residual = { kind: "linear", domain: [-reach, reach] } as const;
  const upper = { width, height };
  const lower = { width, height: RESIDUAL_HEIGHT };
  const below = { top: 24, bottom: 10 };
  const left = Math.max(
    layOut(upper, time, signal).left,
    view.residuals === null ? 0 : layOut(lower, time, residual, below).left,
  );
  return {
    area: layOut(upper, time, signal, { top: PLOT_TOP, left, right: GRIP_ROOM }),
    residualArea: layOut(lower, time, residual, { ...below, left, right: GRIP_ROOM }),
  };
}

/**
 * Every reading that counts as a dot, in ink inside the window; long traces thinned to what the width can show. What is not
 * fitted stays in sight: small dots outside the part that counts, crosses for spikes.
 */
function Readings({ view, area, choice }: { view: WindowFigureView; area: ChartArea; choice: WindowChoice }) {
  const { time, signal } = view;
  const { fromIndex, toIndex } = choice;
  const columns = Math.round((area.right - area.left) / 2);
  const notFitted = new Set([...view.outside, ...view.spikes]);
  const dotsAt = (indices: readonly number[]) => {
    const thin = decimate(
      indices.map((index) => time[index] ?? 0),
      indices.map((index) => signal[index] ?? 0),
      columns,
    );
    return thin.x.map((value, i) => `M${area.x(value)} ${area.y(thin.y[i] ?? 0)}h0`).join("");
  };
  const dots = (from: number, to: number) =>
    dotsAt(Array.from({ length: to - from }, (_, i) => from + i).filter((index) => !notFitted.has(index)));
  const crosses = view.spikes.map((index) => {
    const [x, y] = [area.x(time[index] ?? 0), area.y(signal[index] ?? 0)];
    return `M${x - 4} ${y - 4}l8 8M${x - 4} ${y + 4}l8 -8`;
  });
  return (
    <g fill="none" strokeLinecap="round">
      <path d={dots(0, fromIndex) + dots(toIndex + 1, time.length)} stroke="var(--ctl)" strokeWidth="3.2" />
      <path d={dots(fromIndex, toIndex + 1)} stroke="var(--ink)" strokeWidth="3.4" />
      {view.outside.length > 0 && <path d={dotsAt(view.outside)} stroke="var(--ink-3)" strokeWidth="1.5" />}
      {crosses.length > 0 && <path d={crosses.join("")} stroke="var(--stop)" strokeWidth="1.6" />}
    </g>
  );
}

/** The fitted curve in full, the tangent at mixing in dashes as far as it helps the eye. */
function Fit({ view, area, choice }: { view: WindowFigureView; area: ChartArea; choice: WindowChoice }) {
  const { curve, slope } = view;
  return (
    <>
      {curve !== null && (
        <polyline points={pointsOf(area, curve.x, curve.y)} fill="none" stroke="var(--ink)" strokeWidth="2" />
      )}
      {slope !== null && <Tangent slope={slope} area={area} windowEnd={choice.to} />}
    </>
  );
}

function Tangent({
  slope,
  area,
  windowEnd,
}: {
  slope: { readonly x: number; readonly y: number; readonly slope: number };
  area: ChartArea;
  windowEnd: number;
}) {
  const [yLow, yHigh] = area.y.domain;
  const limit = slope.slope > 0 ? yHigh : yLow;
  const leaves = slope.slope === 0 ? Number.POSITIVE_INFINITY : slope.x + (limit - slope.y) / slope.slope;
  const end = Math.min(area.x.domain[1], leaves, slope.x + 2.7 * (windowEnd - slope.x));
  const at = (x: number) => area.y(slope.y + slope.slope * (x - slope.x));
  return (
    <path
      d={`M${area.x(slope.x)} ${at(slope.x)}L${area.x(end)} ${at(end)}`}
      fill="none"
      stroke="var(--ink)"
      strokeWidth="1.6"
      strokeDasharray="7 4"
    />
  );
}

/** Narrower plots have no room for a second place for what the page's title says already. */
const ROOMY = 480;

/**
 * The rate in words, right of the window where there is room, else in the corner that the trace leaves free. A
 * narrow plot without a free place goes without it rather than having it over the readings.
 */
function Note({ view, area, choice }: { view: WindowFigureView; area: ChartArea; choice: WindowChoice }) {
  if (view.note === "") return null;
  const roomy = area.right - area.left > ROOMY;
  const size = roomy ? 18 : 15;
  const width = Math.max(view.note.length * size * 0.41, view.noteDetail.length * 6);
  const beside = area.x(choice.to) + 26;
  const [top, bottom] = [area.top + 30, area.bottom - 34];
  const corners = [
    { x: area.right - 12, y: bottom, anchor: "end" },
    { x: area.right - 12, y: top, anchor: "end" },
    { x: area.left + 12, y: top, anchor: "start" },
  ] as const;
  const room = area.right - beside > width + 4;
  const places = room ? ([{ x: beside, y: top, anchor: "start" }, ...corners] as const) : corners;
  const frames = places.map(({ x, y, anchor }) =>
    box(anchor === "start" ? x : x - width, y - size, width, size + 24),
  );
  const thin = decimate([...view.time], [...view.signal], Math.round((area.right - area.left) / 4));
  const readings = thin.x.map((time, i) => box(area.x(time) - 2, area.y(thin.y[i] ?? 0) - 2, 4, 4));
  const { index, covered } = leastCovering(frames, readings);
  const place = places[index];
  if (place === undefined || (covered > 0 && !roomy)) return null;
  return (
    <>
      <text className="in-law" x={place.x} y={place.y} textAnchor={place.anchor} style={{ fontSize: size }}>
        <SvgProse text={view.note} />
      </text>
      <text x={place.x} y={place.y + 19} textAnchor={place.anchor}>
        <SvgProse text={view.noteDetail} />
      </text>
    </>
  );
}

/** Signal minus curve as stems, on the trace's own time axis. */
function Residuals({
  residuals,
  unit,
  area,
  choice,
}: {
  residuals: { readonly x: readonly number[]; readonly y: readonly number[] };
  unit: string;
  area: ChartArea;
  choice: WindowChoice;
}) {
  const thin = decimate(residuals.x, residuals.y, Math.round((area.right - area.left) / 3));
  const zero = area.y(0);
  const stems = thin.x.map((x, i) => `M${area.x(x)} ${zero}V${area.y(thin.y[i] ?? 0)}`).join("");
  const heads = thin.x.map((x, i) => `M${area.x(x)} ${area.y(thin.y[i] ?? 0)}h0`).join("");
  return (
    <>
      <Paper area={area} />
      <WindowShade area={area} choice={choice} />
      <Axes area={area} xAxis={null} yAxis={{ quantity: "residual", unit }} />
      <path className="axis" d={`M${area.left} ${zero}H${area.right}`} />
      <path d={stems} stroke="var(--ink)" fill="none" />
      <path d={heads} stroke="var(--ink)" strokeWidth="3.4" strokeLinecap="round" fill="none" />
    </>
  );
}

function WindowShade({ area, choice }: { area: ChartArea; choice: WindowChoice }) {
  return (
    <rect
      className="window"
      x={area.x(choice.from)}
      y={area.top}
      width={Math.max(0, area.x(choice.to) - area.x(choice.from))}
      height={area.bottom - area.top}
    />
  );
}

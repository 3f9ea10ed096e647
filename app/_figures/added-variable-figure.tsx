import type { ReactNode } from "react";
import { type AxisChoice, Chart, type ChartArea, type ChartSize, layOut, pointsOf } from "./chart";
import { Figure, PHONE_WIDTH } from "./figure";
import type { AddedVariableView } from "./figure-view";
import { InteractiveFigure } from "./interactive-figure";
import { MarkShape } from "./mark-shape";
import { placeNames } from "./name-places";
import { plotOfAddedVariable } from "./plot-view";
import { SvgProse } from "./svg-prose";
import { logDomain } from "./ticks";

/** Rate against one concentration, the effect of the others removed: fitted line, band, neighbouring simple orders. */
export function AddedVariableFigure({
  view,
  label,
  number,
  caption,
  width = 350,
  height = 342,
  interactive = true,
}: {
  view: AddedVariableView;
  label: string;
  number?: number;
  caption?: ReactNode;
  width?: number;
  height?: number;
  interactive?: boolean;
}) {
  const drawing = (
    <Figure
      desk={{ width, height }}
      phone={{ width: PHONE_WIDTH, height: 340 }}
      number={number}
      caption={caption}
      draw={(size) => <AddedVariable view={view} size={size} label={label} />}
    />
  );
  if (!interactive) return drawing;
  return (
    <InteractiveFigure plot={plotOfAddedVariable(view)} name={label}>
      {drawing}
    </InteractiveFigure>
  );
}

function AddedVariable({ view, size, label }: { view: AddedVariableView; size: ChartSize; label: string }) {
  const log = (values: readonly number[]): AxisChoice => ({ kind: "log", domain: logDomain(values) });
  const area = layOut(
    size,
    log(view.points.map((point) => point.x)),
    log(view.points.map((point) => point.y)),
  );
  const spread = spreadHeld(view, area);
  const named = view.points.filter((point) => !point.held);
  const marks = named.map((point) => ({ x: area.x(point.x), y: area.y(point.y) }));
  const names = placeNames(
    marks,
    named.map((point) => point.label),
    spread.places,
    area,
  );
  return (
    <Chart
      size={size}
      area={area}
      xAxis={view.x}
      yAxis={view.y}
      label={label}
      below={<Lines view={view} area={area} />}
    >
      {spread.bracket !== "" && <path d={spread.bracket} fill="none" stroke="var(--ctl)" strokeWidth="1.1" />}
      {spread.places.map((place) => (
        <g key={place.label}>
          <title>{place.label}</title>
          <MarkShape mark={place.mark} setAside={place.setAside} x={place.x} y={place.y} scale={0.72} />
        </g>
      ))}
      {named.map((point, index) => (
        <g key={point.label}>
          <MarkShape
            mark={point.mark}
            setAside={point.setAside}
            x={marks[index]?.x ?? 0}
            y={marks[index]?.y ?? 0}
            scale={0.82}
          />
          <text
            className="name"
            x={names[index]?.x}
            y={names[index]?.y}
            textAnchor={names[index]?.anchor}
            style={point.setAside ? { textDecoration: "line-through" } : undefined}
          >
            {point.label}
          </text>
        </g>
      ))}
      <text className="in-law" x={area.left + 12} y={area.top + 18}>
        <SvgProse text={view.note} />
      </text>
    </Chart>
  );
}

/** Band, fitted line and the guides of neighbouring simple orders, each named where it leaves the plot. */
function Lines({ view, area }: { view: AddedVariableView; area: ChartArea }) {
  const band = [
    ...view.band.map((at) => `${area.x(at.x)},${area.y(at.low)}`),
    ...[...view.band].reverse().map((at) => `${area.x(at.x)},${area.y(at.high)}`),
  ].join(" ");
  const { line } = view;
  return (
    <>
      {view.band.length > 1 && <polygon className="band" points={band} />}
      {line !== null &&
        view.guides.map((guide) => {
          const [from, to] = powerLine(guide.slope, line.through, area);
          const rising = guide.slope > line.slope;
          return (
            <g key={guide.label}>
              <polyline className="guide" points={pointsOf(area, [from.x, to.x], [from.y, to.y])} />
              <text x={area.x(to.x) - 6} y={area.y(to.y) + (rising ? 14 : 16)} textAnchor="end">
                {guide.label}
              </text>
            </g>
          );
        })}
      {line !== null && (
        <polyline
          className="fit"
          points={powerLine(line.slope, line.through, area)
            .map((end) => `${area.x(end.x)},${area.y(end.y)}`)
            .join(" ")}
        />
      )}
    </>
  );
}

interface Place {
  readonly x: number;
  readonly y: number;
}

/** y = y₀ (x/x₀)^slope between the edges of the plot. */
function powerLine(slope: number, through: Place, area: ChartArea): readonly [Place, Place] {
  const [xLow, xHigh] = area.x.domain;
  const [yLow, yHigh] = area.y.domain;
  const at = (x: number) => through.y * (x / through.x) ** slope;
  const back = (y: number) => through.x * (y / through.y) ** (1 / slope);
  const end = (x: number): Place => {
    const y = at(x);
    if (y > yHigh) return { x: back(yHigh), y: yHigh };
    if (y < yLow) return { x: back(yLow), y: yLow };
    return { x, y };
  };
  return [end(xLow), end(xHigh)];
}

const ROW = 9;
const APART = 11;

/** Held marks would lie on one spot: they stand side by side over a bracket, in rows of nine. */
function spreadHeld(view: AddedVariableView, area: ChartArea) {
  const held = view.points.filter((point) => point.held);
  if (held.length === 0) return { places: [], bracket: "" };
  const middle = held.reduce((sum, point) => sum + area.x(point.x), 0) / held.length;
  const widest = Math.min(ROW, held.length);
  const centre = Math.min(
    area.right - (widest * APART) / 2,
    Math.max(area.left + (widest * APART) / 2, middle),
  );
  const places = held.map((point, index) => {
    const row = Math.floor(index / ROW);
    const inRow = Math.min(ROW, held.length - row * ROW);
    return {
      ...point,
      x: Math.round((centre + ((index % ROW) - (inRow - 1) / 2) * APART) * 10) / 10,
      y: area.y(point.y) - row * APART,
    };
  });
  const half = (widest * APART) / 2;
  const foot = Math.max(...places.map((place) => place.y)) + 9;
  return { places, bracket: `M${centre - half} ${foot}v4h${half * 2}v-4` };
}

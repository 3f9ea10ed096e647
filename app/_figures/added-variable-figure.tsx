import type { ReactNode } from "react";
import { type AxisChoice, Chart, type ChartArea, type ChartSize, Clipped, layOut } from "./chart";
import { Figure, PHONE_WIDTH } from "./figure";
import type { AddedVariableView } from "./figure-view";
import { InteractiveFigure } from "./interactive-figure";
import { MarkShape } from "./mark-shape";
import { type Box, box, boxesAlong, leastCovering, placeNames } from "./name-places";
import { plotOfAddedVariable } from "./plot-view";
import { RunName } from "./run-name";
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
  const lines = linesOf(view, area);
  const named = view.points.filter((point) => !point.held);
  const marks = named.map((point) => ({ x: area.x(point.x), y: area.y(point.y) }));
  const drawn = lines.flatMap((line) => [...obstacles(line), ...boxesAlong(line.from, line.to)]);
  const note = placeNote(view.note, drawn, area);
  const names = placeNames(
    marks,
    named.map((point) => point.label),
    { spots: spread.places, boxes: [...lines.flatMap(obstacles), note.frame] },
    area,
  );
  return (
    <Chart
      size={size}
      area={area}
      xAxis={view.x}
      yAxis={view.y}
      label={label}
      below={<Lines band={view.band} lines={lines} area={area} />}
    >
      {spread.bracket !== "" && <path d={spread.bracket} fill="none" stroke="var(--ctl)" strokeWidth="1.1" />}
      {spread.places.map((place) => (
        <g key={place.label}>
          <title>{place.label}</title>
          <MarkShape mark={place.mark} setAside={place.setAside} x={place.x} y={place.y} scale={0.72} />
        </g>
      ))}
      {named.map((point, index) => (
        <RunName
          key={point.label}
          run={point}
          x={marks[index]?.x ?? 0}
          y={marks[index]?.y ?? 0}
          name={names[index]}
        />
      ))}
      <text className="in-law" x={note.frame.left} y={note.frame.bottom - 4}>
        <SvgProse text={view.note} />
      </text>
    </Chart>
  );
}

/** A straight line of the log-log plot in pixels; a guide carries its name. */
interface PlacedLine {
  readonly from: Place;
  readonly to: Place;
  readonly guide: { readonly label: string; readonly x: number; readonly y: number } | null;
}

function linesOf({ line, guides }: AddedVariableView, area: ChartArea): readonly PlacedLine[] {
  if (line === null) return [];
  const between = (slope: number) => {
    const [from, to] = powerLine(slope, line.through, area);
    return { from: { x: area.x(from.x), y: area.y(from.y) }, to: { x: area.x(to.x), y: area.y(to.y) } };
  };
  return [
    ...guides.map((guide) => {
      const ends = between(guide.slope);
      return { ...ends, guide: { label: guide.label, x: ends.to.x - 6, y: ends.to.y + 15 } };
    }),
    { ...between(line.slope), guide: null },
  ];
}

/** What names keep off: the fitted line, and the guides' own names. */
function obstacles({ from, to, guide }: PlacedLine): Box[] {
  if (guide === null) return boxesAlong(from, to);
  const width = guide.label.length * 6.6;
  return [box(guide.x - width, guide.y - 11, width, 14)];
}

/** Mean advance of the note's serif at 15 px. */
const NOTE_LETTER = 6;

/** The note on the fit stands at the upper left, or where a steep line leaves by the top, in the corner below it. */
function placeNote(note: string, taken: readonly Box[], area: ChartArea): { readonly frame: Box } {
  const width = note.length * NOTE_LETTER;
  const first = box(area.left + 12, area.top + 4, width, 18);
  const corners = [
    first,
    box(area.right - 12 - width, area.bottom - 26, width, 18),
    box(area.left + 12, area.bottom - 26, width, 18),
  ];
  return { frame: corners[leastCovering(corners, taken).index] ?? first };
}

/** Band, fitted line and the guides of neighbouring simple orders, each named where it leaves the plot. */
function Lines({
  band,
  lines,
  area,
}: {
  band: AddedVariableView["band"];
  lines: readonly PlacedLine[];
  area: ChartArea;
}) {
  const edge = [
    ...band.map((at) => `${area.x(at.x)},${area.y(at.low)}`),
    ...[...band].reverse().map((at) => `${area.x(at.x)},${area.y(at.high)}`),
  ].join(" ");
  return (
    <>
      {band.length > 1 && (
        <Clipped area={area}>
          <polygon className="band" points={edge} />
        </Clipped>
      )}
      {lines.map(({ from, to, guide }) => (
        <g key={guide?.label ?? "fit"}>
          <path className={guide === null ? "fit" : "guide"} d={`M${from.x} ${from.y}L${to.x} ${to.y}`} />
          {guide !== null && (
            <text x={guide.x} y={guide.y} textAnchor="end">
              {guide.label}
            </text>
          )}
        </g>
      ))}
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

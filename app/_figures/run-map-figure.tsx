import type { ReactNode } from "react";
import { type AxisChoice, Chart, type ChartSize, layOut } from "./chart";
import { Figure, PHONE_WIDTH } from "./figure";
import type { MarkedPoint, RunMapView } from "./figure-view";
import { placeNames } from "./name-places";
import { RunName } from "./run-name";
import { linearDomain, logDomain } from "./ticks";

/** Where the runs lie in the space of two starting concentrations, and where the next one would help most. */
export function RunMapFigure({
  view,
  label,
  number,
  caption,
  width = 420,
  height = 240,
}: {
  view: RunMapView;
  label: string;
  number?: number;
  caption?: ReactNode;
  width?: number;
  height?: number;
}) {
  return (
    <Figure
      desk={{ width, height }}
      phone={{ width: PHONE_WIDTH, height: 230 }}
      number={number}
      caption={caption}
      draw={(size) => <RunMap view={view} size={size} label={label} />}
    />
  );
}

function RunMap({ view, size, label }: { view: RunMapView; size: ChartSize; label: string }) {
  const all = view.next === null ? view.points : [...view.points, view.next];
  const area = layOut(size, axisFor(all.map((point) => point.x)), axisFor(all.map((point) => point.y)), {
    right: 44,
  });
  const marks = partCoincident(
    view.points.map((point) => ({ point, x: area.x(point.x), y: area.y(point.y) })),
  );
  const next = view.next === null ? null : { ...view.next, x: area.x(view.next.x), y: area.y(view.next.y) };
  const names = placeNames(
    marks,
    marks.map((mark) => mark.point.label),
    { spots: next === null ? [] : [next] },
    { ...area, right: size.width },
  );
  return (
    <Chart size={size} area={area} xAxis={view.x} yAxis={view.y} label={label}>
      {next !== null && (
        <g>
          <rect x={next.x - 11} y={next.y - 11} width="22" height="22" fill="var(--mark)" />
          <path
            d={`M${next.x - 7} ${next.y}h14M${next.x} ${next.y - 7}v14`}
            stroke="var(--ink)"
            strokeWidth="1.8"
          />
          <text className="name" x={next.x + 16} y={next.y + 4}>
            {next.label}
          </text>
        </g>
      )}
      {marks.map(({ point, x, y }, index) => (
        <RunName key={point.label} run={point} x={x} y={y} name={names[index]} />
      ))}
    </Chart>
  );
}

function axisFor(values: readonly number[]): AxisChoice {
  return values.every((value) => value > 0)
    ? { kind: "log", domain: logDomain(values, 0.14) }
    : { kind: "linear", domain: linearDomain(values, 0.14) };
}

interface PlacedPoint {
  readonly point: MarkedPoint;
  readonly x: number;
  readonly y: number;
}

/** Repeats lie on one spot: they stand side by side around it, so that each can be seen. */
function partCoincident(places: readonly PlacedPoint[]): PlacedPoint[] {
  return places.map((place) => {
    const together = places.filter((other) => Math.hypot(other.x - place.x, other.y - place.y) < 6);
    const rank = together.indexOf(place);
    return { ...place, x: Math.round((place.x + (rank - (together.length - 1) / 2) * 12) * 10) / 10 };
  });
}

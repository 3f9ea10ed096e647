import type { ReactNode } from "react";
import { Chart, type ChartArea, type ChartSize, Clipped, layOut, pointsOf } from "./chart";
import { Figure, PHONE_WIDTH } from "./figure";
import type { CalibrationFigureView } from "./figure-view";
import { LINE_LEFT } from "./line-left";
import { SvgProse } from "./svg-prose";
import { linearDomain } from "./ticks";

/** Signal against concentration: every reading of every standard, the line with its prediction band, the part in use. */
export function CalibrationFigure({
  view,
  label,
  number,
  caption,
  width = 620,
  height = 330,
}: {
  view: CalibrationFigureView;
  label: string;
  number?: number;
  caption?: ReactNode;
  width?: number;
  height?: number;
}) {
  return (
    <Figure
      desk={{ width, height }}
      phone={{ width: PHONE_WIDTH, height: 300 }}
      number={number}
      caption={caption}
      draw={(size) => <Calibration view={view} size={size} label={label} />}
    />
  );
}

function Calibration({ view, size, label }: { view: CalibrationFigureView; size: ChartSize; label: string }) {
  const { points, line, range } = view;
  const area = layOut(
    size,
    { kind: "linear", domain: linearDomain([0, ...points.map(({ x }) => x), ...(line?.x ?? [])]) },
    {
      kind: "linear",
      domain: linearDomain([0, ...points.map(({ y }) => y), ...(line?.low ?? []), ...(line?.high ?? [])]),
    },
    { left: LINE_LEFT },
  );
  // Where the line does not pass: below its end, or above where it falls.
  const falls = line !== null && (line.y.at(-1) ?? 0) < (line.y[0] ?? 0);
  return (
    <Chart
      size={size}
      area={area}
      xAxis={view.x}
      yAxis={view.y}
      label={label}
      below={range === null ? undefined : <InUse area={area} range={range} />}
    >
      {line !== null && (
        <Clipped area={area}>
          <polygon className="band" points={bandOf(area, line)} />
          <polyline className="fit" points={pointsOf(area, line.x, line.y)} />
        </Clipped>
      )}
      {points.map(({ x, y, standard, isUsed }, index) => (
        <g key={`${standard} ${index}`}>
          <title>{standard}</title>
          <circle
            cx={area.x(x)}
            cy={area.y(y)}
            r="4"
            fill="var(--sheet)"
            stroke={isUsed ? "var(--ink)" : "var(--ink-3)"}
            strokeWidth="1.4"
            strokeDasharray={isUsed ? undefined : "2 2"}
          />
        </g>
      ))}
      {namedBeside(points).map(({ standard, x, y }) => (
        <text
          key={standard}
          className="name"
          x={area.x(x)}
          y={area.y(y) + (falls ? -12 : 20)}
          textAnchor="middle"
        >
          {standard}
        </text>
      ))}
      {view.note !== "" && (
        <text
          className="in-law"
          x={area.right - 12}
          y={falls ? area.top + 20 : area.bottom - 16}
          textAnchor="end"
        >
          <SvgProse text={view.note} />
        </text>
      )}
    </Chart>
  );
}

/** Standards that are not in the line are named, each at the middle of its readings. */
function namedBeside(points: CalibrationFigureView["points"]) {
  const names = new Set(points.filter(({ isUsed }) => !isUsed).map(({ standard }) => standard));
  return [...names].map((standard) => {
    const own = points.filter((point) => point.standard === standard);
    return {
      standard,
      x: own.reduce((sum, { x }) => sum + x, 0) / own.length,
      y: own.reduce((sum, { y }) => sum + y, 0) / own.length,
    };
  });
}

/** The part of the axis on which the line is used, marked like a window. */
function InUse({ area, range }: { area: ChartArea; range: NonNullable<CalibrationFigureView["range"]> }) {
  const from = area.x(range.from);
  const to = area.x(range.to);
  return (
    <g>
      <rect
        x={from}
        y={area.top}
        width={Math.max(0, to - from)}
        height={area.bottom - area.top}
        fill="var(--mark-soft)"
      />
      <path
        d={`M${from} ${area.top}V${area.bottom}M${to} ${area.top}V${area.bottom}`}
        stroke="var(--mark-line)"
      />
      {to - from > ROOM_FOR_WORDS && (
        <text className="on-mark" x={(from + to) / 2} y={area.top + 16} textAnchor="middle">
          {range.words}
        </text>
      )}
    </g>
  );
}

/** Width that the words over the marked part take. */
const ROOM_FOR_WORDS = 150;

function bandOf(area: ChartArea, line: NonNullable<CalibrationFigureView["line"]>): string {
  const low = line.x.map((x, i) => `${area.x(x)},${area.y(line.low[i] ?? 0)}`);
  const high = line.x.map((x, i) => `${area.x(x)},${area.y(line.high[i] ?? 0)}`).reverse();
  return [...low, ...high].join(" ");
}

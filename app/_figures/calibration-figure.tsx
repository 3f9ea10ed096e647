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
      {view.note !== "" && (
        <text className="in-law" x={area.left + 14} y={area.top + 20}>
          <SvgProse text={view.note} />
        </text>
      )}
    </Chart>
  );
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
    </g>
  );
}

function bandOf(area: ChartArea, line: NonNullable<CalibrationFigureView["line"]>): string {
  const low = line.x.map((x, i) => `${area.x(x)},${area.y(line.low[i] ?? 0)}`);
  const high = line.x.map((x, i) => `${area.x(x)},${area.y(line.high[i] ?? 0)}`).reverse();
  return [...low, ...high].join(" ");
}

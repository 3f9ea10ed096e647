import type { ReactNode } from "react";
import { Chart, type ChartSize, layOut } from "./chart";
import { Figure, PHONE_WIDTH } from "./figure";
import type { ResidualView } from "./figure-view";
import { MarkShape } from "./mark-shape";

/** Residuals run by run as stems from zero, each with its run's mark; the axis is symmetric about zero. */
export function ResidualFigure({
  view,
  label,
  number,
  caption,
  width = 350,
  height = 150,
  reach,
}: {
  view: ResidualView;
  label: string;
  number?: number;
  caption?: ReactNode;
  width?: number;
  height?: number;
  /** Half-width of the axis, to compare several figures; default fits the data. */
  reach?: number;
}) {
  return (
    <Figure
      desk={{ width, height }}
      phone={{ width: PHONE_WIDTH, height }}
      number={number}
      caption={caption}
      draw={(size) => <Residuals view={view} size={size} label={label} reach={reach} />}
    />
  );
}

function Residuals({
  view,
  size,
  label,
  reach,
}: {
  view: ResidualView;
  size: ChartSize;
  label: string;
  reach: number | undefined;
}) {
  const largest = reach ?? Math.max(1e-12, ...view.points.map((point) => Math.abs(point.residual))) * 1.15;
  const count = view.points.length;
  const area = layOut(
    size,
    { kind: "linear", domain: [-0.7, Math.max(0.7, count - 0.3)] },
    { kind: "linear", domain: [-largest, largest] },
    { bottom: 20 },
  );
  const zero = area.y(0);
  return (
    <Chart size={size} area={area} xAxis={null} yAxis={view.y} label={label}>
      <path className="axis" d={`M${area.left} ${zero}H${area.right}`} />
      {view.points.map((point, index) => {
        const x = area.x(index);
        const y = area.y(Math.max(-largest, Math.min(largest, point.residual)));
        return (
          <g key={point.label}>
            <title>{point.label}</title>
            <path d={`M${x} ${zero}V${y}`} stroke="var(--ink-2)" strokeWidth="1" />
            <MarkShape mark={point.mark} setAside={point.setAside} x={x} y={y} scale={0.78} />
            {count <= 12 && (
              <text x={x} y={area.bottom + 16} textAnchor="middle">
                {point.label}
              </text>
            )}
          </g>
        );
      })}
    </Chart>
  );
}

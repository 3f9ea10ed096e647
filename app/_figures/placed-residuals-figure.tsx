import type { ReactNode } from "react";
import { Chart, type ChartSize, layOut } from "./chart";
import { Figure, PHONE_WIDTH } from "./figure";
import type { PlacedResidualsView } from "./figure-view";
import { LINE_LEFT } from "./line-left";
import { linearDomain } from "./ticks";

/** Residuals as stems from zero, each at its place on a scale; the axis is symmetric about zero. */
export function PlacedResidualsFigure({
  view,
  label,
  number,
  caption,
  width = 620,
  height = 170,
}: {
  view: PlacedResidualsView;
  label: string;
  number?: number;
  caption?: ReactNode;
  width?: number;
  height?: number;
}) {
  return (
    <Figure
      desk={{ width, height }}
      phone={{ width: PHONE_WIDTH, height }}
      number={number}
      caption={caption}
      draw={(size) => <Stems view={view} size={size} label={label} />}
    />
  );
}

function Stems({ view, size, label }: { view: PlacedResidualsView; size: ChartSize; label: string }) {
  const largest = Math.max(1e-300, ...view.points.map(({ residual }) => Math.abs(residual))) * 1.15;
  const area = layOut(
    size,
    { kind: "linear", domain: linearDomain([0, view.xReach, ...view.points.map(({ x }) => x)]) },
    { kind: "linear", domain: [-largest, largest] },
    { left: LINE_LEFT },
  );
  const zero = area.y(0);
  return (
    <Chart size={size} area={area} xAxis={view.x} yAxis={view.y} label={label}>
      <path className="axis" d={`M${area.left} ${zero}H${area.right}`} />
      {view.points.map(({ x, residual, name }, index) => (
        <g key={`${name} ${index}`}>
          <title>{name}</title>
          <path d={`M${area.x(x)} ${zero}V${area.y(residual)}`} stroke="var(--ink-2)" strokeWidth="1" />
          <circle
            cx={area.x(x)}
            cy={area.y(residual)}
            r="3.5"
            fill="var(--sheet)"
            stroke="var(--ink)"
            strokeWidth="1.3"
          />
        </g>
      ))}
    </Chart>
  );
}

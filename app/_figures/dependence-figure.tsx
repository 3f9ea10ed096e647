import type { ReactNode } from "react";
import { Chart, type ChartSize, layOut, pointsOf } from "./chart";
import { Figure, PHONE_WIDTH } from "./figure";
import type { DependenceView } from "./figure-view";
import { linearDomain } from "./ticks";

/** How an answer depends on a choice, with its band; the chosen place is highlighted. */
export function DependenceFigure({
  view,
  label,
  number,
  caption,
  width = 350,
  height = 230,
}: {
  view: DependenceView;
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
      draw={(size) => <Dependence view={view} size={size} label={label} />}
    />
  );
}

function Dependence({ view, size, label }: { view: DependenceView; size: ChartSize; label: string }) {
  const { points, chosen } = view;
  const x = points.map((point) => point.x);
  const area = layOut(
    size,
    { kind: "linear", domain: linearDomain(x) },
    { kind: "linear", domain: linearDomain(points.flatMap((point) => [point.low, point.high])) },
  );
  const low = points.map((point) => `${area.x(point.x)},${area.y(point.low)}`);
  const high = points.map((point) => `${area.x(point.x)},${area.y(point.high)}`).reverse();
  return (
    <Chart size={size} area={area} xAxis={view.x} yAxis={view.y} label={label}>
      <polygon className="band" points={[...low, ...high].join(" ")} />
      <polyline
        className="fit"
        points={pointsOf(
          area,
          x,
          points.map((point) => point.y),
        )}
      />
      {chosen !== null && (
        <>
          <path
            d={`M${area.x(chosen.x)} ${area.top}V${area.bottom}`}
            stroke="var(--mark-line)"
            strokeWidth="2"
            fill="none"
          />
          <circle
            cx={area.x(chosen.x)}
            cy={area.y(chosen.y)}
            r="5"
            fill="var(--mark)"
            stroke="var(--ink)"
            strokeWidth="1.4"
          />
        </>
      )}
    </Chart>
  );
}

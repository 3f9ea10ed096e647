import type { ReactNode } from "react";
import { Chart, type ChartArea, type ChartSize, layOut, pointsOf } from "./chart";
import { decimate } from "./decimate";
import { LABEL_HEIGHT, NAMED_AT_ENDS, nameWidth, placeEndLabels } from "./end-labels";
import { Figure, PHONE_WIDTH } from "./figure";
import type { TraceFigureView, TraceView } from "./figure-view";
import { InteractiveFigure } from "./interactive-figure";
import { lookOfMark } from "./mark-look";
import { plotOfTraces } from "./plot-view";
import { RunName } from "./run-name";
import { extent, linearDomain } from "./ticks";

/** Every run's trace on common axes, named at its end. Dashes: a repeat. Dots: set aside. */
export function TraceFigure({
  view,
  label,
  number,
  caption,
  width = 420,
  height = 330,
  interactive = true,
}: {
  view: TraceFigureView;
  /** What a screen reader hears: what is drawn and what it shows. */
  label: string;
  number?: number;
  caption?: ReactNode;
  /** Width of its column on a desk, in pixels. */
  width?: number;
  height?: number;
  /** Offers "Explore figure"; the plot is loaded only then. */
  interactive?: boolean;
}) {
  const needed =
    view.traces.length > NAMED_AT_ENDS ? Math.min(720, view.traces.length * LABEL_HEIGHT + 66) : 0;
  const drawing = (
    <Figure
      desk={{ width, height: Math.max(height, needed) }}
      phone={{ width: PHONE_WIDTH, height: Math.max(300, needed) }}
      number={number}
      caption={caption}
      draw={(size) => <Traces view={view} size={size} label={label} />}
    />
  );
  if (!interactive) return drawing;
  return (
    <InteractiveFigure plot={plotOfTraces(view)} name={label}>
      {drawing}
    </InteractiveFigure>
  );
}

function Traces({ view, size, label }: { view: TraceFigureView; size: ChartSize; label: string }) {
  const { traces } = view;
  const widestName = Math.max(0, ...traces.map((trace) => nameWidth(trace.label)));
  const many = traces.length > NAMED_AT_ENDS;
  const [firstTime, lastTime] = extent(traces.flatMap((trace) => [trace.x[0] ?? 0, trace.x.at(-1) ?? 0]));
  const [lowest, highest] = extent(traces.flatMap((trace) => extent(trace.y)));
  const area = layOut(
    size,
    { kind: "linear", domain: [Math.min(0, firstTime), lastTime === firstTime ? firstTime + 1 : lastTime] },
    { kind: "linear", domain: linearDomain([lowest, highest]) },
    { right: widestName + (many ? 34 : 12) },
  );
  const ends = traces.map((trace) => ({
    x: area.x(trace.x.at(-1) ?? 0),
    y: area.y(trace.y.at(-1) ?? 0),
    width: nameWidth(trace.label),
  }));
  const labels = placeEndLabels(ends, {
    top: area.top + 4,
    bottom: area.bottom - 6,
    columnX: size.width - widestName + 6,
  });
  return (
    <Chart size={size} area={area} xAxis={view.x} yAxis={view.y} label={label}>
      {traces.map((trace) => (
        <TraceLine key={trace.label} trace={trace} area={area} />
      ))}
      {traces.map((trace, index) => {
        const place = labels[index];
        const end = ends[index];
        if (!place || !end) return null;
        return (
          <g key={trace.label}>
            {place.leader && (
              <path
                d={`M${end.x + 2} ${end.y}L${place.x - 9} ${place.y.toFixed(1)}`}
                stroke="var(--ctl)"
                strokeWidth=".8"
                fill="none"
              />
            )}
            <RunName run={trace} x={place.x} y={place.y} />
          </g>
        );
      })}
    </Chart>
  );
}

function TraceLine({ trace, area }: { trace: TraceView; area: ChartArea }) {
  const thin = decimate(trace.x, trace.y, Math.round(area.right - area.left));
  const look = lookOfMark(trace.mark, trace.setAside);
  return (
    <polyline
      points={pointsOf(area, thin.x, thin.y)}
      fill="none"
      style={{ stroke: trace.setAside ? "var(--ctl)" : look.colour }}
      strokeWidth={trace.setAside ? 1.3 : 1.7}
      strokeLinejoin="round"
      strokeDasharray={trace.setAside ? "1 3" : trace.mark.repeat ? "5 3" : undefined}
    />
  );
}

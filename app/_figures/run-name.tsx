import type { MarkedRun } from "./figure-view";
import { MarkShape } from "./mark-shape";

/**
 * A run's mark with its name, right of it unless `name` says where (text baseline and anchor). Set aside: grey, with
 * one stroke through the name; a text decoration would take the halo of the text and show as two.
 */
export function RunName({
  run,
  x,
  y,
  name,
  scale = 0.82,
}: {
  run: MarkedRun;
  x: number;
  y: number;
  name?: { readonly x: number; readonly y: number; readonly anchor: "start" | "middle" | "end" } | undefined;
  scale?: number;
}) {
  const middle = Math.round(y * 10) / 10;
  const place = name ?? { x: Math.round((x + 9) * 10) / 10, y: middle + 4, anchor: "start" as const };
  const width = run.label.length * 7.2 + 3;
  const left = { start: place.x - 1, middle: place.x - width / 2, end: place.x + 1 - width }[place.anchor];
  return (
    <g>
      <MarkShape mark={run.mark} setAside={run.setAside} x={x} y={middle} scale={scale} />
      <text
        className="name"
        x={place.x}
        y={place.y}
        textAnchor={place.anchor}
        style={run.setAside ? { fill: "var(--ink-2)" } : undefined}
      >
        {run.label}
      </text>
      {run.setAside && (
        <path
          d={`M${left.toFixed(1)} ${(place.y - 4).toFixed(1)}h${width.toFixed(1)}`}
          stroke="var(--ink-2)"
          strokeWidth="1.4"
        />
      )}
    </g>
  );
}

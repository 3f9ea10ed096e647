import type { MarkedRun } from "./figure-view";
import { MarkShape } from "./mark-shape";

/** A run's mark with its name to the right (`anchor` "start") or left, centred on `y`. Struck once when set aside. */
export function RunName({
  run,
  x,
  y,
  anchor = "start",
}: {
  run: MarkedRun;
  x: number;
  y: number;
  anchor?: "start" | "end";
}) {
  const place = Math.round(y * 10) / 10;
  return (
    <g>
      <MarkShape mark={run.mark} setAside={run.setAside} x={x} y={place} scale={0.82} />
      <text
        className="name"
        x={anchor === "start" ? x + 9 : x - 9}
        y={place + 4}
        textAnchor={anchor}
        style={run.setAside ? { fill: "var(--ink-2)", textDecoration: "line-through" } : undefined}
      >
        {run.label}
      </text>
    </g>
  );
}

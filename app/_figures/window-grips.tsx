import type { ChartArea } from "./chart";
import type { WindowChoice } from "./figure-view";
import type { GripHandlers } from "./use-window-choice";
import { type Grip, gripLimits, timeDecimals } from "./window-choice";

const BAR_HEIGHT = 16;

/**
 * Two grips joined by a highlighted bar that names length and points, above the plot. Each grip is a slider of its
 * own with a hit area of 24 px; without `handlers` they are only drawn.
 */
export function WindowGrips({
  area,
  time,
  unit,
  choice,
  leastPoints,
  handlers,
}: {
  area: ChartArea;
  time: readonly number[];
  unit: string;
  choice: WindowChoice;
  leastPoints: number;
  handlers: ((grip: Grip) => GripHandlers) | null;
}) {
  const decimals = timeDecimals(time);
  const print = (value: number) => `${value.toFixed(decimals).replace("-", "−")}\u00a0${unit}`;
  const from = area.x(choice.from);
  const to = area.x(choice.to);
  const top = area.top - BAR_HEIGHT - 4;
  const inBar = `${print(choice.to - choice.from)}, ${choice.points} points`;
  const fits = to - from > inBar.length * 6.4 + 16;
  const after = fits ? print(choice.to) : `${print(choice.to)}  (${inBar})`;
  const endFits = to + 12 + after.length * 6.4 < area.right + 56;
  return (
    <g>
      <rect x={from} y={top} width={Math.max(0, to - from)} height={BAR_HEIGHT} fill="var(--mark)" />
      {fits && (
        <text className="name on-mark" x={(from + to) / 2} y={top + 12.5} textAnchor="middle">
          {inBar}
        </text>
      )}
      <text className="name" x={from - 12} y={top + 12.5} textAnchor="end">
        {from - 12 - print(choice.from).length * 6.4 > 0 ? print(choice.from) : ""}
      </text>
      {endFits && (
        <text className="name" x={to + 12} y={top + 12.5}>
          {after}
        </text>
      )}
      {(["from", "to"] as const).map((grip) => {
        const limits = gripLimits(grip, choice, time.length, leastPoints);
        const x = grip === "from" ? from : to;
        const at = grip === "from" ? choice.from : choice.to;
        const drawing = <GripShape x={x} top={top} bottom={area.bottom} />;
        if (handlers === null) return <g key={grip}>{drawing}</g>;
        return (
          <g
            key={grip}
            role="slider"
            tabIndex={0}
            className="grip"
            aria-label={grip === "from" ? "Window start" : "Window end"}
            aria-orientation="horizontal"
            aria-valuemin={limits[0]}
            aria-valuemax={limits[1]}
            aria-valuenow={grip === "from" ? choice.fromIndex : choice.toIndex}
            aria-valuetext={`${print(at)}, ${choice.points} points in the window`}
            {...handlers(grip)}
          >
            {drawing}
          </g>
        );
      })}
    </g>
  );
}

function GripShape({ x, top, bottom }: { x: number; top: number; bottom: number }) {
  return (
    <>
      <rect x={x - 12} y={top - 6} width="24" height={bottom - top + 6} fill="transparent" />
      <path d={`M${x} ${top}V${bottom}`} stroke="var(--mark-line)" strokeWidth="2" />
      <rect x={x - 7} y={top - 2} width="14" height={BAR_HEIGHT + 4} rx="2" fill="var(--ink)" />
      <path d={`M${x - 2} ${top + 3}v10M${x + 2} ${top + 3}v10`} stroke="var(--sheet)" strokeWidth="1.2" />
    </>
  );
}

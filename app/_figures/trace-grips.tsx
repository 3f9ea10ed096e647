import type { ChartArea } from "./chart";
import type { WindowChoice } from "./figure-view";
import type { GripHandlers } from "./use-window-choice";
import { type Grip, gripLimits, timeDecimals } from "./window-choice";

/** Handles at the foot of the plot for the ends of the part that counts; above them those of the window have their place. */
export function TrimGrips({
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
  handlers: (grip: Grip) => GripHandlers;
}) {
  const decimals = timeDecimals(time);
  return (
    <g>
      {(["from", "to"] as const).map((grip) => {
        const limits = gripLimits(grip, choice, time.length, leastPoints);
        const at = grip === "from" ? choice.from : choice.to;
        const x = area.x(at);
        const inward = grip === "from" ? 7 : -7;
        return (
          <g
            key={grip}
            role="slider"
            tabIndex={0}
            className="grip"
            aria-label={grip === "from" ? "Counts from" : "Counts to"}
            aria-orientation="horizontal"
            aria-valuemin={limits[0]}
            aria-valuemax={limits[1]}
            aria-valuenow={grip === "from" ? choice.fromIndex : choice.toIndex}
            aria-valuetext={`${at.toFixed(decimals)} ${unit}`}
            {...handlers(grip)}
          >
            <rect x={x - 12} y={area.bottom - 60} width="24" height="60" fill="transparent" />
            <path
              d={`M${x + inward} ${area.bottom - 52}H${x}V${area.bottom}H${x + inward}`}
              fill="none"
              stroke="var(--ink)"
              strokeWidth="4"
            />
          </g>
        );
      })}
    </g>
  );
}

/** The line of mixing with a handle above the plot. Without `handlers` it is not drawn: the slope starts there anyway. */
export function TimeZeroGrip({
  area,
  unit,
  at,
  limits,
  step,
  handlers,
}: {
  area: ChartArea;
  unit: string;
  at: number;
  limits: readonly [number, number];
  step: number;
  handlers: GripHandlers;
}) {
  const x = area.x(at);
  const text = `${Number(at.toPrecision(6))} ${unit}`;
  const decimals = Math.max(0, -Math.round(Math.log10(step)));
  return (
    <>
      <text className="name" x={x + 14} y={area.top - 16}>
        mixed at {text}
      </text>
      <g
        role="slider"
        tabIndex={0}
        className="grip"
        aria-label="Time zero"
        aria-orientation="horizontal"
        aria-valuemin={limits[0]}
        aria-valuemax={limits[1]}
        aria-valuenow={Number(at.toFixed(decimals))}
        aria-valuetext={`mixed at ${text}`}
        {...handlers}
      >
        <rect
          x={x - 12}
          y={area.top - 30}
          width="24"
          height={area.bottom - area.top - 34}
          fill="transparent"
        />
        <path d={`M${x} ${area.top - 12}V${area.bottom}`} stroke="var(--ink)" strokeWidth="1.6" />
        <path d={`M${x - 8} ${area.top - 26}h16l-8 14z`} fill="var(--ink)" />
      </g>
    </>
  );
}

import type { ReactNode } from "react";
import { NARROW_SPACE } from "../_ui/narrow-space";
import type { AxisView } from "./figure-view";
import { makeScale, type Scale } from "./scale";
import { SvgProse } from "./svg-prose";
import { type AxisTicks, axisPower, linearTicks, logTicks } from "./ticks";

export interface ChartSize {
  readonly width: number;
  readonly height: number;
}

/** Where the plot lies inside its drawing, and its two scales. */
export interface ChartArea {
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
  readonly x: Scale;
  readonly y: Scale;
  readonly xTicks: AxisTicks;
  readonly yTicks: AxisTicks;
}

export interface AxisChoice {
  readonly kind: "linear" | "log";
  readonly domain: readonly [number, number];
}

/** Lays the plot out: room on the left for the widest tick, on the right for what the figure writes there. */
export function layOut(
  size: ChartSize,
  x: AxisChoice,
  y: AxisChoice,
  room: {
    readonly top?: number;
    readonly right?: number;
    readonly bottom?: number;
    readonly left?: number;
  } = {},
): ChartArea {
  const top = room.top ?? 26;
  const bottom = size.height - (room.bottom ?? 40);
  const yTicks = ticksOf(y, Math.max(4, Math.round((bottom - top) / 42)));
  const widest = Math.max(1, ...yTicks.major.map((tick) => tick.text.length));
  const left = room.left ?? Math.max(34, 14 + widest * 6.6);
  const right = size.width - (room.right ?? 14);
  const xTicks = ticksOf(x, Math.max(3, Math.round((right - left) / 74)));
  return {
    left,
    right,
    top,
    bottom,
    x: makeScale(x.kind, x.domain, left, right),
    y: makeScale(y.kind, y.domain, bottom, top),
    xTicks,
    yTicks,
  };
}

function ticksOf({ kind, domain: [low, high] }: AxisChoice, count: number): AxisTicks {
  const power = axisPower(low, high);
  if (power === 0) return kind === "log" ? logTicks(low, high, count) : linearTicks(low, high, count);
  const unit = 10 ** power;
  const ticks = (kind === "log" ? logTicks : linearTicks)(low / unit, high / unit, count);
  return {
    major: ticks.major.map(({ at, text }) => ({ at: at * unit, text })),
    minor: ticks.minor.map((at) => at * unit),
  };
}

/** "[P] / µmol L^-1", with the power of ten that the ticks leave out: quantity divided by unit. */
export function axisTitle(axis: AxisView, scale: Scale): string {
  const power = axisPower(scale.domain[0], scale.domain[1]);
  const unit = [power === 0 ? "" : `10^${power}`, axis.unit.replaceAll(" ", NARROW_SPACE)]
    .filter(Boolean)
    .join(NARROW_SPACE);
  return unit === "" ? axis.quantity : `${axis.quantity} / ${unit}`;
}

/**
 * Chart paper: minor and major grid, L-shaped axes, ticks outside, the y quantity above its axis and the x quantity
 * at the end of its own. `below` is drawn over the grid and under the axes' ink; children over everything.
 */
export function Chart({
  size,
  area,
  xAxis,
  yAxis,
  label,
  below,
  className = "",
  children,
}: {
  size: ChartSize;
  area: ChartArea;
  /** null draws no ticks or title on that axis. */
  xAxis: AxisView | null;
  yAxis: AxisView;
  label: string;
  below?: ReactNode;
  className?: string;
  children: ReactNode;
}) {
  return (
    <svg
      viewBox={`0 0 ${size.width} ${size.height}`}
      role="img"
      aria-label={label}
      className={`chart ${className}`.trim()}
    >
      <Paper area={area} withX={xAxis !== null} />
      {below}
      <Axes area={area} xAxis={xAxis} yAxis={yAxis} />
      {children}
    </svg>
  );
}

export function Paper({ area, withX = true }: { area: ChartArea; withX?: boolean }) {
  const { left, right, top, bottom, x, y, xTicks, yTicks } = area;
  const vertical = (places: readonly number[]) => places.map((at) => `M${x(at)} ${top}V${bottom}`).join("");
  const horizontal = (places: readonly number[]) => places.map((at) => `M${left} ${y(at)}H${right}`).join("");
  const majors = (ticks: AxisTicks) => ticks.major.map((tick) => tick.at);
  return (
    <g fill="none">
      <path className="minor" d={(withX ? vertical(xTicks.minor) : "") + horizontal(yTicks.minor)} />
      <path className="major" d={(withX ? vertical(majors(xTicks)) : "") + horizontal(majors(yTicks))} />
    </g>
  );
}

export function Axes({ area, xAxis, yAxis }: { area: ChartArea; xAxis: AxisView | null; yAxis: AxisView }) {
  const { left, right, top, bottom, x, y, xTicks, yTicks } = area;
  const outside = [
    ...(xAxis === null ? [] : xTicks.major.map((tick) => `M${x(tick.at)} ${bottom}v5`)),
    ...yTicks.major.map((tick) => `M${left} ${y(tick.at)}h-5`),
  ].join("");
  return (
    <g>
      <path className="axis" d={`M${left} ${top}V${bottom}H${right}${outside}`} />
      {xAxis !== null &&
        xTicks.major.map((tick) => (
          <text key={tick.at} x={x(tick.at)} y={bottom + 18} textAnchor="middle">
            {tick.text}
          </text>
        ))}
      {yTicks.major.map((tick) => (
        <text key={tick.at} x={left - 9} y={y(tick.at) + 4} textAnchor="end">
          {tick.text}
        </text>
      ))}
      <text className="axis-title" x={0} y={12}>
        <SvgProse text={axisTitle(yAxis, y)} />
      </text>
      {xAxis !== null && (
        <text className="axis-title" x={right} y={bottom + 36} textAnchor="end">
          <SvgProse text={axisTitle(xAxis, x)} />
        </text>
      )}
    </g>
  );
}

/** Shows of its children what lies inside the plot. */
export function Clipped({ area, children }: { area: ChartArea; children: ReactNode }) {
  const { left, top } = area;
  const width = area.right - left;
  const height = area.bottom - top;
  return (
    <svg
      x={left}
      y={top}
      width={width}
      height={height}
      viewBox={`${left} ${top} ${width} ${height}`}
      overflow="hidden"
      aria-hidden="true"
    >
      {children}
    </svg>
  );
}

/** A polyline's points from two columns. */
export function pointsOf(area: ChartArea, x: readonly number[], y: readonly number[]): string {
  return x.map((value, index) => `${area.x(value)},${area.y(y[index] ?? 0)}`).join(" ");
}

/** A tick at a value that means something: a whole or half order, a round number. */
export interface WhiskerTick {
  readonly at: number;
  readonly label: string;
}

/**
 * Hollow diamond with a capped interval over ticks at meaningful values. `from`..`to` is the axis, shared by the
 * whiskers that are to be compared; `interval` null (no degrees of freedom) draws the diamond alone.
 */
export function Whisker({
  estimate,
  interval,
  from,
  to,
  ticks,
  showLabels = true,
  label,
  width = 320,
}: {
  estimate: number;
  interval: readonly [number, number] | null;
  from: number;
  to: number;
  ticks: readonly WhiskerTick[];
  showLabels?: boolean;
  /** What a screen reader says: "order in A: 0.97, 95 % interval 0.92 to 1.01". */
  label: string;
  width?: number;
}) {
  const inset = 22;
  const scale = (value: number) => inset + ((value - from) / (to - from)) * (width - 2 * inset);
  const inside = (value: number) => Math.min(width - 4, Math.max(4, scale(value)));
  const height = showLabels ? 40 : 26;
  const middle = showLabels ? 12 : 13;
  return (
    <svg
      viewBox={`0 0 ${width} ${height}`}
      role="img"
      aria-label={label}
      className="chart block h-auto w-full"
      style={{ maxWidth: width * 1.25 }}
    >
      {ticks.map((tick) => (
        <g key={tick.at}>
          <line className="major" x1={scale(tick.at)} x2={scale(tick.at)} y1={1} y2={showLabels ? 27 : 25} />
          {showLabels && (
            <text x={scale(tick.at)} y={39} textAnchor="middle">
              {tick.label}
            </text>
          )}
        </g>
      ))}
      {interval !== null && <Bar low={inside(interval[0])} high={inside(interval[1])} y={middle} />}
      <Diamond x={inside(estimate)} y={middle} />
    </svg>
  );
}

function Bar({ low, high, y }: { low: number; high: number; y: number }) {
  return (
    <path
      d={`M${low} ${y}H${high}M${low} ${y - 5}v10M${high} ${y - 5}v10`}
      stroke="var(--ink)"
      strokeWidth="1.8"
      fill="none"
    />
  );
}

function Diamond({ x, y }: { x: number; y: number }) {
  return (
    <path
      d={`M${x} ${y - 4.8}l4.8 4.8-4.8 4.8-4.8-4.8z`}
      fill="var(--sheet)"
      stroke="var(--ink)"
      strokeWidth="1.7"
    />
  );
}

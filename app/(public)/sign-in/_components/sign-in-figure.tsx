/**
 * Decoration beside the form: five traces of an invented reaction on chart paper, their initial-rate window and
 * tangents. Drawn from the formula below; no study's data.
 */
export function SignInFigure() {
  return (
    <svg
      viewBox="0 0 860 1000"
      preserveAspectRatio="xMinYMid slice"
      aria-hidden="true"
      className="absolute inset-0 size-full"
    >
      <defs>
        <pattern id="chart-minor" width="12" height="12" y="4" patternUnits="userSpaceOnUse">
          <path d="M0 0H12M0 0V12" fill="none" stroke="var(--grid-minor)" />
        </pattern>
        <pattern id="chart-major" width="60" height="60" y="40" patternUnits="userSpaceOnUse">
          <path d="M0 0H60M0 0V60" fill="none" stroke="var(--grid-major)" />
        </pattern>
      </defs>
      <rect width="860" height="1000" fill="url(#chart-minor)" />
      <rect width="860" height="1000" fill="url(#chart-major)" />
      <rect x="60" y="264" width="57.6" height="616" fill="var(--mark)" opacity="0.38" />
      <rect x="60" y="264" width="57.6" height="14" fill="var(--mark)" />
      {TRACES.map((trace) => (
        <Trace key={trace.colour} trace={trace} />
      ))}
      <path d="M60 264V880H860" fill="none" stroke="var(--ink)" strokeWidth="1.5" />
    </svg>
  );
}

interface DrawnTrace {
  readonly colour: string;
  /** Rise of the curve at infinite time and its rate constant, in pixels. */
  readonly rise: number;
  readonly perPixel: number;
  readonly tangentLength: number;
  readonly markAt: number;
  readonly mark: "up" | "square" | "ring" | "diamond" | "down";
}

const TRACES: readonly DrawnTrace[] = [
  { colour: "var(--cool-5)", rise: 600, perPixel: 0.0094, tangentLength: 96, markAt: 428, mark: "up" },
  { colour: "var(--cool-4)", rise: 606, perPixel: 0.0062, tangentLength: 128, markAt: 492, mark: "square" },
  { colour: "var(--base)", rise: 606, perPixel: 0.0041, tangentLength: 160, markAt: 556, mark: "ring" },
  { colour: "var(--cool-2)", rise: 598, perPixel: 0.00207, tangentLength: 224, markAt: 620, mark: "diamond" },
  { colour: "var(--cool-1)", rise: 560, perPixel: 0.00115, tangentLength: 304, markAt: 684, mark: "down" },
];

function height(trace: DrawnTrace, x: number): number {
  return 880 - trace.rise * (1 - Math.exp(-trace.perPixel * (x - 60)));
}

function Trace({ trace }: { trace: DrawnTrace }) {
  const points = Array.from({ length: 161 }, (_, i) => {
    const x = 60 + 5 * i;
    // A wobble of about a pixel, the same at every request, so that a trace looks measured.
    const wobble = 1.3 * Math.sin(12.9898 * i + 78.233 * trace.perPixel * 1000);
    return `${x},${(height(trace, x) + wobble).toFixed(1)}`;
  });
  const tangentEnd = 880 - trace.rise * trace.perPixel * trace.tangentLength;
  return (
    <g>
      <line
        x1="60"
        y1="880"
        x2={60 + trace.tangentLength}
        y2={tangentEnd.toFixed(1)}
        stroke="var(--ink)"
        strokeWidth="1.5"
        strokeDasharray="7 5"
      />
      <polyline points={points.join(" ")} fill="none" stroke={trace.colour} strokeWidth="2.4" />
      <g transform={`translate(${trace.markAt} ${height(trace, trace.markAt).toFixed(1)})`}>
        <circle r="13" fill="var(--sheet)" />
        <Mark kind={trace.mark} colour={trace.colour} />
      </g>
    </g>
  );
}

function Mark({ kind, colour }: { kind: DrawnTrace["mark"]; colour: string }) {
  switch (kind) {
    case "up":
      return <path d="M-8 6.3H8L0-7.6Z" fill={colour} />;
    case "down":
      return <path d="M-8-6.3H8L0 7.6Z" fill={colour} />;
    case "square":
      return <path d="M-7-7H7V7H-7Z" fill={colour} />;
    case "diamond":
      return <path d="M0-9 9 0 0 9-9 0Z" fill={colour} />;
    case "ring":
      return (
        <>
          <circle r="7.6" fill="var(--sheet)" stroke={colour} strokeWidth="1.7" />
          <circle r="3" fill={colour} />
        </>
      );
  }
}

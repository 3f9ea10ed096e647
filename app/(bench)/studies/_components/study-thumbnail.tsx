import { lookOfMark } from "@/app/_figures/mark-look";
import type { ThumbnailTrace } from "../view";

const WIDTH = 112;
const HEIGHT = 46;

/** A study's traces on a slip of chart paper, 112 × 46. Without traces the paper stays blank. */
export function StudyThumbnail({ traces }: { traces: readonly ThumbnailTrace[] }) {
  return (
    <svg
      width={WIDTH}
      height={HEIGHT}
      viewBox={`0 0 ${WIDTH} ${HEIGHT}`}
      aria-hidden="true"
      className="block"
    >
      <path d={GRID} stroke="var(--grid-minor)" fill="none" />
      {traces.map((trace, index) => (
        <polyline
          key={index}
          points={trace.x
            .map(
              (x, i) =>
                `${place(1 + x * (WIDTH - 2))},${place(HEIGHT - 3 - (trace.y[i] ?? 0) * (HEIGHT - 8))}`,
            )
            .join(" ")}
          fill="none"
          strokeWidth="1.5"
          strokeLinejoin="round"
          style={{ stroke: lookOfMark(trace.mark).colour }}
        />
      ))}
      <path d={`M.5 0V${HEIGHT - 0.5}H${WIDTH}`} stroke="var(--ink)" fill="none" />
    </svg>
  );
}

const STEP = 8;
const GRID = [
  ...Array.from({ length: Math.floor(WIDTH / STEP) }, (_, index) => `M${(index + 1) * STEP} 0V${HEIGHT}`),
  ...Array.from({ length: Math.floor(HEIGHT / STEP) }, (_, index) => `M0 ${6 + index * STEP}H${WIDTH}`),
].join("");

function place(value: number): number {
  return Math.round(value * 10) / 10;
}

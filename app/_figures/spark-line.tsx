import type { RunMark } from "@/app/_worksheet/analysis";
import { decimate } from "./decimate";
import { lookOfMark } from "./mark-look";

const WIDTH = 116;
const HEIGHT = 26;

/** A trace in a table cell, 116 × 26; `domain` is common to all rows and the window is highlighted. */
export function SparkLine({
  x,
  y,
  domain,
  window,
  mark,
  setAside,
  label,
}: {
  x: readonly number[];
  y: readonly number[];
  domain: { readonly x: readonly [number, number]; readonly y: readonly [number, number] };
  /** First and last time used; null without a rate. */
  window: readonly [number, number] | null;
  mark: RunMark;
  setAside: boolean;
  /** "Trace of R03". */
  label: string;
}) {
  const across = (value: number) => place(value, domain.x, 1, WIDTH - 1);
  const up = (value: number) => place(value, domain.y, HEIGHT - 2, 2);
  const thin = decimate(x, y, WIDTH / 2);
  return (
    <svg width={WIDTH} height={HEIGHT} viewBox={`0 0 ${WIDTH} ${HEIGHT}`} role="img" aria-label={label}>
      {window !== null && (
        <rect
          x={across(window[0])}
          width={Math.max(1, across(window[1]) - across(window[0]))}
          y="0"
          height={HEIGHT - 1}
          fill="var(--mark)"
        />
      )}
      <path d={`M0 ${HEIGHT - 0.5}H${WIDTH}`} stroke="var(--rule)" fill="none" />
      <polyline
        points={thin.x.map((value, i) => `${across(value)},${up(thin.y[i] ?? 0)}`).join(" ")}
        fill="none"
        strokeWidth="1.6"
        strokeLinejoin="round"
        style={{ stroke: setAside ? "var(--ctl)" : lookOfMark(mark).colour }}
      />
    </svg>
  );
}

function place(value: number, [low, high]: readonly [number, number], from: number, to: number): number {
  const share = high === low ? 0 : (value - low) / (high - low);
  return Math.round((from + Math.min(1.02, Math.max(-0.02, share)) * (to - from)) * 10) / 10;
}

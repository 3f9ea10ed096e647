import { decimate } from "@/app/_figures/decimate";
import type { FileReading, Reading, TraceReading } from "./reading";

/** A reading as the page shows it: the traces thinned for drawing, everything else as it is. Plain JSON. */

export interface TracePreview
  extends Pick<
    TraceReading,
    "source" | "column" | "label" | "labelReason" | "runId" | "temperatureKelvin" | "recipe"
  > {
  readonly readings: number;
  readonly fromSeconds: number;
  readonly toSeconds: number;
  /** For the drawing, at most a few hundred points; empty beyond the first traces and where time does not rise. */
  readonly timeSeconds: readonly number[];
  readonly signal: readonly number[];
}

export type ImportPreview =
  | (Omit<FileReading, "traces" | "corrections"> & { readonly traces: readonly TracePreview[] })
  | Extract<Reading, { status: "refused" }>;

/** More lines than this cannot be told apart in one figure. */
const DRAWN_TRACES = 30;
const DRAWN_WIDTH = 120;
const SHOWN_ISSUES = 200;

export function previewOf(reading: Reading): ImportPreview {
  if (reading.status === "refused") return reading;
  const { traces, corrections: _known, issues, ...rest } = reading;
  return {
    ...rest,
    issues: issues.slice(0, SHOWN_ISSUES),
    traces: traces.map(({ timeSeconds, signal, ...trace }, i) => {
      const drawn =
        i < DRAWN_TRACES && rises(timeSeconds)
          ? decimate(Array.from(timeSeconds), Array.from(signal), DRAWN_WIDTH)
          : { x: [], y: [] };
      return {
        ...trace,
        readings: signal.length,
        fromSeconds: timeSeconds[0] ?? 0,
        toSeconds: timeSeconds.at(-1) ?? 0,
        timeSeconds: [...drawn.x],
        signal: [...drawn.y],
      };
    }),
  };
}

function rises(times: Float64Array): boolean {
  for (let i = 1; i < times.length; i++) if (!((times[i] ?? 0) > (times[i - 1] ?? 0))) return false;
  return true;
}

import { whyNotCounted } from "kinetics-core/initial-rate";
import { printNumber } from "kinetics-core/quantities";
import { decimate } from "@/app/_figures/decimate";
import type { RunAnalysis } from "@/app/_worksheet/analysis";
import { traceCounts } from "@/app/_worksheet/trace-counts";
import { typedUncertain } from "@/app/_worksheet/typed-number/print-typed";
import type { SheetRun } from "@/db/sheet/sheet.schema";
import type { ShownTrace } from "./estimate-view";
import type { TraceScale } from "./trace-scale";

/** Trace of the run that is looked at, in seconds and signal as stored. */
export interface StoredTrace {
  readonly timeSeconds: ArrayLike<number>;
  readonly signal: ArrayLike<number>;
}

/** Times in the shown unit; empty boxes say nothing. */
export interface TraceMarksView {
  readonly timeZero: string;
  readonly deadTime: string;
  readonly from: string;
  readonly to: string;
  /** Signal when the reaction is over, in the shown unit. */
  readonly end: string;
  readonly signal: TraceScale["signal"];
  readonly signalFactor: number;
  /** First and last second of the stored trace. */
  readonly ends: readonly [number, number];
  readonly spikes: readonly { readonly place: number; readonly time: string; readonly signal: string }[];
}

/** A longer trace is thinned for the drawing; the estimate always sees every reading. */
const DRAWN_COLUMNS = 1000;

export function marksOf(row: SheetRun, scale: TraceScale, stored: StoredTrace): TraceMarksView {
  const time = (seconds: number) => String(Number((seconds / scale.secondsPerTime).toPrecision(6)));
  const { endSignal, trim } = row;
  return {
    timeZero: time(row.timeZeroSeconds),
    deadTime: time(row.deadTimeSeconds),
    from: trim === null ? "" : time(trim.fromSeconds),
    to: trim === null ? "" : time(trim.toSeconds),
    end:
      endSignal === null
        ? ""
        : typedUncertain({
            value: Number((endSignal.value * scale.signalFactor).toPrecision(12)),
            standardUncertainty: Number((endSignal.standardUncertainty * scale.signalFactor).toPrecision(12)),
          }),
    signal: scale.signal,
    signalFactor: scale.signalFactor,
    ends: [stored.timeSeconds[0] ?? 0, stored.timeSeconds[stored.timeSeconds.length - 1] ?? 0],
    spikes: row.spikes.map((place) => ({
      place,
      time: time(stored.timeSeconds[place] ?? 0),
      signal: printNumber((stored.signal[place] ?? 0) * scale.signalFactor, 4),
    })),
  };
}

export function shownTrace(
  selected: RunAnalysis,
  row: SheetRun,
  scale: TraceScale,
  stored: StoredTrace,
): ShownTrace {
  const seconds = Array.from(stored.timeSeconds);
  const places = shownPlaces(seconds, Array.from(stored.signal), row.spikes);
  const counts = traceCounts(row);
  const marked = new Set(row.spikes);
  const outside: number[] = [];
  const spikes: number[] = [];
  for (const [index, place] of places.entries()) {
    const why = whyNotCounted(counts, marked, place, seconds[place] ?? 0);
    if (why === "spike") spikes.push(index);
    else if (why !== null) outside.push(index);
  }
  return {
    run: { label: selected.label, mark: selected.mark, setAside: selected.state === "set-aside" },
    seconds: places.map((place) => seconds[place] ?? 0),
    signal: places.map((place) => (stored.signal[place] ?? 0) * scale.signalFactor),
    timeZeroSeconds: row.timeZeroSeconds,
    places,
    outside,
    spikes,
    counts: counts.trim ?? [seconds[0] ?? 0, seconds.at(-1) ?? 0],
  };
}

/** Places of the readings that are drawn: all of a short trace, of a long one what can be seen and every spike. */
function shownPlaces(
  seconds: readonly number[],
  signal: readonly number[],
  spikes: readonly number[],
): readonly number[] {
  const drawn = decimate(seconds, signal, DRAWN_COLUMNS).x;
  const places: number[] = [];
  const marked = new Set(spikes);
  let next = 0;
  for (const [place, at] of seconds.entries()) {
    const isDrawn = drawn[next] === at;
    if (isDrawn) next += 1;
    if (isDrawn || marked.has(place)) places.push(place);
  }
  return places;
}

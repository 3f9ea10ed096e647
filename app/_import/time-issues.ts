import type { Issue, Repair } from "./reading";
import type { TimeFaults } from "./time-order";
import { counted, lineList, plain } from "./words";

/** Times that repeat or fall back, said once for every trace that shares the time column. */
export function timeIssues(
  faults: TimeFaults,
  place: {
    readonly column: number;
    readonly traces: string;
    readonly unit: string;
    readonly readings: number;
    readonly firstTime: number;
  },
): Issue[] {
  const issues: Issue[] = [];
  const repeat = faults.repeats[0];
  if (repeat) {
    const one = faults.repeatCount === 1;
    issues.push({
      code: "repeated-time",
      severity: "blocks",
      line: repeat.line,
      column: place.column,
      place: lineList(
        faults.repeats.map(({ line }) => line),
        faults.repeatCount,
      ),
      message: `${one ? "This line repeats" : "These lines repeat"} the time of the line before (${plain(repeat.time)} ${place.unit} stands on line ${repeat.earlierLine} and line ${repeat.line}). A trace has one reading at a time${one ? "" : `; ${counted(faults.repeatCount, "time")} are repeated`}.`,
      repairs: [
        { label: "Keep the first reading", change: { kind: "set", values: { repeatedTimes: "first" } } },
        { label: "Take their mean", change: { kind: "set", values: { repeatedTimes: "mean" } } },
      ],
    });
  }
  const fall = faults.falls[0];
  if (fall) {
    const span = fall.earlierTime - place.firstTime;
    const restarts = place.readings >= 6 && span > 0 && fall.earlierTime - fall.time > span / 2;
    const repairs: Repair[] = [];
    if (restarts) {
      repairs.push({
        label: "Read as runs below one another",
        change: { kind: "set", values: { arrangement: "blocks" } },
      });
      repairs.push({
        label: `Read up to line ${fall.earlierLine} only`,
        change: { kind: "set", values: { lastDataLine: fall.earlierLine } },
      });
    } else if (faults.fallCount <= faults.falls.length && faults.fallCount < 5) {
      repairs.push({
        label:
          faults.fallCount === 1
            ? `Leave line ${fall.line} out`
            : `Leave these ${faults.fallCount} lines out`,
        change: { kind: "leave-lines-out", lines: faults.falls.map(({ line }) => line) },
      });
    }
    if (!restarts) {
      repairs.push({
        label: "Sort the readings by time",
        change: { kind: "set", values: { timeOrder: "sorted" } },
      });
    }
    issues.push({
      code: "falling-time",
      severity: "blocks",
      line: fall.line,
      column: place.column,
      place: lineList(
        faults.falls.map(({ line }) => line),
        faults.fallCount,
      ),
      message: `The time falls from ${plain(fall.earlierTime)} ${place.unit} on line ${fall.earlierLine} to ${plain(fall.time)} ${place.unit} on line ${fall.line}${place.traces === "" ? "" : ` (${place.traces})`}. Time has to rise within a trace.${restarts ? " If another run begins here, read the file as runs below one another." : ""}`,
      repairs,
    });
  }
  return issues;
}

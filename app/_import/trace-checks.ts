import { POINTS_PER_STUDY, RUNS_PER_STUDY } from "@/db/limits";
import type { Issue, StudyContext, TraceReading } from "./reading";
import { counted, grouped, joined } from "./words";

/** What the traces as a whole say: too few readings, the same readings twice, more than a study holds. */

/** An initial rate needs three readings at least; a study's rule needs eight. */
const FEWEST_READINGS = 3;

export function traceChecks(
  traces: readonly TraceReading[],
  context: StudyContext,
  tooManyPoints: boolean,
): Issue[] {
  const issues: Issue[] = [];
  const add = (issue: Pick<Issue, "code" | "severity" | "place" | "message">) =>
    issues.push({ line: null, column: null, repairs: [], ...issue });

  if (traces.length === 0) {
    add({
      code: "no-trace",
      severity: "blocks",
      place: "file",
      message:
        "No trace was found: a column of times and a column of numbers beside it are needed. Correct the separator or say what each column is.",
    });
    return issues;
  }
  if (context.signal === null) {
    add({
      code: "no-signal-model",
      severity: "blocks",
      place: "set-up",
      message:
        "The set-up does not say yet what the signal is, so its unit cannot be settled. Fill in the signal in Set-up first; the file waits here.",
    });
  }
  const newRuns = traces.filter((trace) => trace.runId === null).length;
  if (context.runRows + newRuns > RUNS_PER_STUDY) {
    add({
      code: "too-many-runs",
      severity: "blocks",
      place: "file",
      message: `The file adds ${counted(newRuns, "run")} to the ${grouped(context.runRows)} of this study; a study holds ${grouped(RUNS_PER_STUDY)}. Leave columns out, or start another study.`,
    });
  }
  if (tooManyPoints) {
    add({
      code: "too-many-points",
      severity: "blocks",
      place: "file",
      message: `With this file the study would hold more than ${grouped(POINTS_PER_STUDY)} readings, the most a study takes (${grouped(context.points)} are stored already). Thin the traces out, leave columns out, or start another study.`,
    });
  }
  const few = traces.filter((trace) => trace.timeSeconds.length < FEWEST_READINGS);
  if (few.length > 0) {
    add({
      code: "too-few-readings",
      severity: "weakens",
      place: joined(
        few.slice(0, 5).map((trace) => trace.label),
        few.length > 5 ? `${few.length - 5} more` : null,
      ),
      message: `${few.length === 1 ? "This trace has" : "These traces have"} fewer than ${FEWEST_READINGS} readings: no initial rate can be had from ${few.length === 1 ? "it" : "them"}.`,
    });
  }
  const twins = equalTraces(traces);
  if (twins.length > 0) {
    const all = twins.length === 1 && twins[0]?.length === traces.length;
    add({
      code: "equal-traces",
      severity: "weakens",
      place: joined(
        twins[0]?.slice(0, 4).map((trace) => trace.label) ?? [],
        (twins[0]?.length ?? 0) > 4 ? "others" : null,
      ),
      message: all
        ? "All traces hold the very same readings. If one was copied over the others, export the file again; stored like this they say nothing about any order."
        : "These traces hold the very same readings. If one was copied over the other, leave one out.",
    });
  }
  return issues;
}

/** Groups of two or more traces with equal readings. */
function equalTraces(traces: readonly TraceReading[]): TraceReading[][] {
  const groups = new Map<string, TraceReading[]>();
  for (const trace of traces) {
    if (trace.signal.length < 2) continue;
    const key = [
      trace.signal.length,
      trace.signal[0],
      trace.signal[trace.signal.length >> 1],
      trace.signal.at(-1),
    ].join();
    groups.set(key, [...(groups.get(key) ?? []), trace]);
  }
  return [...groups.values()].flatMap((group) => {
    const first = group[0];
    if (!first) return [];
    const same = group.filter(
      (other) =>
        other.signal.every((value, i) => value === first.signal[i]) &&
        other.timeSeconds.every((value, i) => value === first.timeSeconds[i]),
    );
    return same.length > 1 ? [same] : [];
  });
}

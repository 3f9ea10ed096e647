import type { Kysely } from "kysely";
import type { Database } from "../database";
import type { Actor } from "../member/actor";
import type { SheetRun } from "../sheet/sheet.schema";
import { type ChangeResult, type ChangeTarget, changeStudy } from "../study/change-study";
import { about, onRuns } from "./run.commands";

/** What a run says of its trace. Readings stay where they are; these fields say which of them are fitted. */

export interface TraceMarks {
  readonly deadTimeSeconds?: SheetRun["deadTimeSeconds"] | undefined;
  readonly trim?: SheetRun["trim"] | undefined;
  readonly endSignal?: SheetRun["endSignal"] | undefined;
}

/** Dead time, the part that counts and the signal at the end; what is not given stays. */
export function setTraceMarks(
  db: Kysely<Database>,
  actor: Actor,
  target: ChangeTarget,
  runId: string,
  { deadTimeSeconds, trim, endSignal }: TraceMarks,
): Promise<ChangeResult> {
  const said = [
    ...(deadTimeSeconds === undefined ? [] : [`dead time ${seconds(deadTimeSeconds)}`]),
    ...(trim === undefined
      ? []
      : [
          trim === null
            ? "all of its trace counts"
            : `its trace counts from ${seconds(trim.fromSeconds)} to ${seconds(trim.toSeconds)}`,
        ]),
    ...(endSignal === undefined
      ? []
      : [endSignal === null ? "no signal at the end" : `signal at the end ${printed(endSignal.value)}`]),
  ];
  return changeStudy(
    db,
    actor,
    target,
    { verb: "trace", summary: about([runId], said.join(", ")) },
    onRuns([runId], (run) => ({
      ...run,
      ...(deadTimeSeconds === undefined ? {} : { deadTimeSeconds }),
      ...(trim === undefined ? {} : { trim }),
      ...(endSignal === undefined ? {} : { endSignal }),
    })),
  );
}

/** Readings marked as spikes, all of them: by their place in the trace from 0. */
export function setSpikes(
  db: Kysely<Database>,
  actor: Actor,
  target: ChangeTarget,
  runId: string,
  places: readonly number[],
): Promise<ChangeResult> {
  const spikes = [...new Set(places)].sort((a, b) => a - b);
  const count = spikes.length === 1 ? "1 reading" : `${spikes.length || "no"} readings`;
  return changeStudy(
    db,
    actor,
    target,
    { verb: "spikes", summary: about([runId], `has ${count} marked as spikes`) },
    (sheet, revision) => {
      const points = sheet.runs.find((run) => run.id === runId)?.trace?.points ?? 0;
      if (spikes.some((place) => place >= points))
        return { refused: "A reading that is not in the trace was marked. Load the page again." };
      return onRuns([runId], (run) => ({ ...run, spikes }))(sheet, revision);
    },
  );
}

function seconds(value: number): string {
  return `${printed(value)} s`;
}

function printed(value: number): string {
  return String(Number(value.toPrecision(8))).replace("-", "\u2212");
}

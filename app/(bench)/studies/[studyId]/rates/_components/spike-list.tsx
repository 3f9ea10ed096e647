"use client";

import { useState } from "react";
import { nearestReading } from "@/app/_figures/window-choice";
import { Button } from "@/app/_ui/button";
import { Field } from "@/app/_ui/field";
import { parseNumber } from "@/app/_worksheet/typed-number/parse-number";
import type { TraceMarksView } from "../shown-trace";
import type { RunRateView, TraceOfRun } from "../view";
import type { SavedWindow } from "./use-saved-window";
import type { TraceMarks } from "./use-trace-marks";

interface Proposal {
  readonly places: readonly number[];
  readonly sentence: string;
}

/** Readings marked as spikes, by their times; others are marked by a time, by a click on the trace, or as proposed. */
export function SpikeList({
  run,
  trace,
  said,
  window,
  marks,
}: {
  run: RunRateView;
  trace: TraceOfRun;
  said: TraceMarksView;
  window: SavedWindow;
  marks: TraceMarks;
}) {
  const { timeUnit } = run.timeScale;
  const [proposal, setProposal] = useState<Proposal | null>(null);
  const places = said.spikes.map((spike) => spike.place);

  async function look() {
    const found = await window.lookForSpikes();
    setProposal(found === null ? UNSEEN : { places: found.places, sentence: proposed(found, said) });
  }
  function markProposed(found: readonly number[]) {
    marks.setSpikes([...places, ...found]);
    setProposal(null);
  }

  return (
    <div className="mt-3">
      {said.spikes.length === 0 ? (
        <p className="text-caption text-ink-2">No reading is marked as a spike.</p>
      ) : (
        <ul aria-label="Readings marked as spikes">
          {said.spikes.map((spike) => (
            <li key={spike.place} className="flex items-baseline justify-between gap-2">
              <span>
                {spike.time} {timeUnit}: {spike.signal}
              </span>
              <Button
                kind="text"
                disabled={marks.saving}
                aria-label={`Take the mark from the reading at ${spike.time} ${timeUnit}`}
                onClick={() => marks.setSpikes(places.filter((place) => place !== spike.place))}
              >
                Unmark
              </Button>
            </li>
          ))}
        </ul>
      )}
      <MarkAt trace={trace} run={run} places={places} marks={marks} />
      <p className="mt-2">
        <Button size="small" onClick={() => void look()} disabled={marks.saving}>
          Look for spikes
        </Button>
      </p>
      {proposal !== null && (
        <div className="mt-1" role="status">
          <p className="text-caption text-ink-2">{proposal.sentence}</p>
          {proposal.places.length > 0 && (
            <p className="mt-1">
              <Button size="small" onClick={() => markProposed(proposal.places)} disabled={marks.saving}>
                {proposal.places.length === 1
                  ? "Mark this reading"
                  : `Mark ${proposal.places.length} readings`}
              </Button>
            </p>
          )}
        </div>
      )}
    </div>
  );
}

const UNSEEN: Proposal = { places: [], sentence: "The trace could not be looked at. Load the page again." };

function proposed(
  { places, standOff }: { readonly places: readonly number[]; readonly standOff: number },
  { signal, signalFactor }: TraceMarksView,
): string {
  const off = `${Number((standOff * signalFactor).toPrecision(2))} ${signal.unit}`.trim();
  if (places.length === 0) return `No reading stands more than ${off} off its neighbours.`;
  return places.length === 1
    ? `One reading stands more than ${off} off its neighbours.`
    : `${places.length} readings stand more than ${off} off their neighbours.`;
}

/** Marks the drawn reading that is nearest to a time. */
function MarkAt({
  trace,
  run,
  places,
  marks,
}: {
  trace: TraceOfRun;
  run: RunRateView;
  places: readonly number[];
  marks: TraceMarks;
}) {
  const { timeUnit, secondsPerTime } = run.timeScale;
  const [typed, setTyped] = useState("");
  const [error, setError] = useState<string | null>(null);
  function mark() {
    const reading = parseNumber(typed);
    if (reading.status !== "number")
      return setError(reading.status === "empty" ? "Type the time of a reading." : reading.message);
    const index = nearestReading(trace.shown.seconds, reading.value * secondsPerTime);
    const place = trace.shown.places[index];
    if (place === undefined) return setError("The trace has no readings.");
    setError(null);
    setTyped("");
    marks.setSpikes([...places, place]);
  }
  return (
    <form
      className="mt-2 flex items-end gap-2"
      onSubmit={(event) => {
        event.preventDefault();
        mark();
      }}
    >
      <div className="w-32">
        <Field
          label="Reading at"
          unit={timeUnit}
          inputMode="decimal"
          value={typed}
          error={error}
          onChange={(event) => setTyped(event.target.value)}
        />
      </div>
      <Button size="small" type="submit" disabled={marks.saving}>
        Mark as a spike
      </Button>
    </form>
  );
}

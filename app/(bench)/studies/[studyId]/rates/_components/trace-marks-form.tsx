"use client";

import { useActionState } from "react";
import { Button } from "@/app/_ui/button";
import { Field } from "@/app/_ui/field";
import { parseNumber } from "@/app/_worksheet/typed-number/parse-number";
import { parseUncertain } from "@/app/_worksheet/typed-number/parse-uncertain";
import { saveTraceMarks } from "../actions";
import type { TraceMarksView } from "../shown-trace";
import type { TraceScale } from "../trace-scale";
import type { RunTarget, StudyChange } from "./use-saved-window";

type Errors = Partial<Record<"deadTime" | "from" | "to" | "end" | "all", string>>;

/** Dead time, the part of the trace that counts and the signal at the end. Boxes that nobody touched are not sent. */
export function TraceMarksForm({
  target,
  marks,
  scale,
  change,
}: {
  target: RunTarget;
  marks: TraceMarksView;
  scale: Pick<TraceScale, "timeUnit" | "secondsPerTime">;
  change: StudyChange;
}) {
  const [errors, act, saving] = useActionState(async (_before: Errors, form: FormData): Promise<Errors> => {
    const typed = (name: string) => String(form.get(name) ?? "").trim();
    const found: Errors = {};
    const seconds = (name: "deadTime" | "from" | "to", empty: number) => {
      const reading = parseNumber(typed(name));
      if (reading.status === "not-a-number") found[name] = reading.message;
      return reading.status === "number" ? reading.value * scale.secondsPerTime : empty;
    };
    const deadTimeSeconds = seconds("deadTime", 0);
    if (deadTimeSeconds < 0) found.deadTime = "A dead time is not negative.";
    const trim =
      typed("from") === "" && typed("to") === ""
        ? null
        : { fromSeconds: seconds("from", marks.ends[0]), toSeconds: seconds("to", marks.ends[1]) };
    if (trim !== null && found.to === undefined && !(trim.fromSeconds < trim.toSeconds))
      found.to = "It ends before it starts. Set its end after its start.";
    const end = parseUncertain(typed("end"));
    if (end.status === "not-readable") found.end = end.message;
    if (Object.keys(found).length > 0) return found;
    const result = await saveTraceMarks({
      ...target,
      ...(typed("deadTime") === marks.deadTime ? {} : { deadTimeSeconds }),
      ...(typed("from") === marks.from && typed("to") === marks.to ? {} : { trim }),
      ...(typed("end") === marks.end
        ? {}
        : {
            endSignal:
              end.status === "uncertain"
                ? {
                    value: end.value / marks.signalFactor,
                    standardUncertainty: end.standardUncertainty / marks.signalFactor,
                  }
                : null,
          }),
    });
    if (!result.ok) return { all: result.message };
    change.announce(result.value);
    return {};
  }, {});
  const box = (name: "deadTime" | "from" | "to" | "end") => ({
    name,
    defaultValue: marks[name],
    error: errors[name],
  });
  // Another value on record is another box: what was typed into the last one does not cover it.
  const keyOf = (name: "deadTime" | "from" | "to" | "end") => `${name} ${marks[name]}`;
  return (
    <form action={act} className="mt-3">
      <div className="grid grid-cols-2 gap-x-3 gap-y-2">
        <Field
          key={keyOf("deadTime")}
          label="Dead time"
          unit={scale.timeUnit}
          inputMode="decimal"
          {...box("deadTime")}
        />
        <Field
          key={keyOf("end")}
          label="Signal at the end"
          unit={marks.signal.unit}
          placeholder="not known"
          {...box("end")}
        />
        <Field
          key={keyOf("from")}
          label="Counts from"
          unit={scale.timeUnit}
          inputMode="decimal"
          placeholder="start"
          {...box("from")}
        />
        <Field
          key={keyOf("to")}
          label="Counts to"
          unit={scale.timeUnit}
          inputMode="decimal"
          placeholder="end"
          {...box("to")}
        />
      </div>
      {errors.all !== undefined && <p className="field-error mt-1">{errors.all}</p>}
      <p className="mt-2">
        <Button size="small" type="submit" disabled={saving}>
          Keep what counts
        </Button>
      </p>
    </form>
  );
}

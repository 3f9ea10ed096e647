"use client";

import { useActionState } from "react";
import { Button } from "@/app/_ui/button";
import { Field } from "@/app/_ui/field";
import { saveTimeZero } from "../actions";
import type { TraceScale } from "../trace-scale";
import type { RunTarget, StudyChange } from "./use-saved-window";

/** When the reactants met, on this trace's clock. The slope is read back to it. */
export function TimeZeroForm({
  target,
  saved,
  scale,
  change,
}: {
  target: RunTarget;
  /** In the shown unit of time. */
  saved: string;
  scale: Pick<TraceScale, "timeUnit" | "secondsPerTime">;
  change: StudyChange;
}) {
  const [error, act, saving] = useActionState(async (_before: string | null, form: FormData) => {
    const typed = String(form.get("timeZero") ?? "").trim();
    const value = Number(typed.replace(",", ".").replace("\u2212", "-"));
    if (typed === "" || !Number.isFinite(value)) return `“${typed}” is no time. Type a number, 0 or 1.5.`;
    const result = await saveTimeZero({ ...target, timeZeroSeconds: value * scale.secondsPerTime });
    if (!result.ok) return result.message;
    change.announce(result.value);
    return null;
  }, null);
  return (
    <form action={act} className="mt-3 flex items-end gap-2">
      <div className="w-32">
        <Field
          key={saved}
          label="Mixed at"
          unit={scale.timeUnit}
          name="timeZero"
          inputMode="decimal"
          defaultValue={saved}
          error={error}
        />
      </div>
      <Button size="small" type="submit" disabled={saving}>
        Set time zero
      </Button>
    </form>
  );
}

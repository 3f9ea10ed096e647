"use client";

import { useActionState } from "react";
import { Button } from "@/app/_ui/button";
import { Disclosure } from "@/app/_ui/disclosure";
import { Field, Select } from "@/app/_ui/field";
import type { useStudyChange } from "../../../_change/use-study-change";
import { keepSettings } from "../actions";
import type { StandardsView } from "../view";
import type { StandardsTarget } from "./standards-sheet";

type Faults = Readonly<Record<string, string>>;

/** What the standards contain and how the line is drawn through them. */
export function LineSettings({
  target,
  view,
  change,
  canEdit,
}: {
  target: StandardsTarget;
  view: StandardsView;
  change: ReturnType<typeof useStudyChange>;
  canEdit: boolean;
}) {
  const { settings, unit, unitText } = view;
  const [faults, act, saving] = useActionState(async (_: Faults, form: FormData): Promise<Faults> => {
    const result = await keepSettings({ ...target, unit, ...Object.fromEntries(form) });
    if (result.ok) {
      change.announce(result.value);
      return {};
    }
    if (result.fields === undefined) change.refuse(result.message);
    return Object.fromEntries((result.fields ?? []).map(({ path, message }) => [path, message]));
  }, {});
  return (
    <section className="border-t-2 border-ink pt-3">
      <Disclosure
        summary={`How the line is drawn: ${settings.weighting === "none" ? "unweighted" : "weighted 1/S²"}, intercept ${settings.intercept === "fitted" ? "free" : "0"}`}
      >
        <form action={act} className="mt-3">
          <fieldset disabled={!canEdit} className="grid grid-cols-2 gap-x-4 gap-y-3 phone:grid-cols-1">
            <legend className="sr-only">How the line is drawn</legend>
            <Select label="Standards contain" name="speciesId" defaultValue={settings.speciesId}>
              {settings.speciesId === "" && <option value="">not said</option>}
              {settings.species.map(({ id, name }) => (
                <option key={id} value={id}>
                  {name}
                </option>
              ))}
            </Select>
            <Select label="Intercept" name="intercept" defaultValue={settings.intercept}>
              <option value="fitted">free</option>
              <option value="none">0, through the origin</option>
            </Select>
            <Select label="Readings scatter" name="weighting" defaultValue={settings.weighting}>
              <option value="none">alike</option>
              <option value="proportional">in proportion to the signal</option>
            </Select>
            <Field
              label="Uncertainty of the stock"
              unit="%"
              name="stock"
              inputMode="decimal"
              defaultValue={settings.stock}
              placeholder="0.35"
              error={faults.stock}
            />
            <Field
              label="Range from"
              unit={unitText}
              name="low"
              inputMode="decimal"
              defaultValue={settings.low}
              placeholder="lowest standard"
              error={faults.low}
            />
            <Field
              label="Range to"
              unit={unitText}
              name="high"
              inputMode="decimal"
              defaultValue={settings.high}
              placeholder="highest standard"
              error={faults.high}
            />
          </fieldset>
          <p className="hint">
            The stock’s uncertainty is common to all standards: it widens the slope and no residual shows it.
            Standards outside the range stay on the table.
          </p>
          {canEdit && (
            <div className="mt-3">
              <Button type="submit" disabled={saving}>
                Draw the line so
              </Button>
            </div>
          )}
        </form>
      </Disclosure>
    </section>
  );
}

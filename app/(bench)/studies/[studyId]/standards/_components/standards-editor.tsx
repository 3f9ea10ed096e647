"use client";

import { useState, useTransition } from "react";
import { Button } from "@/app/_ui/button";
import { TextArea } from "@/app/_ui/field";
import type { useStudyChange } from "../../../_change/use-study-change";
import { keepStandards } from "../actions";
import type { StandardsView } from "../view";
import type { StandardsTarget } from "./standards-sheet";

const EXAMPLE = "Blank\t0\t0.011\t0.013\nS1\t5.0 ± 0.1\t0.100\t0.109\nS2\t10.0 ± 0.1\t0.189\t0.191";

/** All standards as lines of text; what cannot be read stays as it was typed, with its line named. */
export function StandardsEditor({
  target,
  view,
  change,
  onClose,
}: {
  target: StandardsTarget;
  view: StandardsView;
  change: ReturnType<typeof useStudyChange>;
  onClose: () => void;
}) {
  // The revision that the lines began from: what others change meanwhile is a conflict and not overwritten.
  const [begun] = useState(target);
  const [lines, setLines] = useState(view.lines);
  const [faults, setFaults] = useState<readonly string[]>([]);
  const [saving, start] = useTransition();

  function keep() {
    start(async () => {
      const result = await keepStandards({ ...begun, unit: view.unit, lines });
      if (result.ok) {
        change.announce(result.value);
        onClose();
        return;
      }
      setFaults(result.fields?.map(({ message }) => message) ?? [result.message]);
    });
  }

  return (
    <section aria-label="Edit the standards" className="mb-7">
      <TextArea
        label="Standards, one a line"
        unit={view.unitText}
        rows={Math.min(18, Math.max(8, lines.split("\n").length + 2))}
        value={lines}
        placeholder={EXAMPLE}
        className="[tab-size:12]"
        spellCheck={false}
        autoFocus
        error={
          faults.length === 0 ? undefined : (
            <>
              {faults.slice(0, MOST_FAULTS).map((fault) => (
                <span key={fault} className="block">
                  {fault}
                </span>
              ))}
              {faults.length > MOST_FAULTS && (
                <span className="block">{faults.length - MOST_FAULTS} more lines cannot be read.</span>
              )}
            </>
          )
        }
        hint="Name, concentration and readings, parted by tabs or blanks, as they come from a spreadsheet. A line without a name is given one; a name that begins with “Blank” makes a blank, which is read and not in the line."
        onChange={(event) => {
          setLines(event.target.value);
          setFaults([]);
        }}
      />
      <div className="mt-3 flex flex-wrap gap-2">
        <Button kind="primary" disabled={saving} onClick={keep}>
          {saving ? "Keeping" : "Keep the standards"}
        </Button>
        <Button onClick={onClose}>Discard</Button>
      </div>
    </section>
  );
}

const MOST_FAULTS = 6;

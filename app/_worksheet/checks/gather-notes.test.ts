import { expect, test } from "vitest";
import type { Check } from "../analysis";
import { gatherNotes } from "./gather-notes";

const runs = Array.from({ length: 12 }, (_, index) => ({ runId: `run-${index}`, label: `R${index + 1}` }));

function note(run: number, rest: Partial<Check> = {}): Check {
  return {
    code: "conversion-short",
    severity: "note",
    station: "rates",
    runId: `run-${run}`,
    message: `R${run + 1}: its window ends at 3${run} % conversion.`,
    settled: null,
    ofSeveral: "their windows end early.",
    ...rest,
  };
}

test("a note that runs share is said once, at the place of the first, and no longer points at one run", () => {
  const other = note(5, { code: "window-by-hand", ofSeveral: "their windows were set by hand." });
  const gathered = gatherNotes([note(0), other, note(2), note(3)], runs);
  expect(gathered).toEqual([
    {
      code: "conversion-short",
      severity: "note",
      station: "rates",
      runId: null,
      message: "R1, R3 and R4: their windows end early.",
      settled: null,
    },
    other,
  ]);
});

test("what blocks or weakens, was answered, or has no words for several stays with its run", () => {
  const apart = [
    note(0, { severity: "weakens" }),
    note(1, { severity: "weakens" }),
    note(2, { settled: "Set aside: stirrer stopped" }),
    note(3, { settled: "Set aside: stirrer stopped" }),
    { ...note(4), ofSeveral: undefined },
    { ...note(5), ofSeveral: undefined },
    note(6),
  ].map(({ ofSeveral, ...rest }) => (ofSeveral === undefined ? rest : { ...rest, ofSeveral }));
  expect(gatherNotes(apart, runs)).toEqual(apart);
});

test("of very many runs the rest is counted", () => {
  const [only] = gatherNotes(
    runs.map((_, index) => note(index)),
    runs,
  );
  expect(only?.message).toBe("R1, R2, R3, R4, R5, R6, R7 and 5 more runs: their windows end early.");
});

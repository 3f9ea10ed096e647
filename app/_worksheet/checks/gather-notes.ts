import type { Check } from "../analysis";
import { list } from "../missing-law";

/** Labels that a gathered note names before it counts the rest. */
const MOST_NAMED = 8;

/**
 * Open notes that runs share, each once with the labels of its runs, in the place of the first. What blocks or
 * weakens a run stays with that run: each asks for an answer of its own.
 */
export function gatherNotes(
  checks: readonly Check[],
  runs: readonly { readonly runId: string; readonly label: string }[],
): readonly Check[] {
  const labels = new Map(runs.map(({ runId, label }) => [runId, label]));
  const shared = new Map<string, Check[]>();
  for (const check of checks) {
    const key = sharedBy(check);
    if (key !== null) shared.set(key, [...(shared.get(key) ?? []), check]);
  }
  return checks.flatMap((check): readonly Check[] => {
    const key = sharedBy(check);
    const group = key === null ? [] : (shared.get(key) ?? []);
    if (group.length < 2) return [check];
    if (group[0] !== check) return [];
    const names = group.map(({ runId }) => labels.get(runId ?? "") ?? "a run");
    const { ofSeveral, ...rest } = check;
    return [{ ...rest, runId: null, message: `${named(names)}: ${ofSeveral}` }];
  });
}

function sharedBy({ severity, settled, runId, code, ofSeveral, station }: Check): string | null {
  const gathers = severity === "note" && settled === null && runId !== null && ofSeveral !== undefined;
  return gathers ? `${station} ${code} ${ofSeveral}` : null;
}

function named(names: readonly string[]): string {
  if (names.length <= MOST_NAMED) return list(names);
  return list([...names.slice(0, MOST_NAMED - 1), `${names.length - MOST_NAMED + 1} more runs`]);
}

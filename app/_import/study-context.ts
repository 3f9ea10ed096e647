import { isMixed, stockedSpecies } from "@/db/sheet/mixed-run";
import type { Sheet } from "@/db/sheet/sheet.schema";
import type { StudyContext } from "./reading";

/** What a file is read against: the study's units, species and present runs. */
export function studyContext(sheet: Sheet): StudyContext {
  const { signal } = sheet;
  return {
    timeUnit: sheet.study.timeUnit,
    signal:
      signal === null || signal.kind === "concentration"
        ? signal
        : { kind: "calibrated", quantity: signal.quantity, unit: signal.unit },
    species: [...sheet.species]
      .sort((a, b) => a.position - b.position)
      .flatMap(({ id, symbol, name, unit, inLaw }) => (inLaw ? [{ id, symbol, name, unit }] : [])),
    runs: sheet.runs.flatMap((run) =>
      run.removedIn === null
        ? [
            {
              id: run.id,
              label: run.label,
              hasTrace: run.trace !== null || run.enteredRate !== null,
              molar: Object.fromEntries(
                Object.entries(run.concentrations).map(([species, { molar }]) => [species, molar]),
              ),
              ...(isMixed(run) ? { mixed: [...stockedSpecies(sheet.stocks)] } : {}),
            },
          ]
        : [],
    ),
    runRows: sheet.runs.length,
    points: sheet.runs.reduce((sum, run) => sum + (run.trace?.points ?? 0), 0),
  };
}

/** Labels of the runs that were read from these very bytes before, in the order of the sheet. */
export function storedFrom(sheet: Sheet, sha256: string): readonly string[] {
  const uploads = new Set(sheet.uploads.flatMap((upload) => (upload.sha256 === sha256 ? [upload.id] : [])));
  return sheet.runs.flatMap((run) =>
    run.removedIn === null && run.trace?.uploadId != null && uploads.has(run.trace.uploadId)
      ? [run.label]
      : [],
  );
}

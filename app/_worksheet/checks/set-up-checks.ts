import type { Check } from "../analysis";
import { rateScale } from "../assemble";
import { studyCheck } from "./check";
import type { Checked } from "./find-checks";

/** What the set-up leaves open: without a signal model there is no rate, without a temperature k stands for nothing. */
export function setUpChecks({ sheet, runs }: Checked): readonly Check[] {
  const checks: Check[] = [];
  const scale = rateScale(sheet);
  const traced = sheet.runs.some((run) => run.removedIn === null && run.trace !== null);
  if (scale.status === "unknown" && traced)
    checks.push(studyCheck("set-up", "blocks", "signal-model", `${scale.reason} Complete it in Set-up.`));
  if (scale.status === "known" && sheet.signal?.kind === "calibrated" && scale.sharedRelative === 0)
    checks.push(
      studyCheck(
        "set-up",
        "note",
        "exact-calibration",
        "The calibration factor is taken as exact, so that its uncertainty is missing from *k*. State it in Set-up.",
      ),
    );
  if (runs.length > 0 && sheet.conditions.temperatureKelvin === null)
    checks.push(
      studyCheck(
        "set-up",
        "weakens",
        "temperature-missing",
        "The set-up names no temperature, and *k* holds at one temperature only. State it with its uncertainty.",
      ),
    );
  return checks;
}

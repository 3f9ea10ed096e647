import type { Check } from "../analysis";
import { calibratedStandards } from "../standards/calibrated-standards";
import { standardsFlags } from "../standards/standards-flags";
import { studyCheck } from "./check";
import type { Checked } from "./find-checks";

/** What the line leaves open that the signal follows. Standards that nothing follows carry no law. */
export function standardsChecks({ sheet, runs }: Checked): readonly Check[] {
  if (sheet.signal?.kind !== "calibrated" || sheet.signal.source !== "standards") return [];
  const line = calibratedStandards(sheet);
  if (line.status === "no-line")
    return [
      studyCheck(
        "standards",
        "weakens",
        "no-line",
        `The signal follows the standards, which make no line now, so that the last factor stands. ${line.message}`,
      ),
    ];
  return standardsFlags(sheet, runs).map(({ severity, code, message }) =>
    studyCheck("standards", severity, code, message),
  );
}

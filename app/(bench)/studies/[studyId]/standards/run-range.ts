import { type Calibration, straightnessAt } from "kinetics-core/calibration";
import { printNumber } from "kinetics-core/quantities";
import { completeExtent } from "@/app/_worksheet/assemble";
import type { DisplayScale } from "@/app/_worksheet/display-units";
import { followedSpecies, presentRuns } from "@/app/_worksheet/present-runs";
import { calibratedSpecies } from "@/app/_worksheet/standards/calibrated-species";
import type { Sheet, SheetSpecies } from "@/db/sheet/sheet.schema";

/** Whether the whole trace of a run stays on the straight part of the line, by what it can reach. */
export interface RunRangeRow {
  readonly runId: string;
  readonly label: string;
  /** Largest concentration of the followed species in it, in the shown unit. */
  readonly largest: string;
  readonly verdict: string;
  readonly severity: "holds" | "weakens" | "blocks";
}

export function runRange(
  sheet: Sheet,
  { line, linearRange }: Calibration,
  { unit, factor }: DisplayScale,
): readonly RunRangeRow[] {
  const followed = followedSpecies(sheet);
  if (followed === null || calibratedSpecies(sheet)?.id !== followed.id) return [];
  const highest = Math.max(...line.standards.map(({ concentration }) => concentration));
  return presentRuns(sheet).flatMap((run): RunRangeRow[] => {
    const molar = run.setAside === null ? largestOf(sheet, run, followed) : null;
    if (molar === null) return [];
    const row = { runId: run.id, label: run.label, largest: `${printNumber(molar * factor, 3)} ${unit}` };
    const straightness = straightnessAt(linearRange, molar);
    if (straightness === "curved")
      return [{ ...row, verdict: "reaches where the line is shown to bend", severity: "blocks" }];
    if (molar > highest * (1 + SLACK))
      return [{ ...row, verdict: "can end above the highest standard", severity: "weakens" }];
    return straightness === "straight"
      ? [{ ...row, verdict: "stays on the straight part", severity: "holds" }]
      : [{ ...row, verdict: "reaches where straightness is not shown", severity: "weakens" }];
  });
}

/** A run that ends at the highest standard does not end above it, whatever its unit lost in conversion. */
const SLACK = 1e-9;

/** Of the followed species within a run: what it starts with, or what complete reaction makes of it; mol L⁻¹. */
function largestOf(sheet: Sheet, run: Sheet["runs"][number], followed: SheetSpecies): number | null {
  const start = run.concentrations[followed.id]?.molar;
  if (followed.stoichiometricNumber < 0) return start ?? null;
  const extent = completeExtent(sheet, run);
  return extent === null ? null : (start ?? 0) + extent * followed.stoichiometricNumber;
}

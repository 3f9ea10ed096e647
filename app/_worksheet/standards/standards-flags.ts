import { linearRangeFlags, partWithoutCurvature } from "kinetics-core/calibration";
import type { Flag } from "kinetics-core/quantities";
import type { Sheet, SheetStandard } from "@/db/sheet/sheet.schema";
import type { RunAnalysis } from "../analysis";
import { concentrationDisplay } from "../display-units";
import { calibratedSpecies } from "./calibrated-species";
import { calibratedStandards } from "./calibrated-standards";
import { usedConcentrations } from "./used-concentrations";

/**
 * What a reader should know about the line of the standards. Its messages give concentrations in the unit that the
 * standards are shown in, so the line is drawn in that unit here. Straightness counts where the line is used: at the readings
 * of the runs whose signal follows it, else at the standards themselves.
 */
export function standardsFlags(sheet: Sheet, runs: readonly RunAnalysis[]): readonly Flag[] {
  const { factor } = concentrationDisplay(calibratedSpecies(sheet)?.unit ?? "mol/L");
  const drawn = calibratedStandards(standardsInUnit(sheet, factor));
  if (drawn.status === "no-line") return [];
  const { line, linearRange, flags } = drawn.calibration;
  const used =
    sheet.signal?.kind === "calibrated" && sheet.signal.source === "standards"
      ? usedConcentrations(sheet, runs, {
          intercept: line.intercept.estimate ?? 0,
          slope: line.slope.estimate ?? 0,
        })
      : [];
  if (used.length === 0) return flags;
  return [
    ...flags.filter(({ code }) => !OF_STANDARDS.has(code)),
    ...linearRangeFlags(linearRange, used, "readings in the windows of the runs", partWithoutCurvature(line)),
  ];
}

/** Found at the standards; the same is asked of the readings instead. */
const OF_STANDARDS = new Set(["straightness-not-tested", "curvature-shown", "straightness-not-shown"]);

/** With concentrations times `factor`, so that whatever is said of the line is said in that unit. */
export function standardsInUnit(
  { standards, calibration }: Pick<Sheet, "standards" | "calibration">,
  factor: number,
): Pick<Sheet, "standards" | "calibration"> {
  const { rangeMolar } = calibration;
  return {
    standards: standards.map(
      (standard): SheetStandard => ({
        ...standard,
        concentration: {
          value: standard.concentration.value * factor,
          standardUncertainty: standard.concentration.standardUncertainty * factor,
        },
      }),
    ),
    calibration: {
      ...calibration,
      rangeMolar:
        rangeMolar === null ? null : { low: rangeMolar.low * factor, high: rangeMolar.high * factor },
    },
  };
}

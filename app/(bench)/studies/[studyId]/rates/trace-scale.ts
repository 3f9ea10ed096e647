import { timeToSeconds } from "kinetics-core/quantities";
import type { AxisView } from "@/app/_figures/figure-view";
import { rateScale } from "@/app/_worksheet/assemble";
import { concentrationDisplay, rateDisplay } from "@/app/_worksheet/display-units";
import { lawName } from "@/app/_worksheet/law-name";
import { followedSpecies } from "@/app/_worksheet/present-runs";
import type { Sheet } from "@/db/sheet/sheet.schema";

/**
 * How one study's traces are shown: as they were measured, on the trace's own clock. All plain numbers, so that the
 * browser can draw a preview with the same functions as the server.
 */
export interface TraceScale {
  readonly timeUnit: string;
  readonly secondsPerTime: number;
  readonly signal: AxisView;
  /** Shown signal per stored signal. */
  readonly signalFactor: number;
  /** Shown rate of reaction per stored slope (signal per second), signed; null while the set-up is incomplete. */
  readonly rateFactor: number | null;
  readonly rateUnit: string;
  /** Relative standard uncertainty that all rates share. */
  readonly sharedRelative: number;
}

export function traceScale(sheet: Sheet): TraceScale {
  const scale = rateScale(sheet);
  const rate = rateDisplay(sheet);
  const followed = followedSpecies(sheet);
  const { signal } = sheet;
  const concentration = concentrationDisplay(followed?.unit ?? "mol/L");
  return {
    timeUnit: sheet.study.timeUnit,
    secondsPerTime: timeToSeconds(1, sheet.study.timeUnit),
    signal:
      signal === null || signal.kind === "calibrated"
        ? { quantity: signal?.quantity ?? "signal", unit: signal?.unit ?? "" }
        : {
            quantity: followed === null ? "concentration" : `[${lawName(followed)}]`,
            unit: concentration.unit,
          },
    signalFactor: signal?.kind === "concentration" ? concentration.factor : 1,
    rateFactor: scale.status === "known" ? rate.factor / scale.signalPerExtent : null,
    rateUnit: rate.unit,
    sharedRelative: scale.status === "known" ? scale.sharedRelative : 0,
  };
}

import type { InitialRate, InitialRateOptions, StudyRule } from "kinetics-core/initial-rate";
import type { Sheet, SheetRun } from "@/db/sheet/sheet.schema";
import type { RunRate } from "./analysis";
import { rateScale, signalSpan } from "./assemble";

/**
 * One run's rate of reaction from the estimate on its signal. The options are the same whoever asks: the record
 * on the server and the preview in the browser call `estimateInitialRate` with what `rateOptions` returns.
 */

export function rateOptions(sheet: Sheet, run: SheetRun, rule: StudyRule | null): InitialRateOptions {
  const span = signalSpan(sheet, run);
  return {
    timeZero: run.timeZeroSeconds,
    ...(span === null ? {} : { signalSpan: span }),
    ...(run.window === null ? {} : { window: [run.window.fromSeconds, run.window.toSeconds] as const }),
    ...(rule === null || span === null ? {} : { rule }),
  };
}

/** v = slope/(perMolar·ν) in mol L⁻¹ s⁻¹, with the private part of its uncertainty. */
export function rateOfReaction(sheet: Sheet, run: SheetRun, estimate: InitialRate): RunRate {
  const scale = rateScale(sheet);
  if (scale.status === "unknown") return { kind: "none", reason: scale.reason };
  if (estimate.status !== "found") return { kind: "none", reason: estimate.message };
  return {
    kind: "estimated",
    molarPerSecond: estimate.slope / scale.signalPerExtent,
    standardError: estimate.standardError / Math.abs(scale.signalPerExtent),
    initialRate: estimate,
    byHand: run.window !== null,
  };
}

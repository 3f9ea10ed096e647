import type { Sheet, SheetRun, SignalModel } from "@/db/sheet/sheet.schema";
import { followedSpecies, lawSpecies } from "./present-runs";

/**
 * From the sheet to what the library takes. The signal is linear in the followed species, S = perMolar · c + S₀,
 * so that the rate of reaction v = (1/ν) dc/dt (IUPAC, 'rate of reaction') is (dS/dt)/(perMolar · ν). The factor's
 * uncertainty belongs to all runs together and never to one rate.
 */

export type RateScale =
  | {
      readonly status: "known";
      /** v = slope / signalPerExtent, in signal per (mol L⁻¹ of reaction); negative when the signal falls. */
      readonly signalPerExtent: number;
      /** Relative standard uncertainty shared by every rate: of ε·l. 0 where the signal is a concentration. */
      readonly sharedRelative: number;
    }
  /** `reason` says what the set-up still lacks. */
  | { readonly status: "unknown"; readonly reason: string };

export function rateScale(sheet: Sheet): RateScale {
  const followed = followedSpecies(sheet);
  if (followed === null)
    return { status: "unknown", reason: "The set-up does not yet say which species the signal follows." };
  if (followed.stoichiometricNumber === 0)
    return {
      status: "unknown",
      reason: `${followed.name} is followed but has the stoichiometric number 0. Follow a species that reacts or forms.`,
    };
  if (sheet.signal === null)
    return {
      status: "unknown",
      reason: "The set-up does not yet say how the signal turns into a concentration.",
    };
  const factor = signalPerMolar(sheet.signal);
  if (factor.value === 0)
    return {
      status: "unknown",
      reason: "The calibration factor is 0, so that no concentration follows from the signal.",
    };
  return {
    status: "known",
    signalPerExtent: factor.value * followed.stoichiometricNumber,
    sharedRelative: factor.standardUncertainty / Math.abs(factor.value),
  };
}

/** Signal per mol L⁻¹ of the followed species; exactly 1 where the signal is the concentration. */
export function signalPerMolar(signal: SignalModel): { value: number; standardUncertainty: number } {
  return signal.kind === "calibrated" ? signal.perMolar : { value: 1, standardUncertainty: 0 };
}

/**
 * Extent of reaction in mol L⁻¹ at which the run's limiting reactant is used up: the least c₀/|ν| over the
 * reactants whose starting concentration the sheet holds. Reactants without one (a solvent) are taken to be in
 * excess. Null where no reactant has a concentration.
 */
export function completeExtent(sheet: Sheet, run: SheetRun): number | null {
  let least: number | null = null;
  for (const species of lawSpecies(sheet)) {
    const molar = run.concentrations[species.id]?.molar;
    if (species.stoichiometricNumber >= 0 || molar === undefined || molar <= 0) continue;
    const extent = molar / -species.stoichiometricNumber;
    if (least === null || extent < least) least = extent;
  }
  return least;
}

/** Absolute change of the signal at complete conversion, or null where it cannot be known. */
export function signalSpan(sheet: Sheet, run: SheetRun): number | null {
  const scale = rateScale(sheet);
  const extent = completeExtent(sheet, run);
  return scale.status === "unknown" || extent === null ? null : Math.abs(scale.signalPerExtent) * extent;
}

import {
  type ConcentrationUnit,
  concentrationUnitText,
  molarTo,
  rateConstantUnit,
  rateUnit,
  secondsTo,
  timeToSeconds,
} from "kinetics-core/quantities";
import type { Sheet } from "@/db/sheet/sheet.schema";
import { followedSpecies } from "./present-runs";

/**
 * Units in which the pages show what is kept in mol L⁻¹ and s. A scale turns an internal number into the shown one
 * by a factor; its unit is plain text for typesetting ("µmol L^-1 s^-1").
 */
export interface DisplayScale {
  readonly unit: string;
  readonly factor: number;
}

/** Rates of reaction: the followed species' unit of concentration per the study's unit of time. */
export function rateDisplay(sheet: Sheet): DisplayScale {
  const concentration = followedSpecies(sheet)?.unit ?? "mol/L";
  return {
    unit: withMicro(rateUnit(concentration, sheet.study.timeUnit)),
    factor: molarTo(1, concentration) * timeToSeconds(1, sheet.study.timeUnit),
  };
}

export function concentrationDisplay(unit: Exclude<ConcentrationUnit, "mmHg">): DisplayScale {
  return { unit: withMicro(concentrationUnitText(unit)), factor: molarTo(1, unit) };
}

export function timeDisplay(sheet: Sheet): DisplayScale {
  return { unit: sheet.study.timeUnit, factor: secondsTo(1, sheet.study.timeUnit) };
}

/** k in mol L⁻¹ and the study's unit of time, for an overall order. */
export function rateConstantDisplay(sheet: Sheet, overallOrder: number): DisplayScale {
  return {
    unit: rateConstantUnit(overallOrder, "mol/L", sheet.study.timeUnit),
    factor: timeToSeconds(1, sheet.study.timeUnit),
  };
}

function withMicro(unit: string): string {
  return unit.replace("umol", "µmol");
}

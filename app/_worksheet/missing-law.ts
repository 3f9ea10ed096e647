import type { Sheet } from "@/db/sheet/sheet.schema";
import type { RunAnalysis } from "./analysis";
import { rateScale } from "./assemble";
import type { LawInTime } from "./fit-law";
import type { CarryingRun } from "./law-input";
import { lawName } from "./law-name";
import { followedSpecies, lawSpecies, presentRuns } from "./present-runs";
import { distinctLevels } from "./run-marks";

/** Why there is no law, in one sentence that says what is needed; null where nothing is missing. */
export function missingForLaw(
  sheet: Sheet,
  analysed: readonly RunAnalysis[],
  carrying: readonly CarryingRun[],
  result: LawInTime | null,
): string | null {
  const species = lawSpecies(sheet);
  if (species.length === 0) return "The set-up names no species whose order is wanted.";
  const runs = presentRuns(sheet);
  if (runs.length === 0)
    return "The run sheet is empty: runs at two or more levels of each species are needed.";
  const scale = rateScale(sheet);
  if (scale.status === "unknown" && runs.every((run) => run.enteredRate === null)) return scale.reason;
  if (carrying.length === 0) return missingForAnyRun(sheet, analysed);
  const wanted = species
    .filter((one) => (sheet.orders[one.id] ?? null) === null)
    .filter(
      (one) =>
        distinctLevels(
          carrying.map(({ run }) => run),
          one.id,
        ).length < 2,
    )
    .map(lawName);
  if (wanted.length > 0)
    return `${capital(list(wanted.map((name) => `two more levels of ${name}`)))} are needed, or ${
      wanted.length === 1 ? "its order" : "their orders"
    } held.`;
  if (result === null || result.status !== "fitted") return result?.message ?? "Runs with a rate are needed.";
  if (!result.separable)
    return result.undetermined.map((one) => one.message).join(" ") || "The orders cannot be separated.";
  return null;
}

/** Why not one run carries the law. */
function missingForAnyRun(sheet: Sheet, analysed: readonly RunAnalysis[]): string {
  const measured = analysed.filter(({ state, rate }) => state !== "set-aside" && rate.kind !== "none");
  if (measured.length === 0) return "No standing run has a rate: traces or entered rates are needed.";
  if (measured.some(({ rate }) => rate.kind !== "none" && rate.molarPerSecond > 0))
    return "No run with a rate has the starting concentration of every species of the law: enter them on Runs.";
  const followed = followedSpecies(sheet);
  const scale = rateScale(sheet);
  if (
    measured.every(({ rate }) => rate.kind === "entered") ||
    followed === null ||
    scale.status === "unknown"
  )
    return "No rate is above zero, and a law needs rates that are.";
  const course = scale.signalPerExtent > 0 ? "fall" : "rise";
  const fate = followed.stoichiometricNumber < 0 ? "is used up" : "forms";
  return `No rate is above zero: the signals ${course} or stand still, while ${followed.name} ${fate}. In Set-up, choose the species that the signal follows, or correct the sign of its factor.`;
}

/** "A", "A and B", "A, B and C". */
export function list(items: readonly string[]): string {
  const last = items.at(-1) ?? "";
  return items.length < 2 ? last : `${items.slice(0, -1).join(", ")} and ${last}`;
}

function capital(sentence: string): string {
  return sentence.charAt(0).toUpperCase() + sentence.slice(1);
}

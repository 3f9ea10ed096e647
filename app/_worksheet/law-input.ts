import type { RateLawInput, RateLawRun } from "kinetics-core/rate-law";
import type { Sheet, SheetRun, SheetSpecies } from "@/db/sheet/sheet.schema";
import type { RunRate } from "./analysis";
import { rateScale } from "./assemble";
import { lawName } from "./law-name";
import { sharedThroughStocks } from "./mixing/remixed";
import { lawSpecies } from "./present-runs";

/**
 * What `fitRateLaw` takes, from the sheet and its runs' rates. Concentrations in mol L⁻¹, rates of reaction in
 * mol L⁻¹ s⁻¹; species go by the symbol under which the law names them.
 */

/** Taken where the set-up names none: between the 50 and 100 kJ mol⁻¹ of most reactions in solution. */
export const ASSUMED_ACTIVATION_ENERGY = 80_000;

/** Molar gas constant in J mol⁻¹ K⁻¹, exact since 2019 (CODATA 2022). */
const GAS_CONSTANT = 8.31446261815324;

export function lawInput(sheet: Sheet, carrying: readonly CarryingRun[]): RateLawInput {
  const species = lawSpecies(sheet);
  const scale = rateScale(sheet);
  const estimated = carrying.filter((one) => one.rate.kind === "estimated").map((one) => one.run.label);
  const calibration =
    scale.status === "known" && scale.sharedRelative > 0 && estimated.length > 0
      ? [
          {
            species: [],
            onRate: true,
            relative: scale.sharedRelative,
            source: sharedSource(sheet),
            ...(estimated.length < carrying.length ? { runs: estimated } : {}),
          },
        ]
      : [];
  const temperatureRelative = temperatureTerm(sheet);
  return {
    species: species.map(lawName),
    runs: carrying.map((one) => lawRun(one, species)),
    shared: [
      ...calibration,
      ...sharedThroughStocks(
        sheet,
        carrying.map(({ run }) => run),
      ),
    ],
    orders: Object.fromEntries(species.map((one) => [lawName(one), sheet.orders[one.id] ?? "free"] as const)),
    concentrationUnit: "mol/L",
    timeUnit: "s",
    ...(temperatureRelative > 0 ? { temperatureRelative } : {}),
  };
}

/** A run that carries the law: standing, with a rate, every species of the law present. */
export interface CarryingRun {
  readonly run: SheetRun;
  readonly rate: Exclude<RunRate, { kind: "none" }>;
}

/** Relative standard uncertainty that the stated temperature brings to k: E_a·u_T/(R·T²). */
function temperatureTerm(sheet: Sheet): number {
  const temperature = sheet.conditions.temperatureKelvin;
  if (temperature === null) return 0;
  return temperatureEffect(activationEnergyOf(sheet), temperature.value, temperature.standardUncertainty);
}

/** J mol⁻¹: the study's own, else the assumed one. */
export function activationEnergyOf({ conditions }: Sheet): number {
  return conditions.activationEnergy?.value ?? ASSUMED_ACTIVATION_ENERGY;
}

/** Relative change of k for a small change of temperature, both in K, at an activation energy in J mol⁻¹. */
export function temperatureEffect(activationEnergy: number, kelvin: number, changeKelvin: number): number {
  return (activationEnergy * changeKelvin) / (GAS_CONSTANT * kelvin ** 2);
}

function lawRun({ run, rate }: CarryingRun, species: readonly SheetSpecies[]): RateLawRun {
  const present = species.map((one) => [lawName(one), run.concentrations[one.id]] as const);
  return {
    label: run.label,
    concentrations: Object.fromEntries(present.map(([name, amount]) => [name, amount?.molar ?? 0])),
    rate: rate.molarPerSecond,
    ...(rate.standardError === null ? {} : { rateStandardError: rate.standardError }),
    relativeUncertainty: Object.fromEntries(
      present.map(([name, amount]) => [name, amount?.relativeUncertainty ?? 0]),
    ),
    ...(run.block === null ? {} : { block: run.block }),
    ...(run.mixture === null ? {} : { mixture: run.mixture }),
  };
}

function sharedSource(sheet: Sheet): string {
  return sheet.signal?.kind === "calibrated" && sheet.signal.quantity.toLowerCase() === "absorbance"
    ? "ε·l"
    : "Calibration factor";
}

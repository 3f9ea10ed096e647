import type { Check } from "../analysis";
import { activationEnergyOf, temperatureEffect } from "../law-input";
import { percent, studyCheck } from "./check";
import type { Checked } from "./find-checks";

/** Spread of k from temperature that weakens: 1 % or half the scatter of the runs, whichever is more. */
const WEAKENING_SPREAD = 0.01;
/** Spread that blocks: beyond it the runs do not share one k. */
const BLOCKING_SPREAD = 0.1;

/**
 * Temperature spread between runs: E_a·s_T/(R·T²), with the study's own E_a, 80 kJ/mol where none is known. Runs that state no
 * temperature of their own are taken to have the study's.
 */
export function temperatureChecks({ sheet, carrying, law }: Checked): readonly Check[] {
  const study = sheet.conditions.temperatureKelvin?.value ?? null;
  const kelvins = carrying.flatMap(({ run }) => run.temperatureKelvin ?? study ?? []);
  if (kelvins.length < 2 || carrying.every(({ run }) => run.temperatureKelvin === null)) return [];
  const mean = kelvins.reduce((sum, value) => sum + value, 0) / kelvins.length;
  const variance = kelvins.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (kelvins.length - 1);
  const spread = Math.sqrt(variance);
  const energy = activationEnergyOf(sheet);
  const effect = temperatureEffect(energy, mean, spread);
  const fit = law.fit;
  const limit = Math.max(WEAKENING_SPREAD, (fit?.betweenRunStandardDeviation ?? 0) / 2);
  if (effect <= limit)
    return [
      studyCheck(
        "runs",
        "holds",
        "temperature-spread",
        `Temperatures of the runs spread by ${spread.toFixed(2)} K, which moves *k* by ${percent(effect)} at most expected.`,
      ),
    ];
  return [
    studyCheck(
      "runs",
      effect > BLOCKING_SPREAD ? "blocks" : "weakens",
      "temperature-spread",
      `Temperatures of the runs spread by ${spread.toFixed(2)} K. At ${energy / 1000} kJ mol^-1${sheet.conditions.activationEnergy === null ? ", assumed," : ""} that scatters *k* by ${percent(
        effect,
      )}. Set outlying runs aside or study the temperatures apart.`,
    ),
  ];
}

import type { Check } from "../analysis";
import type { CarryingRun } from "../law-input";
import { lawSpecies } from "../present-runs";
import { percent } from "./check";
import type { Checked } from "./find-checks";

/** 2.77 = 1.96·√2: two results of one recipe differ by more in one case of twenty. */
const REPEATABILITY = 2.77;

/** Concentrations that agree within this are one recipe. */
const SAME_RECIPE = 0.005;

/**
 * Repeats that disagree: |Δ ln v| > 2.77·√(ū² + τ̂²), ū² the mean of the pair's u²(ln v), τ̂ the scatter between
 * runs. Re-readings of one mixture are no repeats. One check per pair, at the later run.
 */
export function replicateChecks({ sheet, carrying, law }: Checked): readonly Check[] {
  const species = lawSpecies(sheet).map((one) => one.id);
  const between = law.fit?.betweenRunStandardDeviation ?? null;
  if (between === null) return [];
  const checks: Check[] = [];
  let pairs = 0;
  carrying.forEach((later, index) => {
    for (const earlier of carrying.slice(0, index)) {
      if (!sameRecipe(earlier, later, species) || sameMixture(earlier, later)) continue;
      pairs++;
      const difference = Math.abs(Math.log(later.rate.molarPerSecond / earlier.rate.molarPerSecond));
      const limit =
        REPEATABILITY * Math.sqrt((relativeSquare(earlier) + relativeSquare(later)) / 2 + between ** 2);
      if (difference <= limit) continue;
      checks.push({
        code: "replicate-pair",
        severity: "weakens",
        station: "runs",
        runId: later.run.id,
        message: `${later.run.label} repeats ${earlier.run.label}, but their rates differ by ${percent(
          Math.expm1(difference),
        )}, more than the ${percent(Math.expm1(limit))} expected. Look for what differed, or repeat the recipe once more.`,
        settled: null,
      });
    }
  });
  if (pairs > 0 && checks.length === 0)
    checks.push({
      code: "replicate-pair",
      severity: "holds",
      station: "runs",
      runId: null,
      message: pairs === 1 ? "The repeated recipe agrees." : `All ${pairs} pairs of repeats agree.`,
      settled: null,
    });
  return checks;
}

function sameRecipe(a: CarryingRun, b: CarryingRun, species: readonly string[]): boolean {
  return species.every((id) => {
    const one = a.run.concentrations[id]?.molar ?? 0;
    const other = b.run.concentrations[id]?.molar ?? 0;
    return Math.abs(one - other) <= SAME_RECIPE * Math.max(one, other);
  });
}

function sameMixture(a: CarryingRun, b: CarryingRun): boolean {
  return a.run.mixture !== null && a.run.mixture === b.run.mixture;
}

function relativeSquare({ rate }: CarryingRun): number {
  return ((rate.standardError ?? 0) / rate.molarPerSecond) ** 2;
}

import type { FittedLaw } from "kinetics-core/prediction";
import { type Flag, inARow } from "kinetics-core/quantities";
import type { Recipe } from "./feasible-set";

/** Beyond the studied range by more than pipetting. */
const BEYOND = 1.05;

/** What a plan does not know: it trusts the law where it was not studied, and one far run alone carries its term. */
export function cautionsOf(law: FittedLaw, recipes: readonly Recipe[]): readonly Flag[] {
  const beyond = Object.entries(law.studied).flatMap(([species, [low, high]]) =>
    recipes.some((recipe) => {
      const value = recipe[species];
      return value !== undefined && (value > high * BEYOND || value < low / BEYOND);
    })
      ? [species]
      : [],
  );
  if (beyond.length === 0) return [];
  return [
    {
      code: "plan-beyond-studied",
      severity: "note",
      message: `The plan takes ${inARow(beyond)} beyond the concentrations studied so far, where the law may be another. Repeat such a run once, and look at its residual before trusting the law there.`,
    },
  ];
}

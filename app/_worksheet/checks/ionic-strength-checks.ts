import { LARGEST_IONIC_STRENGTH, saltEffect } from "kinetics-core/ionic-strength";
import { mixRuns } from "kinetics-core/mixing";
import { printNumber } from "kinetics-core/quantities";
import { isMixed } from "@/db/sheet/mixed-run";
import type { Sheet } from "@/db/sheet/sheet.schema";
import type { Check } from "../analysis";
import { mixingInput } from "../mixing/mixing-input";
import { lawSpecies } from "../present-runs";
import { percent, studyCheck } from "./check";
import type { Checked } from "./find-checks";

/** Spread of k from ionic strength that weakens: 1 % or half the scatter of the runs, whichever is more. */
const WEAKENING_EFFECT = 0.01;
/** Strengths this close are one: no pipette does better. */
const SAME_STRENGTH = 0.01;
/** Taken where the set-up names no temperature; the constant of the law moves by 0.2 % a kelvin. */
const ROOM_TEMPERATURE = 298.15;

/**
 * Ionic strength between the runs that were mixed from stocks: 4.605·A·z_A·z_B·Δ[√I/(1 + √I)] for the two ions of the law
 * with the largest product of charges. Runs whose concentrations were typed have no ionic strength here.
 */
export function ionicStrengthChecks({ sheet, carrying, law }: Checked): readonly Check[] {
  const range = strengthRange(
    sheet,
    carrying.map(({ run }) => run),
  );
  if (range === null) return [];
  const { least, most } = range;
  const product = chargeProduct(sheet);
  const words = `Ionic strength of the runs goes from ${strength(least)} to ${strength(most)} mol L^-1`;
  if (most - least <= SAME_STRENGTH * most)
    return [found("holds", `Ionic strength is ${strength(most)} mol L^-1 in every mixture, within 1 %.`)];
  if (product === 0)
    return [
      found(
        "note",
        `${words}. One of the reactants carries no charge, so that *k* has no primary salt effect; the pH of a buffer still moves with it.`,
      ),
    ];
  const effect = saltEffect({
    chargeProduct: product,
    ionicStrength: { value: most, standardUncertainty: 0 },
    to: least,
    temperatureKelvin: sheet.conditions.temperatureKelvin?.value ?? ROOM_TEMPERATURE,
  });
  if (effect.status !== "known") return [found("note", `${words}. ${effect.message}`)];
  const moved = Math.expm1(Math.abs(effect.change));
  const beyond =
    most > LARGEST_IONIC_STRENGTH
      ? ` Above ${LARGEST_IONIC_STRENGTH} mol L^-1 that is an estimate, and no correction stands on it.`
      : "";
  const limit = Math.max(WEAKENING_EFFECT, (law.fit?.betweenRunStandardDeviation ?? 0) / 2);
  return moved <= limit
    ? [found("holds", `${words}, which moves *k* by ${percent(moved)} through the primary salt effect.`)]
    : [
        found(
          "weakens",
          `${words}, which moves *k* by ${percent(moved)} through the primary salt effect.${beyond} Level it with an inert salt in every mixture, or set the outlying runs aside.`,
        ),
      ];
}

function found(severity: Check["severity"], message: string): Check {
  return studyCheck("runs", severity, "ionic-strength-spread", message);
}

/** Least and greatest ionic strength of the mixtures, mol L⁻¹; null below two of them, or where there is none. */
function strengthRange(
  sheet: Sheet,
  runs: Sheet["runs"],
): { readonly least: number; readonly most: number } | null {
  const mixed = runs.filter(isMixed);
  if (mixed.length < 2) return null;
  const strengths = mixRuns(mixingInput(sheet, mixed)).runs.flatMap((row) =>
    row.status === "mixed" && row.ionicStrength !== null ? [row.ionicStrength.value] : [],
  );
  const most = Math.max(0, ...strengths);
  return strengths.length < 2 || most === 0 ? null : { least: Math.min(...strengths), most };
}

/** z_A·z_B of the two reactants or catalysts of the law whose product is largest in size; 0 where one is neutral. */
function chargeProduct(sheet: Sheet): number {
  const charges = lawSpecies(sheet)
    .filter(({ role }) => role === "reactant" || role === "catalyst")
    .map(({ charge }) => charge);
  let largest = 0;
  for (const [index, one] of charges.entries())
    for (const other of charges.slice(index + 1))
      if (Math.abs(one * other) > Math.abs(largest)) largest = one * other;
  return largest;
}

function strength(molar: number): string {
  return printNumber(molar, 3);
}

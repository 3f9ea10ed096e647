import type { SheetSpecies } from "@/db/sheet/sheet.schema";

/**
 * Trivial names of species that turn up in many studies, keyed by the text that `parseFormula` gives back. A first
 * suggestion only: the name is the person's to change.
 */
const NAMES: ReadonlyMap<string, string> = new Map([
  ["H2O", "water"],
  ["D2O", "heavy water"],
  ["H+", "hydrogen ion"],
  ["H3O+", "oxonium"],
  ["OH-", "hydroxide"],
  ["HO-", "hydroxide"],
  ["H2O2", "hydrogen peroxide"],
  ["HO2-", "hydroperoxide"],
  ["O2", "dioxygen"],
  ["H2", "dihydrogen"],
  ["N2", "dinitrogen"],
  ["CO2", "carbon dioxide"],
  ["HCO3-", "hydrogencarbonate"],
  ["CO3^2-", "carbonate"],
  ["Cl-", "chloride"],
  ["Br-", "bromide"],
  ["I-", "iodide"],
  ["F-", "fluoride"],
  ["Cl2", "dichlorine"],
  ["Br2", "dibromine"],
  ["I2", "diiodine"],
  ["I3-", "triiodide"],
  ["ClO-", "hypochlorite"],
  ["OCl-", "hypochlorite"],
  ["HOCl", "hypochlorous acid"],
  ["BrO3-", "bromate"],
  ["IO3-", "iodate"],
  ["ClO4-", "perchlorate"],
  ["MnO4-", "permanganate"],
  ["S2O8^2-", "peroxodisulfate"],
  ["S2O3^2-", "thiosulfate"],
  ["SO4^2-", "sulfate"],
  ["HSO4-", "hydrogensulfate"],
  ["SO3^2-", "sulfite"],
  ["NO3-", "nitrate"],
  ["NO2-", "nitrite"],
  ["NH3", "ammonia"],
  ["NH4+", "ammonium"],
  ["PO4^3-", "phosphate"],
  ["HPO4^2-", "hydrogenphosphate"],
  ["H2PO4-", "dihydrogenphosphate"],
  ["CN-", "cyanide"],
  ["SCN-", "thiocyanate"],
  ["CH3CO2-", "acetate"],
  ["CH3COO-", "acetate"],
  ["CH3CO2H", "acetic acid"],
  ["CH3COOH", "acetic acid"],
  ["CH3COCH3", "propanone"],
  ["Na+", "sodium"],
  ["K+", "potassium"],
  ["Fe^2+", "iron(II)"],
  ["Fe^3+", "iron(III)"],
  ["Cu^2+", "copper(II)"],
  ["Ce^4+", "cerium(IV)"],
  ["Ce^3+", "cerium(III)"],
  ["Mn^2+", "manganese(II)"],
  ["Cr^3+", "chromium(III)"],
  ["e-", "electron"],
]);

const SOLVENTS: ReadonlySet<string> = new Set(["H2O", "D2O", "water"]);

export function nameOf(formulaText: string): string {
  return NAMES.get(formulaText) ?? "";
}

/**
 * First guess of a species' role from its place in the reaction: on both sides to the same amount is a catalyst,
 * water is the solvent. `stoichiometricNumber` is net and signed.
 */
export function roleOf(text: string, stoichiometricNumber: number): SheetSpecies["role"] {
  if (SOLVENTS.has(text)) return "solvent";
  if (stoichiometricNumber < 0) return "reactant";
  return stoichiometricNumber > 0 ? "product" : "catalyst";
}

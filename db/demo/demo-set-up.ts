import { newIdentifier } from "../identifier";
import type { SheetSpecies } from "../sheet/sheet.schema";
import type { SetUp } from "../study/set-up.schema";
import { TRUTH } from "./alkaline-hydrolysis";

/** Set-up of the demo study. The calibration's uncertainty is 0.4 %, as a careful six-point line leaves it. */
export function demoSetUp(): SetUp & { readonly ester: string; readonly hydroxide: string } {
  const [ester, hydroxide, phenolate] = [newIdentifier(), newIdentifier(), newIdentifier()];
  const species: Omit<SheetSpecies, "position">[] = [
    {
      id: ester,
      symbol: "A",
      name: "4-nitrophenyl acetate",
      formula: "CH3CO2C6H4NO2",
      stoichiometricNumber: -1,
      charge: 0,
      role: "reactant",
      inLaw: true,
      unit: "umol/L",
    },
    {
      id: hydroxide,
      symbol: "B",
      name: "hydroxide",
      formula: "OH-",
      stoichiometricNumber: -2,
      charge: -1,
      role: "reactant",
      inLaw: true,
      unit: "mmol/L",
    },
    {
      id: phenolate,
      symbol: "P",
      name: "4-nitrophenolate",
      formula: "NO2C6H4O-",
      stoichiometricNumber: 1,
      charge: -1,
      role: "product",
      inLaw: false,
      unit: "umol/L",
    },
    bystander("acetate", "CH3CO2-", { stoichiometricNumber: 1, charge: -1, role: "product" }),
    bystander("water", "H2O", { stoichiometricNumber: 1, charge: 0, role: "solvent" }),
    bystander("potassium", "K+", { stoichiometricNumber: 0, charge: 1, role: "spectator" }),
    bystander("chloride", "Cl-", { stoichiometricNumber: 0, charge: -1, role: "spectator" }),
  ];
  return {
    ester,
    hydroxide,
    study: {
      name: "Alkaline hydrolysis of 4-nitrophenyl acetate",
      reaction: "CH3CO2C6H4NO2 [A] + 2 OH- [B] -> CH3CO2- + NO2C6H4O- [P] + H2O",
      timeUnit: "s",
      hazards: [
        "Potassium hydroxide, B: Strong alkali, corrosive. The stock above all, but the diluted runs too.",
        "Acetonitrile, in stock A: Flammable vapour, harmful.",
        "4-Nitrophenol, from P: Harmful; stains skin. Collect, do not pour away.",
        "Read the safety data sheet of each, follow your local rules, and work under competent supervision.",
      ].join("\n"),
    },
    species: species.map((one, position) => ({ ...one, position })),
    followedSpeciesId: phenolate,
    conditions: {
      temperatureKelvin: { value: 298.15, standardUncertainty: 0.1 },
      ionicStrengthMolar: { value: 0.1, standardUncertainty: 0.001 },
      pathLengthCentimetre: { value: 1, standardUncertainty: 0.002 },
      wavelengthNanometre: 400,
      solvent: "water, 1 % v/v acetonitrile",
      electrolyte: "KCl",
      activationEnergy: null,
      sampleIntervalSeconds: null,
    },
    signal: {
      kind: "calibrated",
      quantity: "Absorbance",
      unit: "",
      perMolar: { value: TRUTH.perMolar, standardUncertainty: 70 },
      blank: null,
    },
  };
}

function bystander(
  name: string,
  formula: string,
  rest: Pick<SheetSpecies, "stoichiometricNumber" | "charge" | "role">,
): Omit<SheetSpecies, "position"> {
  return { id: newIdentifier(), symbol: "", name, formula, inLaw: false, unit: "umol/L", ...rest };
}

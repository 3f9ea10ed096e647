import { SHEET_VERSION, type Sheet, type SheetRun } from "@/db/sheet/sheet.schema";
import { NO_PREPARATION, UNSAID_CONDITIONS, UNSAID_RUN, UNSAID_SIGNAL } from "@/db/sheet/unsaid";

/** Small sheets for tests: A + B → P followed by P's absorbance, invented recipes, no trace unless given. */

export function exampleSheet(change: Partial<Sheet> = {}): Sheet {
  const species = (
    id: string,
    stoichiometricNumber: number,
    inLaw: boolean,
    position: number,
  ): Sheet["species"][number] => ({
    id,
    symbol: inLaw ? id : "",
    name: `species ${id}`,
    formula: id,
    stoichiometricNumber,
    charge: 0,
    role: stoichiometricNumber < 0 ? "reactant" : "product",
    inLaw,
    unit: "mmol/L",
    position,
  });
  return {
    version: SHEET_VERSION,
    study: { name: "Example", invented: true, reaction: "A + B -> P", timeUnit: "s", hazards: "" },
    species: [species("A", -1, true, 0), species("B", -1, true, 1), species("P", 1, false, 2)],
    followedSpeciesId: "P",
    conditions: {
      temperatureKelvin: { value: 298.15, standardUncertainty: 0.1 },
      ionicStrengthMolar: null,
      pathLengthCentimetre: null,
      wavelengthNanometre: null,
      solvent: "water",
      electrolyte: "",
      ...UNSAID_CONDITIONS,
    },
    signal: {
      kind: "calibrated",
      quantity: "absorbance",
      unit: "",
      perMolar: { value: 18_000, standardUncertainty: 180 },
      ...UNSAID_SIGNAL,
    },
    orders: {},
    ...NO_PREPARATION,
    runs: [],
    uploads: [],
    ...change,
  };
}

/** A run with concentrations in mol L⁻¹ by species id and, if given, an entered rate in mol L⁻¹ s⁻¹. */
export function exampleRun(
  position: number,
  molar: Readonly<Record<string, number>>,
  change: Partial<SheetRun> = {},
): SheetRun {
  return {
    id: `run-${position}`,
    label: `R${String(position + 1).padStart(2, "0")}`,
    position,
    concentrations: Object.fromEntries(
      Object.entries(molar).map(([id, value]) => [id, { molar: value, relativeUncertainty: 0.01 }]),
    ),
    temperatureKelvin: null,
    block: null,
    mixture: null,
    trace: null,
    enteredRate: null,
    timeZeroSeconds: 0,
    ...UNSAID_RUN,
    window: null,
    setAside: null,
    remark: "",
    changedIn: 0,
    removedIn: null,
    ...change,
  };
}

import type { Kysely } from "kysely";
import type { Database } from "../database";
import type { Actor } from "../member/actor";
import type { SheetRun, SheetSpecies } from "../sheet/sheet.schema";
import { UNSAID_RUN } from "../sheet/unsaid";
import { createStudy } from "../study/create-study";
import type { SetUp } from "../study/set-up.schema";

/** A → P with A and a catalyst C in the law, followed by absorbance of P. */
export function exampleSetUp(name = "An example study"): SetUp {
  return {
    study: { name, reaction: "A -> P", timeUnit: "s", hazards: "" },
    species: [
      exampleSpecies("a", {
        symbol: "A",
        stoichiometricNumber: -1,
        role: "reactant",
        inLaw: true,
        position: 0,
      }),
      exampleSpecies("c", {
        symbol: "C",
        stoichiometricNumber: 0,
        role: "catalyst",
        inLaw: true,
        position: 1,
      }),
      exampleSpecies("p", {
        symbol: "P",
        stoichiometricNumber: 1,
        role: "product",
        inLaw: false,
        position: 2,
      }),
    ],
    followedSpeciesId: "p",
    conditions: {
      temperatureKelvin: { value: 298.15, standardUncertainty: 0.1 },
      ionicStrengthMolar: null,
      pathLengthCentimetre: null,
      wavelengthNanometre: 400,
      solvent: "water",
      electrolyte: "",
      activationEnergy: null,
      sampleIntervalSeconds: null,
    },
    signal: {
      kind: "calibrated",
      quantity: "Absorbance",
      unit: "",
      perMolar: { value: 10_000, standardUncertainty: 50 },
      blank: null,
    },
  };
}

function exampleSpecies(id: string, rest: Partial<SheetSpecies>): SheetSpecies {
  return {
    id,
    symbol: "",
    name: id,
    formula: "",
    stoichiometricNumber: 0,
    charge: 0,
    role: "spectator",
    inLaw: false,
    unit: "mmol/L",
    position: 0,
    ...rest,
  };
}

/** A run with an entered rate and concentrations of A and C. */
export function exampleRun(label: string, rest: Partial<SheetRun> = {}): SheetRun {
  return {
    id: `run-${label}`,
    label,
    position: 0,
    concentrations: {
      a: { molar: 0.001, relativeUncertainty: 0.005 },
      c: { molar: 0.01, relativeUncertainty: 0.005 },
    },
    temperatureKelvin: null,
    block: null,
    mixture: null,
    trace: null,
    enteredRate: { molarPerSecond: 1e-6, standardError: null },
    timeZeroSeconds: 0,
    ...UNSAID_RUN,
    window: null,
    setAside: null,
    remark: "",
    changedIn: 0,
    removedIn: null,
    ...rest,
  };
}

/** Creates a study of the actor's group and gives its id. */
export async function makeStudy(
  db: Kysely<Database>,
  actor: Actor,
  setUp: SetUp = exampleSetUp(),
): Promise<string> {
  const made = await createStudy(db, actor, setUp);
  if (made.status !== "created") throw new Error(`the study was not created: ${made.status}`);
  return made.studyId;
}

import type { ReadSpecies } from "@/app/_worksheet/reaction/reaction-species";
import { typedNumber, typedUncertain } from "@/app/_worksheet/typed-number/print-typed";
import type { Sheet } from "@/db/sheet/sheet.schema";
import type { SetUpForm, SpeciesForm } from "./set-up-form.schema";

/** What a new study starts from. */
export const emptySetUpForm: SetUpForm = {
  name: "",
  reaction: "",
  timeUnit: "s",
  hazards: "",
  species: [],
  temperature: "25.0 ± 0.1",
  ionicStrength: "",
  pathLength: "",
  wavelength: "",
  activationEnergy: "",
  sampleInterval: "",
  solvent: "water",
  electrolyte: "",
  signal: {
    kind: "calibrated",
    concentrationUnit: "mmol/L",
    quantity: "Absorbance",
    unit: "",
    perMolar: "",
    blank: "",
  },
};

const ZERO_CELSIUS = 273.15;
const JOULES_PER_KILOJOULE = 1000;

/** A study's set-up put back into boxes, at full precision. */
export function setUpFormOf(sheet: Sheet): SetUpForm {
  const { conditions, signal } = sheet;
  const { temperatureKelvin } = conditions;
  return {
    name: sheet.study.name,
    reaction: sheet.study.reaction,
    timeUnit: sheet.study.timeUnit,
    hazards: sheet.study.hazards,
    species: sheet.species
      .toSorted((a, b) => a.position - b.position)
      .map(({ position: _, ...species }) => ({
        ...species,
        followed: species.id === sheet.followedSpeciesId,
      })),
    temperature:
      temperatureKelvin === null
        ? ""
        : typedUncertain({ ...temperatureKelvin, value: temperatureKelvin.value - ZERO_CELSIUS }),
    ionicStrength:
      conditions.ionicStrengthMolar === null ? "" : typedUncertain(conditions.ionicStrengthMolar),
    pathLength:
      conditions.pathLengthCentimetre === null ? "" : typedUncertain(conditions.pathLengthCentimetre),
    wavelength: conditions.wavelengthNanometre === null ? "" : typedNumber(conditions.wavelengthNanometre),
    activationEnergy:
      conditions.activationEnergy === null
        ? ""
        : typedUncertain({
            value: conditions.activationEnergy.value / JOULES_PER_KILOJOULE,
            standardUncertainty: conditions.activationEnergy.standardUncertainty / JOULES_PER_KILOJOULE,
          }),
    sampleInterval:
      conditions.sampleIntervalSeconds === null ? "" : typedNumber(conditions.sampleIntervalSeconds),
    solvent: conditions.solvent,
    electrolyte: conditions.electrolyte,
    signal: {
      ...emptySetUpForm.signal,
      kind: signal?.kind ?? "none",
      ...(signal?.kind === "concentration" ? { concentrationUnit: signal.unit } : {}),
      ...(signal?.kind === "calibrated"
        ? {
            quantity: signal.quantity,
            unit: signal.unit,
            perMolar: typedUncertain(signal.perMolar),
            blank: signal.blank === null ? "" : typedUncertain(signal.blank),
          }
        : {}),
    },
  };
}

/**
 * The species table after the reaction was read anew. Rows keep what was set by hand; where nothing is followed yet,
 * a product with a symbol is, for it was given one to be spoken of.
 */
export function speciesAfterReaction(
  rows: readonly SpeciesForm[],
  read: readonly ReadSpecies[],
): SpeciesForm[] {
  const free = new Set(rows);
  const take = (matches: (row: SpeciesForm) => boolean): SpeciesForm | undefined => {
    const found = [...free].find(matches);
    if (found) free.delete(found);
    return found;
  };
  const bySpelling = read.map((species) => take((row) => species.key === (row.formula || row.name)));
  const matched = read.map(
    (species, index) =>
      bySpelling[index] ?? (species.symbol === "" ? undefined : take((row) => row.symbol === species.symbol)),
  );
  const merged = read.map((species, index) => mergedRow(matched[index], species));
  // What the reaction no longer names stays, since runs may hold concentrations of it; a row never kept goes.
  const left = rows
    .filter((row) => free.has(row) && (row.id !== "" || row.stoichiometricNumber === 0))
    .map(
      (row): SpeciesForm => ({
        ...row,
        stoichiometricNumber: 0,
        role: row.stoichiometricNumber === 0 ? row.role : "spectator",
        followed: false,
      }),
    );
  return withFollowed([...merged, ...left]);
}

function mergedRow(row: SpeciesForm | undefined, species: ReadSpecies): SpeciesForm {
  const { key: _, ...told } = species;
  if (row === undefined) {
    const inLaw = species.role === "reactant" || species.role === "catalyst";
    return { id: "", ...told, inLaw, unit: "mmol/L", followed: false };
  }
  const sameSide = Math.sign(row.stoichiometricNumber) === Math.sign(species.stoichiometricNumber);
  return {
    ...row,
    symbol: species.symbol || row.symbol,
    name: row.name || species.name,
    formula: species.formula,
    stoichiometricNumber: species.stoichiometricNumber,
    charge: species.charge,
    role: sameSide ? row.role : species.role,
    followed: row.followed && species.stoichiometricNumber !== 0,
  };
}

function withFollowed(rows: SpeciesForm[]): SpeciesForm[] {
  if (rows.some((row) => row.followed)) return rows;
  const guess =
    rows.find((row) => row.stoichiometricNumber > 0 && row.symbol !== "") ??
    rows.find((row) => row.stoichiometricNumber < 0);
  return rows.map((row) => ({ ...row, followed: row === guess }));
}

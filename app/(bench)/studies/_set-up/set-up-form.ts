import { z } from "zod";
import type { ReadSpecies } from "@/app/_worksheet/reaction/reaction-species";
import { typedNumber, typedUncertain } from "@/app/_worksheet/typed-number/print-typed";
import { concentrationUnit, type Sheet, speciesRole, timeUnit } from "@/db/sheet/sheet.schema";

/**
 * The set-up as it stands in boxes: texts as typed, read into the sheet's units only when it is kept. New study and
 * Set-up share it. Limits of length are those of the sheet; what the texts mean is decided by `readSetUpForm`.
 */
export const speciesForm = z.object({
  /** Empty for a row that is new. */
  id: z.string().max(64),
  symbol: z.string().max(12, "A symbol has at most 12 characters."),
  name: z.string().max(120, "A name has at most 120 characters."),
  formula: z.string().max(120, "A formula has at most 120 characters."),
  stoichiometricNumber: z.number().min(-99).max(99),
  charge: z.number().int().min(-9).max(9),
  role: speciesRole,
  inLaw: z.boolean(),
  unit: concentrationUnit,
  followed: z.boolean(),
});

export const signalForm = z.object({
  kind: z.enum(["none", "concentration", "calibrated"]),
  concentrationUnit,
  quantity: z.string().max(60, "The quantity has at most 60 characters."),
  unit: z.string().max(20, "The unit has at most 20 characters."),
  perMolar: z.string().max(80),
});

export const setUpForm = z.object({
  name: z.string().max(160, "A name has at most 160 characters."),
  reaction: z.string().max(400, "A reaction has at most 400 characters."),
  timeUnit,
  hazards: z.string().max(4000, "Cautions have at most 4000 characters."),
  species: z.array(speciesForm).max(24, "A study holds at most 24 species."),
  temperature: z.string().max(80),
  ionicStrength: z.string().max(80),
  pathLength: z.string().max(80),
  wavelength: z.string().max(80),
  solvent: z.string().max(200, "The solvent has at most 200 characters."),
  electrolyte: z.string().max(120, "The electrolyte has at most 120 characters."),
  signal: signalForm,
});

export type SetUpForm = z.infer<typeof setUpForm>;
export type SpeciesForm = z.infer<typeof speciesForm>;

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
  solvent: "water",
  electrolyte: "",
  signal: { kind: "calibrated", concentrationUnit: "mmol/L", quantity: "Absorbance", unit: "", perMolar: "" },
};

const ZERO_CELSIUS = 273.15;

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
    solvent: conditions.solvent,
    electrolyte: conditions.electrolyte,
    signal: {
      ...emptySetUpForm.signal,
      kind: signal?.kind ?? "none",
      ...(signal?.kind === "concentration" ? { concentrationUnit: signal.unit } : {}),
      ...(signal?.kind === "calibrated"
        ? { quantity: signal.quantity, unit: signal.unit, perMolar: typedUncertain(signal.perMolar) }
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

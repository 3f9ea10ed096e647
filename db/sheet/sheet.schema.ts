import { z } from "zod";
import { RUNS_PER_STUDY, SPECIES_PER_STUDY } from "../limits";

/**
 * The sheet: everything of a study but trace bytes, which it names by SHA-256. One shape with seven uses: the
 * input of the analysis, the revision, the comparison, undo, the frozen link, the sign-off and the data package.
 * Internal units only: mol L⁻¹, s, K. What a person typed in another unit was converted at the door.
 */
export const SHEET_VERSION = 1;

const identifier = z.string().min(1).max(64);
const sha256 = z.string().regex(/^[0-9a-f]{64}$/);
const amount = z.number().nonnegative();

export const uncertain = z.object({ value: z.number(), standardUncertainty: z.number().nonnegative() });

export const concentrationUnit = z.enum(["mol/L", "mmol/L", "umol/L"]);
export const timeUnit = z.enum(["s", "min", "h"]);

export const speciesRole = z.enum(["reactant", "product", "catalyst", "inhibitor", "spectator", "solvent"]);

export const sheetSpecies = z.object({
  id: identifier,
  /** As it stands in the law, "A"; empty for species that the law never names. */
  symbol: z.string().max(12),
  name: z.string().max(120),
  formula: z.string().max(120),
  /** Signed: negative for reactants, 0 for species that the reaction leaves alone. */
  stoichiometricNumber: z.number().min(-99).max(99),
  charge: z.number().int().min(-9).max(9),
  role: speciesRole,
  /** Its starting concentration is a column of the run sheet and its order a parameter of the law. */
  inLaw: z.boolean(),
  /** Unit in which its concentrations are shown. */
  unit: concentrationUnit,
  position: z.number().int().nonnegative(),
});

export const signalModel = z.discriminatedUnion("kind", [
  /** The signal is the followed species' concentration already, in mol L⁻¹ once imported from `unit`. */
  z.object({ kind: z.literal("concentration"), unit: concentrationUnit }),
  /** Any signal linear in the followed species: signal = perMolar · c + baseline; for absorbance perMolar is ε·l. */
  z.object({
    kind: z.literal("calibrated"),
    quantity: z.string().min(1).max(60),
    unit: z.string().max(20),
    perMolar: uncertain,
  }),
]);

export const conditions = z.object({
  temperatureKelvin: uncertain.nullable(),
  ionicStrengthMolar: uncertain.nullable(),
  pathLengthCentimetre: uncertain.nullable(),
  wavelengthNanometre: z.number().positive().nullable(),
  solvent: z.string().max(200),
  electrolyte: z.string().max(120),
});

export const sheetRun = z.object({
  id: identifier,
  label: z.string().min(1).max(40),
  position: z.number().int().nonnegative(),
  /** By species id, for species of the law. `relativeUncertainty` is the private (pipetting) part. */
  concentrations: z.record(
    identifier,
    z.object({ molar: amount, relativeUncertainty: z.number().min(0).max(1) }),
  ),
  temperatureKelvin: z.number().positive().nullable(),
  block: z.string().max(60).nullable(),
  mixture: z.string().max(60).nullable(),
  trace: z
    .object({
      /** Of the stored points (Float64 little-endian time,signal pairs before compression). */
      sha256,
      points: z.number().int().positive(),
      uploadId: identifier.nullable(),
      column: z.string().max(120),
    })
    .nullable(),
  /** A rate typed in by hand, in mol L⁻¹ s⁻¹ of reaction; stands in for a trace. */
  enteredRate: z.object({ molarPerSecond: z.number(), standardError: amount.nullable() }).nullable(),
  timeZeroSeconds: z.number(),
  /** Set by hand for this run; null follows the study's rule. In the trace's clock. */
  window: z.object({ fromSeconds: z.number(), toSeconds: z.number() }).nullable(),
  setAside: z.object({ reason: z.string().min(1).max(300), memberId: identifier, at: z.string() }).nullable(),
  remark: z.string().max(300),
  /** Revision that last changed this row, and the one that put it into the bin. */
  changedIn: z.number().int().nonnegative(),
  removedIn: z.number().int().positive().nullable(),
});

/** A raw file as it came: the bytes are a blob of the same SHA-256, kept whatever becomes of the runs. */
export const sheetUpload = z.object({
  id: identifier,
  sha256,
  fileName: z.string().max(255),
  size: z.number().int().nonnegative(),
  at: z.string(),
  memberId: identifier,
  /** How the file was read, in words, for the audit trail: separator, decimal mark, columns. */
  reading: z.string().max(2000),
});

export const sheet = z.object({
  version: z.literal(SHEET_VERSION),
  study: z.object({
    name: z.string().min(1).max(160),
    /** Made for demonstration: every page that shows it says so. */
    invented: z.boolean(),
    reaction: z.string().max(400),
    timeUnit,
    hazards: z.string().max(4000),
  }),
  species: z.array(sheetSpecies).max(SPECIES_PER_STUDY),
  followedSpeciesId: identifier.nullable(),
  conditions,
  signal: signalModel.nullable(),
  /** Order of each species of the law: null is free, a number is held. A species not listed is free. */
  orders: z.record(identifier, z.number().min(-4).max(6).nullable()),
  runs: z.array(sheetRun).max(RUNS_PER_STUDY),
  uploads: z.array(sheetUpload).max(RUNS_PER_STUDY),
});

export type Sheet = z.infer<typeof sheet>;
export type SheetSpecies = z.infer<typeof sheetSpecies>;
export type SheetRun = z.infer<typeof sheetRun>;
export type SheetUpload = z.infer<typeof sheetUpload>;
export type SignalModel = z.infer<typeof signalModel>;
export type Conditions = z.infer<typeof conditions>;
export type ConcentrationUnit = z.infer<typeof concentrationUnit>;
export type TimeUnit = z.infer<typeof timeUnit>;

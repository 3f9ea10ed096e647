import { z } from "zod";
import {
  RUNS_PER_STUDY,
  SCANS_PER_STUDY,
  SPECIES_PER_STUDY,
  STANDARDS_PER_STUDY,
  STOCKS_PER_STUDY,
} from "../limits";

/**
 * The sheet: everything of a study but trace bytes, which it names by SHA-256. One shape with seven uses: the
 * input of the analysis, the revision, the comparison, undo, the frozen link, the sign-off and the data package.
 * Internal units only: mol L⁻¹, s, K. What a person typed in another unit was converted at the door.
 */
export const SHEET_VERSION = 2;

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

/** The signal is the followed species' concentration already, in mol L⁻¹ once imported from `unit`. */
export const concentrationSignal = z.object({ kind: z.literal("concentration"), unit: concentrationUnit });

/** Any signal linear in the followed species: signal = perMolar · c + blank; for absorbance perMolar is ε·l. */
export const linearSignal = z.object({
  kind: z.literal("calibrated"),
  quantity: z.string().min(1).max(60),
  unit: z.string().max(20),
  perMolar: uncertain,
});

export const signalModel = z.discriminatedUnion("kind", [
  concentrationSignal,
  linearSignal.extend({
    /** Signal of the mixture without the followed species; null where nobody measured it. */
    blank: uncertain.nullable(),
    /** Where `perMolar` comes from: typed in, or the slope of the standards' line, which then keeps it up to date. */
    source: z.enum(["typed", "standards"]),
  }),
]);

export const conditions = z.object({
  temperatureKelvin: uncertain.nullable(),
  ionicStrengthMolar: uncertain.nullable(),
  pathLengthCentimetre: uncertain.nullable(),
  wavelengthNanometre: z.number().positive().nullable(),
  solvent: z.string().max(200),
  electrolyte: z.string().max(120),
  /** J mol⁻¹: what temperature does to k; null where it is not known and a usual value is assumed. */
  activationEnergy: uncertain.nullable(),
  /** k is referred to this ionic strength by the primary salt effect; null leaves it as measured. */
  referenceIonicStrengthMolar: z.number().positive().nullable(),
  /** Time between readings, for the bench sheet. */
  sampleIntervalSeconds: z.number().positive().nullable(),
});

/**
 * A bottle that volumes are taken from: solutes in a medium, or the medium alone. A dilution is made from another stock,
 * whose error it shares; its contents then follow from that stock and are not written here.
 */
export const sheetStock = z.object({
  id: identifier,
  /** Head of its column on the mixing table, "A"; empty for a medium, which goes by its name. */
  symbol: z.string().max(12),
  name: z.string().min(1).max(160),
  position: z.number().int().nonnegative(),
  /** By species id, mol L⁻¹. */
  contents: z.record(
    identifier,
    z.object({ value: z.number().positive(), standardUncertainty: z.number().nonnegative() }),
  ),
  dilution: z
    .object({
      fromStockId: identifier,
      takenMicrolitre: z.object({
        value: z.number().positive(),
        standardUncertainty: z.number().nonnegative(),
      }),
      markMicrolitre: z.object({
        value: z.number().positive(),
        standardUncertainty: z.number().nonnegative(),
      }),
    })
    .nullable(),
  lot: z.string().max(60),
  madeOn: z.string().max(40),
  howKnown: z.string().max(120),
});

/** How volumes are dispensed, for all runs of the study. */
export const mixing = z.object({
  volumeUnit: z.enum(["uL", "mL"]),
  /** Volume that a mixture is made up to; null: its volume is the sum of what went in. */
  markMicrolitre: z.number().positive().nullable(),
  /** Standard uncertainty of one delivery, by its size: the first entry that is large enough, the last without end. */
  deliveries: z
    .array(
      z.object({
        upToMicrolitre: z.number().positive().nullable(),
        absoluteMicrolitre: amount,
        relative: z.number().min(0).max(1),
      }),
    )
    .max(6),
});

const setAsideBy = z.object({ reason: z.string().min(1).max(300), memberId: identifier, at: z.string() });

/** A level of the calibration line, with its replicate readings. */
export const sheetStandard = z.object({
  id: identifier,
  label: z.string().min(1).max(40),
  position: z.number().int().nonnegative(),
  /** Private part of the uncertainty: what the common stock brings is in the settings. */
  concentration: z.object({ value: amount, standardUncertainty: amount }),
  signals: z.array(z.number()).max(40),
  /** A blank is read with the others and is not in the line. */
  isBlank: z.boolean(),
  setAside: setAsideBy.nullable(),
  remark: z.string().max(300),
});

export const calibrationSettings = z.object({
  /** What the standards contain; null until somebody says. */
  speciesId: identifier.nullable(),
  intercept: z.enum(["fitted", "none"]),
  /** All readings scatter alike, or in proportion to their signal (weights 1/S²). */
  weighting: z.enum(["none", "proportional"]),
  /** Part of the line that is used, mol L⁻¹; null: all standards that are not set aside. */
  rangeMolar: z.object({ low: amount, high: amount }).nullable(),
  /** Relative standard uncertainty of the stock that all standards were made from. */
  stockRelative: z.number().min(0).max(1),
});

/** Signal against wavelength; its points are stored like those of a trace, wavelength in nm in place of time. */
export const sheetScan = z.object({
  id: identifier,
  label: z.string().min(1).max(60),
  position: z.number().int().nonnegative(),
  speciesId: identifier.nullable(),
  molar: amount.nullable(),
  points: z.object({
    sha256,
    points: z.number().int().positive(),
    uploadId: identifier.nullable(),
    column: z.string().max(120),
  }),
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
  /** Volumes by stock id, µL. Where there are any, `concentrations` follow from them (app/_worksheet/mixing). */
  volumes: z.record(identifier, amount),
  /** Volume that this run is made up to; null: the study's. */
  markMicrolitre: z.number().positive().nullable(),
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
  /** From mixing to the first reading that counts; earlier readings are drawn and not fitted. */
  deadTimeSeconds: amount,
  /** Part of the trace that is fitted, in its own clock; null: all of it. Points outside are kept. */
  trim: z.object({ fromSeconds: z.number(), toSeconds: z.number() }).nullable(),
  /** Readings marked as spikes, by their place in the trace from 0, rising: drawn, never fitted, never deleted. */
  spikes: z.array(z.number().int().nonnegative()).max(500),
  /** Signal when the reaction is over, measured or worked out; null where nobody knows it. */
  endSignal: uncertain.nullable(),
  /** Set by hand for this run; null follows the study's rule. In the trace's clock. */
  window: z.object({ fromSeconds: z.number(), toSeconds: z.number() }).nullable(),
  setAside: setAsideBy.nullable(),
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
  stocks: z.array(sheetStock).max(STOCKS_PER_STUDY),
  mixing,
  standards: z.array(sheetStandard).max(STANDARDS_PER_STUDY),
  calibration: calibrationSettings,
  scans: z.array(sheetScan).max(SCANS_PER_STUDY),
  runs: z.array(sheetRun).max(RUNS_PER_STUDY),
  uploads: z.array(sheetUpload).max(RUNS_PER_STUDY),
});

export type Sheet = z.infer<typeof sheet>;
export type SheetSpecies = z.infer<typeof sheetSpecies>;
export type SheetRun = z.infer<typeof sheetRun>;
export type SheetStock = z.infer<typeof sheetStock>;
export type Mixing = z.infer<typeof mixing>;
export type SheetStandard = z.infer<typeof sheetStandard>;
export type CalibrationSettings = z.infer<typeof calibrationSettings>;
export type SheetScan = z.infer<typeof sheetScan>;
export type SheetUpload = z.infer<typeof sheetUpload>;
export type SignalModel = z.infer<typeof signalModel>;
export type Conditions = z.infer<typeof conditions>;
export type ConcentrationUnit = z.infer<typeof concentrationUnit>;
export type TimeUnit = z.infer<typeof timeUnit>;

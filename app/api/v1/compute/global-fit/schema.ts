import { z } from "zod";
import { estimate, flag, level, measured, rateConstant, reading } from "../estimate.schema";

/** The names that every object of the language carries, such as "constructor", would be found where nothing was given. */
const speciesName = z
  .string()
  .min(1)
  .max(80)
  .refine((name) => !(name in Object.prototype), { error: "cannot be used as a name; write another" });

/** Readings of one run and runs of one call; more belongs in a study, which keeps them and fits them once. */
const MAX_POINTS = 50_000;
const MAX_RUNS = 500;

const uncertain = z.object({ value: measured, standardUncertainty: measured.nonnegative() });

const endSignal = z.union(
  [
    reading,
    z.object({
      kind: z.literal("known").optional(),
      value: reading,
      standardUncertainty: measured.nonnegative().nullable(),
    }),
    z.object({ kind: z.enum(["zero", "free"]) }),
  ],
  {
    error:
      "must be a number, an object with value and standardUncertainty (0 or more, or null), or one with the kind “zero” or “free”",
  },
);

export const globalFitRequest = z
  .object({
    species: z
      .array(
        z.object({
          name: speciesName,
          stoichiometricNumber: z.number().min(-20).max(20).meta({
            description: "Negative for a reactant, positive for a product, 0 for what is not used up.",
          }),
        }),
      )
      .min(1)
      .max(12),
    followed: speciesName.meta({ description: "The species that the signal follows." }),
    signalPerConcentration: uncertain
      .refine((factor) => factor.value !== 0, { message: "must not be zero", path: ["value"] })
      .meta({ description: "ε·l, shared by all runs: one observation. An uncertainty of 0 holds it." }),
    scaleDeviation: z.number().min(0).max(1).optional().meta({
      description: "Relative standard deviation of a run's own departure from ε·l; absent: runs share it.",
    }),
    runs: z
      .array(
        z.object({
          label: z.string().min(1).max(80),
          concentrations: z.record(speciesName, measured.nonnegative()),
          time: z.array(reading.nonnegative()).max(MAX_POINTS).meta({
            description: "Since mixing, strictly increasing.",
          }),
          signal: z.array(reading).max(MAX_POINTS).meta({ description: "Same length as `time`." }),
          endSignal: endSignal.optional().meta({
            description:
              "Signal after the reaction as one more observation; a bare number, and an uncertainty of null, is as good as one reading. The kinds are those of the integrated laws: `known`, `zero` (exactly 0) and `free`, which an absent field also stands for.",
          }),
          timeZero: z
            .object({ value: reading, standardUncertainty: measured.nonnegative() })
            .optional()
            .meta({ description: "Time of mixing on the clock of `time`, where it is not exactly 0." }),
        }),
      )
      .min(1)
      .max(MAX_RUNS),
    orders: z.record(speciesName, z.union([z.literal("free"), z.number().min(-6).max(6)])).meta({
      description: "`free`, or the value at which an order is held. A species that is not named has none.",
    }),
    concentrationUnit: z.enum(["mol/L", "mmol/L", "umol/L", "mmHg"]).default("mol/L"),
    timeUnit: z.enum(["s", "min", "h"]).default("s"),
    level: level.optional(),
  })
  .meta({ id: "GlobalFitRequest" });

const orders = z.record(z.string(), estimate);

export const globalFitResponse = z
  .object({
    orders: orders.meta({ description: "With scatter of ln k between runs in the model; t intervals." }),
    rateConstant,
    logRateConstant: estimate.meta({ description: "Natural logarithm of k in the given units." }),
    betweenRunStandardDeviation: z.number().nullable().meta({ description: "τ, of ln k between runs." }),
    degreesOfFreedom: z.number(),
    parameterNames: z.array(z.string()),
    covariance: z.array(z.array(z.number())).nullable().meta({
      description: "Of the parameters in `parameterNames`. Null where there is no uncertainty.",
    }),
    signalPerConcentration: estimate,
    clusterRobust: z
      .object({ orders, logRateConstant: estimate })
      .meta({ description: "The same estimates with CR2 standard errors and Bell and McCaffrey's freedom." }),
    pooled: z
      .object({ orders, logRateConstant: estimate })
      .meta({ description: "Without run scatter, every reading independent: for comparison." }),
    runs: z.array(
      z.object({
        label: z.string(),
        logRateConstant: estimate.meta({ description: "Of this run alone, at the shared orders." }),
        offset: z
          .number()
          .nullable()
          .meta({ description: "Signal where the followed species has none left." }),
        residualStandardDeviation: z.number().nullable(),
        autocorrelation: z.number(),
      }),
    ),
    residualStandardDeviation: z.number().nullable(),
    iterations: z.number().int().meta({ description: "Passes over all readings." }),
    flags: z.array(flag),
  })
  .meta({ id: "GlobalFitResponse" });

export type GlobalFitRequest = z.infer<typeof globalFitRequest>;
export type GlobalFitResponse = z.infer<typeof globalFitResponse>;

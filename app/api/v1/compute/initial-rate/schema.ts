import { z } from "zod";
import { estimate, flag, level, measured, reading } from "../estimate.schema";

const estimator = z.enum(["straight", "tangent", "exponential", "integrated"]);

/** Points that one call may bring; longer traces belong in a study, which parses them off the request path. */
const MAX_POINTS = 200_000;

export const initialRateRequest = z
  .object({
    time: z.array(reading).max(MAX_POINTS).meta({ description: "Strictly increasing, in any one unit." }),
    signal: z.array(reading).max(MAX_POINTS).meta({ description: "Same length as `time`." }),
    estimator: estimator
      .or(z.literal("auto"))
      .default("auto")
      .meta({ description: "`auto` chooses window and estimator by their expected error." }),
    window: z.tuple([reading, reading]).optional().meta({
      description: "First and last time to use, in the unit of `time`. Without it the window is chosen.",
    }),
    timeZero: reading.default(0).meta({
      description: "Time of mixing, in the unit of `time`; the slope is taken there.",
    }),
    degree: z
      .union([z.literal(2), z.literal(3), z.literal(4)])
      .optional()
      .meta({ description: "Degree of the polynomial when `estimator` is `tangent`; 2 by default." }),
    initialConcentration: measured.positive().optional().meta({
      description:
        "Starting concentration that complete conversion uses up: of the followed reactant or, when a product is followed (positive `stoichiometricNumber`), of the limiting reactant with stoichiometric number −1. Conversions rest on it.",
    }),
    signalPerConcentration: z
      .object({ value: measured, standardUncertainty: measured.nonnegative() })
      .refine((factor) => factor.value !== 0, { message: "must not be zero", path: ["value"] })
      .optional()
      .meta({
        description: "Signal per concentration, for absorbance ε·l. Without it the signal is its own unit.",
      }),
    stoichiometricNumber: measured
      .refine((number) => number !== 0, { message: "must not be zero" })
      .optional()
      .meta({
        description:
          "Signed stoichiometric number ν of the followed species. With it the answer is the rate of reaction v = (1/ν) dc/dt; without it the signed slope.",
      }),
    level: level.optional(),
  })
  .meta({ id: "InitialRateRequest" });

const window = z.tuple([z.number(), z.number()]);

export const initialRateResponse = z
  .object({
    rate: estimate.meta({
      description:
        "At the time of mixing. In concentration per time where `signalPerConcentration` was given (its uncertainty is part of the standard error), else in signal per time.",
    }),
    estimator,
    degree: z.number().int().nullable(),
    window,
    points: z.number().int(),
    conversion: z.number().nullable().meta({ description: "At the end of the window; null without a span." }),
    degreesOfFreedom: z.number(),
    autocorrelation: z.number().meta({ description: "Lag-one autocorrelation ρ of the noise." }),
    effectivePoints: z.number().meta({ description: "n(1−ρ)/(1+ρ)." }),
    noise: z.number().meta({ description: "Standard deviation of one reading, in signal." }),
    alternatives: z.array(
      z.object({ estimator, degree: z.number().int().nullable(), rate: estimate, window }),
    ),
    flags: z.array(flag),
  })
  .meta({ id: "InitialRateResponse" });

export type InitialRateRequest = z.infer<typeof initialRateRequest>;
export type InitialRateResponse = z.infer<typeof initialRateResponse>;

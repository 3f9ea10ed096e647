import { z } from "zod";
import { estimate, flag, level, measured, rateConstant, reading } from "../estimate.schema";

/** Points that one call may bring; longer traces belong in a study, which parses them off the request path. */
const MAX_POINTS = 200_000;

const endSignal = z.discriminatedUnion("kind", [
  z.object({ kind: z.literal("zero") }),
  z.object({ kind: z.literal("free") }),
  z.object({
    kind: z.literal("known"),
    value: reading,
    standardUncertainty: measured.nonnegative(),
  }),
]);

export const integratedLawRequest = z
  .object({
    time: z.array(reading).max(MAX_POINTS).meta({ description: "Strictly increasing, in any one unit." }),
    signal: z
      .array(reading)
      .max(MAX_POINTS)
      .meta({ description: "Same length as `time`; falling or rising." }),
    order: z
      .union([z.number().min(-2).max(5), z.literal("free")])
      .meta({ description: "The order at which the law is held, or `free`." }),
    endSignal: endSignal.optional().meta({
      description:
        "Signal when the followed species is gone. `known` makes it one more observation with its own standard uncertainty (0: exact); `zero` says that nothing else shows; `free`, which also stands for an absent field, leaves it to the fit and is flagged.",
    }),
    timeZero: reading.optional().meta({
      description:
        "Time of mixing, in the unit of `time`; `initialSignal` and `halfLife` count from there. 0 by default.",
    }),
    signalUnit: z.enum(["mol/L", "mmol/L", "umol/L", "mmHg"]).optional().meta({
      description: "For the unit of k in words, where the signal is a concentration or a pressure.",
    }),
    timeUnit: z.enum(["s", "min", "h"]).optional().meta({ description: "For the unit of k in words." }),
    level: level.optional(),
  })
  .meta({ id: "IntegratedLawRequest" });

export const integratedLawResponse = z
  .object({
    order: estimate.meta({ description: "A held order has no standard error and no interval." }),
    rateConstant: rateConstant.meta({
      description:
        "k of −dy/dt = k·yⁿ, y the distance of the signal from its end: on the signal's own scale, and with no stoichiometric number divided out.",
    }),
    logRateConstant: estimate.meta({ description: "Natural logarithm of k in that unit." }),
    initialSignal: estimate.meta({ description: "At the time of mixing, extrapolated where need be." }),
    endSignal: estimate.meta({ description: "An end that is taken as exact has no standard error." }),
    halfLife: estimate.meta({
      description:
        "From mixing until half of the distance from the end is gone; depends on the start unless n = 1.",
    }),
    conversion: z.number().nullable().meta({ description: "At the last reading." }),
    residualStandardDeviation: z.number().nullable().meta({ description: "In signal." }),
    degreesOfFreedom: z.number(),
    autocorrelation: z.number().meta({ description: "Lag-one autocorrelation ρ of the residuals." }),
    effectivePoints: z.number().meta({ description: "n(1−ρ)/(1+ρ)." }),
    points: z.number().int().meta({ description: "Readings at or after mixing." }),
    aicc: z.number().nullable().meta({
      description: "Compares orders on the same readings; null for too few of them.",
    }),
    orderStandardError: z.number().nullable().meta({
      description: "Of the order where it is free, or of what a held one would have if it were.",
    }),
    endConflict: z.number().nullable().meta({
      description:
        "Free end less stated end, in standard uncertainties; null where none is stated or the readings show none.",
    }),
    lackOfFit: z
      .object({ ratio: z.number(), above: z.number(), below: z.number(), pValue: z.number() })
      .nullable()
      .meta({
        description: "F of a smooth pattern in the residuals, its degrees of freedom and its p-value.",
      }),
    flags: z.array(flag),
  })
  .meta({ id: "IntegratedLawResponse" });

export type IntegratedLawRequest = z.infer<typeof integratedLawRequest>;
export type IntegratedLawResponse = z.infer<typeof integratedLawResponse>;

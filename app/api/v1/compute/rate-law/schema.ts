import { z } from "zod";
import { estimate, flag, level, measured, rateConstant } from "../estimate.schema";

/** The names that every object of the language carries, such as "constructor", would be found where nothing was given. */
const speciesName = z
  .string()
  .min(1)
  .max(80)
  .refine((name) => !(name in Object.prototype), { error: "cannot be used as a name; write another" });
const label = z.string().min(1).max(80);
const relative = z.number().min(0).max(1);

export const rateLawRequest = z
  .object({
    species: z.array(speciesName).min(1).max(12).meta({
      description: "Species whose orders are asked for; the covariance follows their order.",
    }),
    runs: z
      .array(
        z.object({
          label,
          concentrations: z.record(speciesName, measured.nonnegative()),
          rate: measured.meta({ description: "Rate of reaction at the start, in concentration per time." }),
          rateStandardError: measured.nonnegative().optional(),
          relativeUncertainty: z.record(speciesName, relative).optional().meta({
            description: "Private (pipetting) part of each concentration's relative standard uncertainty.",
          }),
          block: z.string().max(80).optional(),
          mixture: z.string().max(80).optional().meta({
            description: "Runs with one mixture are re-readings of it and are averaged first.",
          }),
        }),
      )
      .min(1)
      .max(2000),
    shared: z
      .array(
        z.object({
          species: z.array(speciesName).max(12),
          onRate: z.boolean().optional(),
          relative,
          runs: z.array(label).max(2000).optional(),
        }),
      )
      .max(200)
      .optional()
      .meta({
        description:
          "Errors that several runs share: stocks, dilution steps and, with `onRate`, ε·l. Without `runs`: all.",
      }),
    orders: z
      .record(speciesName, z.union([z.literal("free"), z.number().min(-6).max(6)]))
      .optional()
      .meta({ description: "`free` (default) or the value at which an order is held." }),
    concentrationUnit: z.enum(["mol/L", "mmol/L", "umol/L", "mmHg"]).default("mol/L"),
    timeUnit: z.enum(["s", "min", "h"]).default("s"),
    level: level.optional(),
  })
  .meta({ id: "RateLawRequest" });

const budgetLine = z.object({ source: z.string(), relative: z.number() });

export const rateLawResponse = z
  .object({
    orders: z.record(z.string(), estimate),
    rateConstant,
    logRateConstant: estimate.meta({ description: "Natural logarithm of k in the given units." }),
    centre: z.object({ concentrations: z.record(z.string(), z.number()), rate: estimate }),
    covariance: z.array(z.array(z.number())).nullable().meta({
      description: "Of ln k, then the orders in the order of `species`. Null where there is no uncertainty.",
    }),
    budget: z.array(budgetLine).meta({
      description: "Relative standard uncertainty of k by source; their squares add up to that of ln k.",
    }),
    betweenRunStandardDeviation: z.number().nullable(),
    degreesOfFreedom: z.number(),
    separable: z.boolean(),
    undetermined: z.array(z.object({ combination: z.record(z.string(), z.number()), message: z.string() })),
    simpleOrders: z.object({
      orders: z.record(z.string(), z.number()),
      reading: z.record(z.string(), z.enum(["is", "consistent", "nearest", "undetermined"])),
      rateConstant,
    }),
    pairs: z.array(
      z.object({ runs: z.tuple([z.string(), z.string()]), species: z.string(), order: estimate }),
    ),
    flags: z.array(flag),
  })
  .meta({ id: "RateLawResponse" });

export type RateLawRequest = z.infer<typeof rateLawRequest>;
export type RateLawResponse = z.infer<typeof rateLawResponse>;

import { z } from "zod";
import { estimate, flag, level, measured } from "../estimate.schema";

/** Initial rates are measured one by one; so many stay quick. */
const MOST_POINTS = 1000;

export const saturationRequest = z
  .object({
    concentrations: z.array(measured.nonnegative()).max(MOST_POINTS).meta({
      description: "Of the one species that varies, in any one unit.",
    }),
    rates: z.array(measured).max(MOST_POINTS).meta({
      description: "One for each concentration, in any one unit.",
    }),
    level: level.optional(),
  })
  .meta({ id: "SaturationRequest" });

export const saturationResponse = z
  .object({
    limitingRate: estimate.meta({
      description: "V of v = V c/(K + c), in the unit of the rates; the interval is a profile-t interval.",
    }),
    halfSaturation: estimate.meta({
      description: "K, in the unit of the concentrations; the interval is a profile-t interval.",
    }),
    initialSlope: estimate.meta({
      description: "V/K, known even where V and K apart are not; the interval is a profile-t interval.",
    }),
    covariance: z.array(z.array(z.number())).nullable().meta({ description: "Of V and K." }),
    correlation: z.number().nullable(),
    residualStandardDeviation: z.number().nullable(),
    degreesOfFreedom: z.number().int(),
    residuals: z.array(z.number()).meta({ description: "Measured less fitted." }),
    lackOfFit: z
      .object({
        fStatistic: z.number(),
        pValue: z.number(),
        degreesOfFreedom: z.tuple([z.number().int(), z.number().int()]),
      })
      .nullable()
      .meta({ description: "Against the scatter of repeats; null without repeats." }),
    flags: z.array(flag),
  })
  .meta({ id: "SaturationResponse" });

export type SaturationRequest = z.infer<typeof saturationRequest>;
export type SaturationResponse = z.infer<typeof saturationResponse>;

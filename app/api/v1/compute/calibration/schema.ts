import { z } from "zod";
import { estimate, flag, level, measured } from "../estimate.schema";

const MOST_STANDARDS = 500;
const MOST_UNKNOWNS = 500;
const MOST_REPLICATES = 20;

const weight = measured.gt(0);

export const calibrationRequest = z
  .object({
    concentrations: z.array(measured).min(1).max(MOST_STANDARDS).meta({
      description: "Of the standards, in any unit; replicates of a level stand as points of their own.",
    }),
    signals: z
      .array(measured)
      .min(1)
      .max(MOST_STANDARDS)
      .meta({ description: "One for each concentration." }),
    weights: z.array(weight).max(MOST_STANDARDS).optional().meta({
      description: "In proportion to 1/variance of each signal; all equal where absent.",
    }),
    intercept: z.enum(["fitted", "none"]).default("fitted").meta({
      description: "`none`: the line goes through the origin.",
    }),
    readings: z.array(z.array(measured).min(1).max(MOST_REPLICATES)).max(MOST_UNKNOWNS).default([]).meta({
      description: "Replicate signals of each unknown.",
    }),
    readingWeights: z.array(weight).max(MOST_UNKNOWNS).optional().meta({
      description: "Of one signal of each unknown, on the scale of `weights`; 1 where absent.",
    }),
    level: level.optional(),
  })
  .meta({ id: "CalibrationRequest" });

const nullable = z.number().nullable();

export const calibrationResponse = z
  .object({
    slope: estimate,
    intercept: estimate.meta({
      description: "0 without uncertainty where the line goes through the origin.",
    }),
    covariance: nullable.meta({ description: "Of intercept and slope." }),
    correlation: nullable.meta({ description: "Of intercept and slope." }),
    residualStandardDeviation: nullable.meta({ description: "Of a signal of weight 1." }),
    degreesOfFreedom: z.number(),
    rSquared: nullable.meta({
      description: "About the mean of the signals, or about zero where the line goes through the origin.",
    }),
    curvature: z.object({ fStatistic: nullable, pValue: nullable, quadratic: estimate.nullable() }).meta({
      description: "F of the reduction by a quadratic term; null with too few levels or no scatter.",
    }),
    lackOfFit: z
      .object({
        fStatistic: z.number(),
        degreesOfFreedom: z.tuple([z.number(), z.number()]),
        pValue: z.number(),
      })
      .nullable()
      .meta({ description: "The line against replicates of its levels; null without them." }),
    linearRange: z
      .object({
        straightUpTo: z.number(),
        curvedFrom: nullable,
        moreStandards: nullable,
        scatterNeeded: nullable,
      })
      .nullable()
      .meta({
        description:
          "Concentration up to which the standards show that curvature stays below 2 % of the net signal, and from which they show that it does not; standards on the same levels, or part of the present scatter, that would show straightness up to the highest standard.",
      }),
    limitOfDetection: nullable.meta({ description: "3.3 residual standard deviations over the slope." }),
    limitOfQuantitation: nullable.meta({ description: "10 residual standard deviations over the slope." }),
    readings: z.array(estimate).meta({
      description:
        "Concentrations with Fieller intervals; no interval where the slope cannot be told from zero.",
    }),
    residuals: z.array(z.number()).meta({ description: "Signal less the line, standard by standard." }),
    flags: z.array(flag),
  })
  .meta({ id: "CalibrationResponse" });

export type CalibrationRequest = z.infer<typeof calibrationRequest>;
export type CalibrationResponse = z.infer<typeof calibrationResponse>;

import type { InitialRate, SlopeAtEnd, TraceSurvey } from "kinetics-core/initial-rate";
import { z } from "zod";

/**
 * Schemas of the results that the database keeps, held to the library's own types by `satisfies`: a field that the
 * library gains or loses fails to compile here.
 */

const estimator = z.enum(["straight", "tangent", "exponential", "integrated"]);
const pair = z.enum(["line-quadratic", "quadratic-cubic", "cubic-quartic", "exponential-general"]);
const interval = z.tuple([z.number(), z.number()]);
const flag = z.object({
  code: z.string(),
  severity: z.enum(["blocks", "weakens", "note"]),
  message: z.string(),
});

const curve = z.discriminatedUnion("kind", [
  z.object({ kind: z.literal("polynomial"), coefficients: z.array(z.number()) }),
  z.object({
    kind: z.literal("exponential"),
    start: z.number(),
    span: z.number(),
    rateConstant: z.number(),
  }),
  z.object({
    kind: z.literal("general-order"),
    start: z.number(),
    span: z.number(),
    rateConstant: z.number(),
    order: z.number(),
  }),
]);

const slopeEstimate = z.object({
  estimator,
  degree: z.number().nullable(),
  slope: z.number(),
  standardError: z.number(),
  window: interval,
  points: z.number(),
  conversion: z.number().nullable(),
  curve,
});

export const initialRateSchema = z.discriminatedUnion("status", [
  slopeEstimate.extend({
    status: z.literal("found"),
    interval,
    level: z.number(),
    degreesOfFreedom: z.number(),
    pair: pair.nullable(),
    reached: z.number().nullable(),
    noise: z.number(),
    autocorrelation: z.number(),
    effectivePoints: z.number(),
    alternatives: z.array(slopeEstimate),
    flags: z.array(flag),
  }),
  z.object({
    status: z.literal("too-few-points"),
    needed: z.number(),
    got: z.number(),
    message: z.string(),
  }),
  z.object({
    status: z.literal("unusable"),
    code: z.enum(["not-increasing", "not-finite", "lengths-differ", "empty-window", "flat-time", "no-slope"]),
    message: z.string(),
  }),
]) satisfies z.ZodType<InitialRate>;

const lackOfFit = z.object({ ratio: z.number(), above: z.number(), below: z.number() });

export const traceSurveySchema = z.object({
  label: z.string(),
  rules: z.array(
    z.object({
      conversionEnd: z.number(),
      pair,
      lowerSlope: z.number(),
      lowerStandardError: z.number(),
      upperSlope: z.number(),
      upperStandardError: z.number(),
      lackOfFit: lackOfFit.nullable(),
    }),
  ),
}) satisfies z.ZodType<TraceSurvey>;

export const slopesAtEndSchema = z.array(
  z.object({ end: z.number(), slope: z.number(), standardError: z.number() }),
) satisfies z.ZodType<readonly SlopeAtEnd[]>;

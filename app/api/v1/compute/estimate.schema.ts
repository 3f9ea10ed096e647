import { z } from "zod";
import { isMeasurable, MEASURED } from "@/db/limits";

/** A number that went into the computation: zero, or of a size that some measurement in some unit has. */
export const measured = z.number().refine(isMeasurable, {
  error: `must be 0 or between ${MEASURED.least} and ${MEASURED.most} in size; check the power of ten and the unit`,
});

/** A time or a signal: small ones do no harm, large ones overflow when they are squared. */
export const reading = z.number().min(-MEASURED.most).max(MEASURED.most);

/** The shapes that every compute answer is made of. Absent is `null`: never NaN, never a made-up zero. */
export const estimate = z
  .object({
    estimate: z.number().nullable(),
    standardError: z.number().nullable(),
    interval: z.tuple([z.number(), z.number()]).nullable(),
    level: z.number(),
  })
  .meta({
    id: "Estimate",
    description:
      "What the data say about one number: estimate, one standard error, and an interval at `level`. Each is null where the data cannot give it.",
  });

export const rateConstant = estimate.extend({ unit: z.string() }).meta({
  id: "RateConstant",
  description: "An estimate with its unit as plain text, for example `L mol^-1 s^-1`.",
});

export const flag = z
  .object({
    code: z.string().meta({ example: "few-degrees-of-freedom" }),
    severity: z.enum(["blocks", "weakens", "note"]),
    message: z.string(),
  })
  .meta({ id: "Flag", description: "A finding about the input or the result, in one sentence." });

export const level = z.number().gt(0.5).lt(1).default(0.95).meta({
  description: "Confidence level of every interval in the answer.",
});

/** RFC 9457 problem details with the places at fault. */
export const problem = z
  .object({
    type: z.string(),
    title: z.string(),
    status: z.number().int(),
    detail: z.string(),
    errors: z.array(z.object({ path: z.string(), message: z.string() })).optional(),
  })
  .meta({ id: "Problem", description: "Problem details (RFC 9457); `errors` names each place at fault." });

/** What a compute face gives back: an answer, or the places at fault. */
export type Computed<Answer> =
  | { readonly ok: true; readonly answer: Answer }
  | { readonly ok: false; readonly errors: readonly { readonly path: string; readonly message: string }[] };

import { z } from "zod";

const target = {
  studyId: z.string().min(1).max(64),
  /** Revision that the page showed. */
  base: z.number().int().nonnegative(),
  runId: z.string().min(1).max(64),
};

/** Bounds are readings' times in seconds on the trace's own clock; null gives the run back to the study's rule. */
export const windowSchema = z.object({
  ...target,
  window: z
    .object({ fromSeconds: z.number(), toSeconds: z.number() })
    .refine((window) => window.fromSeconds < window.toSeconds, "A window ends after it starts.")
    .nullable(),
});

/** What of the trace counts, on its own clock, and the signal when the reaction is over, as stored. */
export const traceMarksSchema = z.object({
  ...target,
  deadTimeSeconds: z.number().nonnegative("A dead time is not negative.").optional(),
  trim: z
    .object({ fromSeconds: z.number(), toSeconds: z.number() })
    .refine((trim) => trim.fromSeconds < trim.toSeconds, "The part that counts ends after it starts.")
    .nullable()
    .optional(),
  endSignal: z
    .object({ value: z.number(), standardUncertainty: z.number().nonnegative() })
    .nullable()
    .optional(),
});

/** All readings that are marked as spikes, by their place in the stored trace from 0. */
export const spikesSchema = z.object({
  ...target,
  places: z.array(z.number().int().nonnegative()).max(500, "At most 500 readings of a run can be marked."),
});

export const timeZeroSchema = z.object({ ...target, timeZeroSeconds: z.number() });

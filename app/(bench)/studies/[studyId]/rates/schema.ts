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

export const timeZeroSchema = z.object({ ...target, timeZeroSeconds: z.number() });

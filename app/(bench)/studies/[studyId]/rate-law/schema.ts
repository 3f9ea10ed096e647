import { z } from "zod";

/** Orders by species id: null is free, a number is held. */
export const ordersSchema = z.object({
  studyId: z.string().min(1).max(64),
  /** Revision that the page showed. */
  base: z.number().int().nonnegative(),
  orders: z.record(
    z.string().min(1).max(64),
    z
      .number()
      .min(-4, "An order below −4 is none that a rate law has.")
      .max(6, "An order above 6 is none that a rate law has.")
      .nullable(),
  ),
});

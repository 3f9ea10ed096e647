import { z } from "zod";
import { corrections } from "@/app/_import/corrections";

const identifier = z.string().min(1).max(64);

/** What "Store n traces" sends: the file is on the server already, only what was said about it travels. */
export const storeTracesInput = z.object({
  studyId: identifier,
  uploadId: identifier,
  /** The revision that the preview was made for. */
  base: z.number().int().nonnegative(),
  corrections,
  /** Starting concentrations in mol L⁻¹, by the trace's source, then by species id. */
  recipes: z.record(z.string().max(80), z.record(identifier, z.number().nonnegative())),
});
